import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Line } from '../api/types';
import { EffectCell } from '../parts/EffectCell';
import { Evaporation } from '../parts/Evaporation';
import { Words } from '../parts/Words';
import { calmNow } from '../site/clock';
import { zone } from '../site/state';
import { aged } from '../words/aged';
import { lineWords } from '../words/line';
import { useSaid } from './use-said';

/** A line as a row of the ledger. `told`: its sentence already stands before the rows. */
export function LedgerLine({ line: given, weeks, told }: { line: Line; weeks: 1 | 4; told: boolean }) {
  const now = calmNow.value, line = aged(given, now), stale = line.readings !== 'live';
  const pieces = lineWords(line, now, zone.value);
  useSaid(line.name, pieces);
  return (
    <section class="line ledger-line" id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 id={`line-name.${line.name}`} class="line-name"><Link href={pages.line(line.name)}>{line.name}</Link></h2>
      <div class="ledger-row">
        {!told && <Words pieces={pieces} />}
        <ul class="effects">
          {line.effects.map(e => <li key={e.name}><EffectCell effect={e} now={now} zone={zone.value} stale={stale} weeks={weeks} radius={24}
            asOf={line.as_of === null ? null : Date.parse(line.as_of)} /></li>)}
        </ul>
        <Evaporation line={line} stale={stale} />
      </div>
    </section>
  );
}
