import { Link } from 'wouter-preact';
import { Mark } from '../bore/Mark';
import { Words } from '../parts/Words';
import type { First } from '../words/first';

/** What the reader should know before the rows. The mark stands where someone must act; the sentence says what for. */
export function FirstSentences({ first, left }: { first: First[]; left: number }) {
  if (first.length === 0) return null;
  return (
    <section class="first" aria-labelledby="first">
      <h2 id="first" class="unseen">What wants to be known first</h2>
      <ul>
        {first.map(f => <li key={f.key}>
          <span class="first-of">{f.line === null ? 'site' : <a href={`#line.${encodeURIComponent(f.line)}`}>{f.line}</a>}</span>
          <div class="first-words">{f.act ? <Mark kind="now" /> : <span class="mark" />}<div><Words pieces={f.pieces} />{f.answer !== undefined && <p class="first-answer"><Link href={f.answer}>Answer<span class="unseen"> for {f.key.split(' ').slice(1).join(' ')}</span></Link></p>}</div></div>
        </li>)}
      </ul>
      {left > 0 && <p class="quiet first-left">{left === 1 ? 'One more stands' : `${left} more stand`} in the rows below.</p>}
    </section>
  );
}
