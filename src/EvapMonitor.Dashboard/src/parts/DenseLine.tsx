import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Line } from '../api/types';
import { Slice } from '../bore/Slice';
import { cleanlinessWords, dueWords } from '../words/due';
import { duration } from '../words/duration';

/** A line in a row: a slice and the cleanliness of each effect. Browsers leave rows out of sight undrawn. */
export function DenseLine({ line, now }: { line: Line; now: number }) {
  const silent = line.readings !== 'live';
  return (
    <section class="dense" id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 id={`line-name.${line.name}`}>{line.name}</h2>
      {silent && <p><b>{line.latest_reading_at === null ? 'no reading yet' : `silent for ${duration(now - Date.parse(line.latest_reading_at))}`}</b></p>}
      <ul>{line.effects.map(e => <li key={e.name}>
        <Link href={pages.effect(e.line, e.name)}>
          <span class="dense-name">{e.name}</span> <Slice effect={e} />
          <span>{e.now?.cleanliness != null ? `${Math.round(e.now.cleanliness * 100)} %` : '?'}</span>
          <span class="unseen">, {cleanlinessWords(e)}, {dueWords(e, now, !silent).words}</span>
        </Link>
      </li>)}</ul>
    </section>
  );
}
