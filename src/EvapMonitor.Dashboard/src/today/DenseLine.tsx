import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Effect, Line } from '../api/types';
import { Glyph } from '../bore/Glyph';
import { Slice } from '../bore/Slice';
import { limitShare, stepOf, stepWords } from '../bore/steps';
import { cleanlinessWords, dueWords } from '../words/due';
import { duration } from '../words/duration';

/** A line in a row: glyph, slice and cleanliness of each effect. Browsers leave rows out of sight undrawn. */
export function DenseLine({ line, now }: { line: Line; now: number }) {
  const silent = line.readings !== 'live';
  return (
    <section class={silent ? 'dense silent' : 'dense'} id={`line.${line.name}`} aria-labelledby={`line-name.${line.name}`}>
      <h2 id={`line-name.${line.name}`}><Link href={pages.line(line.name)}>{line.name}</Link></h2>
      {silent && <p><b>{line.latest_reading_at === null ? 'no reading yet' : `silent for ${duration(now - Date.parse(line.latest_reading_at))}`}</b></p>}
      <ul>{line.effects.map(e => <li key={e.name}>
        <Link href={pages.effect(e.line, e.name)}>
          <Glyph effect={e} /> <span class="dense-name">{e.name}</span> <Slice effect={e} />
          <span aria-hidden="true">{number(e, silent)}</span>
          <span class="unseen">, {spoken(e, now, silent)}</span>
        </Link>
      </li>)}</ul>
    </section>
  );
}

/** Of a silent line the number is what it was, and is written so. */
function number(effect: Effect, silent: boolean): string {
  const share = effect.now?.cleanliness ?? null;
  return share === null ? '?' : `${silent ? 'was ' : ''}${Math.round(share * 100)} %`;
}

function spoken(effect: Effect, now: number, silent: boolean): string {
  const share = limitShare(effect);
  return [cleanlinessWords(effect), share === null ? null : `deposit ${stepWords[stepOf(share)]}`, dueWords(effect, now, !silent).words].filter(Boolean).join(', ');
}
