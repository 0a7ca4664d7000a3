import { useSignal } from '@preact/signals';
import { useEffect, useRef } from 'preact/hooks';
import type { Line } from '../api/types';
import { weeksPerStratum } from '../bore/deposit';
import { announce } from '../parts/Announcer';
import { DenseLine } from '../parts/DenseLine';
import { EffectCell } from '../parts/EffectCell';
import { Evaporation } from '../parts/Evaporation';
import { Shown } from '../parts/Waiting';
import { Words } from '../parts/Words';
import { useNarrow } from '../parts/use-narrow';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { lines, site, zone } from '../site/state';
import { aged } from '../words/aged';
import { lineWords } from '../words/line';
import { asks, siteWords } from '../words/site';
import { NoReadings } from './NoReadings';

/** More lines than these are not all drawn large. */
const many = 12;

/** How is the site, what must I do? */
export function Today() {
  useTitle('Today');
  const none = site.state.value.value?.readings === 'none';
  return (
    <>
      <h1 class="unseen">Today</h1>
      {none && <NoReadings />}
      <Shown of={lines} what="The lines">
        {({ lines: all }) => <>
          {all.length === 0 && !none && <p class="empty">No plant file names a line yet. The Plant page shows what is in force.</p>}
          {!none && all.length > many && <ManyLines all={all} />}
          {!none && all.length <= many && all.map(line => <LineToday key={line.name} line={line} alone={all.length === 1} weeks={weeksPerStratum(all.flatMap(l => l.effects))} />)}
          {!none && all.length > 0 && <Legend lines={all} />}
        </>}
      </Shown>
    </>
  );
}

function LineToday({ line: given, alone, weeks }: { line: Line; alone: boolean; weeks: 1 | 4 }) {
  const narrow = useNarrow();
  const now = calmNow.value, line = aged(given, now), stale = line.readings !== 'live';
  const pieces = lineWords(line, now, zone.value);
  // A new state is said aloud; that a duration in it grows is not.
  const state = pieces.map(p => p.text).join('').replace(/\d+/g, '');
  const before = useRef(state);
  useEffect(() => {
    if (before.current !== state) announce(`${line.name}: ${pieces.map(p => p.text).join('')}`);
    before.current = state;
  }, [state]);
  const radius = narrow ? 22 : alone ? 64 : 52;
  return (
    <section class="line" id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 id={`line-name.${line.name}`} class="line-name">{line.name}</h2>
      <div>
        <Words pieces={pieces} />
        <div class="line-row">
          <ul class="effects">
            {line.effects.map(e => <li key={e.name}><EffectCell effect={e} now={now} zone={zone.value} stale={stale} weeks={weeks} radius={radius}
              asOf={line.as_of === null ? null : Date.parse(line.as_of)} /></li>)}
          </ul>
          <Evaporation line={line} stale={stale} />
        </div>
      </div>
    </section>
  );
}

/** Lines that ask for something are opened where they stand in the plant file, the others are rows; silent ones are counted apart. */
function ManyLines({ all }: { all: Line[] }) {
  const wanted = useSignal('');
  const now = calmNow.value, weeks = weeksPerStratum(all.flatMap(l => l.effects));
  const lines = all.map(l => aged(l, now));
  const shown = lines.filter(l => l.name.toLowerCase().includes(wanted.value.trim().toLowerCase()));
  return (
    <>
      <div class="many">
        <Words pieces={siteWords(lines)} />
        <label>Show lines named <input type="search" value={wanted.value} onInput={e => { wanted.value = e.currentTarget.value; }} /></label>
        {shown.length === 0 && <p class="quiet" role="status">No line has this in its name.</p>}
      </div>
      {shown.map(l => (asks(l) ? <LineToday key={l.name} line={l} alone={false} weeks={weeks} /> : <DenseLine key={l.name} line={l} now={now} />))}
    </>
  );
}

/** What the drawing stands for, once per page. */
function Legend({ lines: all }: { lines: Line[] }) {
  const effects = all.flatMap(l => l.effects);
  const weeks = weeksPerStratum(effects);
  return (
    <p class="legend">
      Ring thickness stands for fouling resistance; not to scale, not a flow restriction. One stratum is {weeks === 1 ? 'one week' : 'four weeks'}. Dashed circle: the
      limit. The bar at three o'clock: ± one standard uncertainty.
      {effects.some(e => e.limits.hours_since_cleaning !== null) && ' Arc outside: hours since the cleaning, full at the limit.'}
      {effects.some(e => (e.limits.resistance_m2k_w ?? 0) <= 0) && ' Dotted circle, where no limit is set: half the clean coefficient.'}
    </p>
  );
}
