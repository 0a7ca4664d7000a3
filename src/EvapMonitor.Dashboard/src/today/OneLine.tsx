import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Line } from '../api/types';
import { weeksPerStratum } from '../bore/deposit';
import { EffectCell } from '../parts/EffectCell';
import { Evaporation } from '../parts/Evaporation';
import { Words } from '../parts/Words';
import { useNarrow } from '../parts/use-narrow';
import { calmNow } from '../site/clock';
import { zone } from '../site/state';
import { aged } from '../words/aged';
import { lineWords } from '../words/line';
import { useSaid } from './use-said';

/** A site of one line: its sentence, its bores large, its evaporation. */
export function OneLine({ line: given }: { line: Line }) {
  const narrow = useNarrow();
  const now = calmNow.value, line = aged(given, now), stale = line.readings !== 'live';
  const pieces = lineWords(line, now, zone.value);
  useSaid(line.name, pieces);
  return (
    <section class="line" id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 id={`line-name.${line.name}`} class="line-name"><Link href={pages.line(line.name)}>{line.name}</Link></h2>
      <div>
        <Words pieces={pieces} />
        <div class="line-row">
          <ul class="effects">
            {line.effects.map(e => <li key={e.name}><EffectCell effect={e} now={now} zone={zone.value} stale={stale} weeks={weeksPerStratum(line.effects)}
              radius={narrow ? 22 : 64} asOf={line.as_of === null ? null : Date.parse(line.as_of)} /></li>)}
          </ul>
          <Evaporation line={line} stale={stale} />
        </div>
      </div>
    </section>
  );
}
