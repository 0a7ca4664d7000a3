import { useEffect } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Effect, Line } from '../api/types';
import { Slice } from '../bore/Slice';
import { DueLabel } from '../parts/DueLabel';
import { Scroller } from '../parts/Scroller';
import { Shown } from '../parts/Waiting';
import { scrollToHash } from '../parts/use-arrival';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { lines, zone } from '../site/state';
import { aged } from '../words/aged';
import { dueWords } from '../words/due';
import { duration } from '../words/duration';
import { measured } from '../words/number';
import { moment } from '../words/time';

/** Every line's numbers in a ledger, a row per effect. */
export function Lines() {
  useTitle('Lines');
  const known = lines.state.value.value !== null;
  useEffect(() => { if (known) scrollToHash(); }, [known]);
  return (
    <>
      <h1 class="page-name">Lines</h1>
      <Shown of={lines} what="The lines">
        {({ lines: all }) => (all.length === 0 ? <p class="empty">No plant file names a line yet.</p> : all.map(l => <Ledger key={l.name} line={l} />))}
      </Shown>
    </>
  );
}

function Ledger({ line: given }: { line: Line }) {
  const now = calmNow.value, line = aged(given, now);
  const stale = line.readings !== 'live';
  return (
    <section class="line" id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 class="line-name" id={`line-name.${line.name}`}><Link href={pages.line(line.name)}>{line.name}</Link></h2>
      <div>
        <p class="quiet">
          {line.liquor}; {line.state === 'unknown' ? 'running state not known' : line.state}
          {line.as_of && <>; results as of {moment(Date.parse(line.as_of), zone.value, now)}</>}
          {stale && line.latest_reading_at && <b>; last reading {duration(now - Date.parse(line.latest_reading_at))} ago</b>}
        </p>
        <Scroller label={`Effects of ${line.name}`}>
          <table class="ledger">
            <thead><tr>
              <th scope="col">effect</th><th scope="col">of the limit</th><th scope="col">coefficient, W/(m²·K)</th><th scope="col">if clean</th>
              <th scope="col">cleanliness, %</th><th scope="col">driving force, K</th><th scope="col">cleaned</th><th scope="col">due</th>
            </tr></thead>
            <tbody>{line.effects.map(e => <Row key={e.name} effect={e} now={now} fresh={!stale} />)}</tbody>
          </table>
        </Scroller>
      </div>
    </section>
  );
}

function Row({ effect, now, fresh }: { effect: Effect; now: number; fresh: boolean }) {
  const n = effect.now;
  const clean = n?.coefficient_w_m2k && n.cleanliness ? n.coefficient_w_m2k / n.cleanliness : effect.clean_coefficient_w_m2k;
  const number = (v: number | null | undefined, u: number | null | undefined, factor = 1) =>
    (v === null || v === undefined ? <span class="quiet">not known</span> : measured(v * factor, u === null || u === undefined ? null : u * factor));
  const cleaned = effect.last_cleaning?.end ?? null;
  return (
    <tr>
      <th scope="row"><Link href={pages.effect(effect.line, effect.name)}>{effect.name}</Link></th>
      <td><Slice effect={effect} /></td>
      <td>{number(n?.coefficient_w_m2k, n?.coefficient_u)}</td>
      <td>{clean === null ? <span class="quiet">not known</span> : Math.round(clean)}</td>
      <td>{number(n?.cleanliness, n?.cleanliness_u, 100)}</td>
      <td>{number(n?.driving_force_k, n?.driving_force_u)}</td>
      <td>{cleaned === null ? <span class="quiet">none known</span> : `${duration(now - Date.parse(cleaned))} ago`}</td>
      <td><DueLabel due={dueWords(effect, now, fresh)} /></td>
    </tr>
  );
}
