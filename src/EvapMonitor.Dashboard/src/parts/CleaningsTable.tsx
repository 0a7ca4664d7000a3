import { useSignal } from '@preact/signals';
import { Fragment } from 'preact';
import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Cleaning } from '../api/types';
import { CorrectionForm, EntryButtons } from '../cleaning/EntryActions';
import type { Entry } from '../cleaning/use-draft';
import { VerdictMark } from '../cleaning/VerdictMark';
import { zone } from '../site/state';
import { knownWords, surfaceWords, verdictWords, waiting } from '../words/cleaning';
import { duration } from '../words/duration';
import { percent, resistance, resistanceUnit } from '../words/resistance';
import { moment } from '../words/time';
import { Scroller } from './Scroller';

/** Cleanings with what they brought, the youngest first. `everywhere`: name line and effect too. `first`: so many rows at once. */
export function CleaningsTable({ all, now, everywhere, first }: { all: readonly Cleaning[]; now: number; everywhere: boolean; first: number }) {
  const most = useSignal(first), open = useSignal<string | null>(null), returned = useSignal<string | null>(null);
  const sorted = [...all].sort((a, b) => Date.parse(b.start) - Date.parse(a.start)), columns = everywhere ? 9 : 7, asked = new Set(waiting(all));
  return (
    <>
      <Scroller label="Table of cleanings">
        <table class="cleanings stacked">
          <caption>Resistances in {resistanceUnit}, ± one standard uncertainty</caption>
          <thead><tr>{everywhere && <><th scope="col">line</th><th scope="col">effect</th></>}<th scope="col">from</th><th scope="col">lasted</th>
            <th scope="col">kind</th><th scope="col">what it brought</th><th scope="col">removed</th><th scope="col">left</th><th scope="col"><span class="unseen">change the entry</span></th></tr></thead>
          <tbody>{sorted.slice(0, most.value).map(c => {
            const key = c.id ?? `${c.line} ${c.effect} ${c.start}`, start = Date.parse(c.start), end = c.end === null ? null : Date.parse(c.end);
            const { words, why } = verdictWords(c), surface = surfaceWords(c), r = c.result, entry = c.id === null ? null : { ...c, id: c.id } as Entry;
            return <Fragment key={key}>
              <tr class={c.known_by === 'rejected' ? 'cleaning-rejected' : undefined}>
                {everywhere && <><td data-name="line">{c.line}</td><th scope="row"><Link href={pages.effect(c.line, c.effect)}>{c.effect}</Link></th></>}
                <td class="time" data-name="from">{moment(start, zone.value, now)}</td>
                <td class="time" data-name="lasted">{end === null ? <b>goes on</b> : duration(end - start)}</td>
                <td class="note" data-name="kind">{c.known_by === 'logged' ? c.kind : knownWords(c)}{surface !== null && <>, body {surface}</>}{c.note && <span class="quiet cleaning-note">{c.note}</span>}</td>
                <td class="verdict"><VerdictMark of={c} /><span>{c.result?.verdict === 'did not clean' ? <b>{words}</b> : words}{why !== '' && <span class="quiet">: {why}</span>}</span></td>
                <td class="number" data-name="removed">{r === null || r.removed_share === null ? '–' : <>{resistance(r.removed_m2k_w)} ({percent(r.removed_share)})</>}</td>
                <td class="number" data-name="left">{r === null ? '–' : resistance(r.left_m2k_w) ?? '–'}</td>
                <td class="entry-buttons">{asked.has(c) && (everywhere ? <a href="#asked">Was it a cleaning?</a> : <Link href={pages.cleanings}>Was it a cleaning?</Link>)}{entry && open.value !== key && <EntryButtons of={entry} focus={returned.value === key} correct={() => { open.value = key; }} />}</td>
              </tr>
              {entry && open.value === key && <tr class="more"><td colSpan={columns}><CorrectionForm of={entry} done={stands => { [open.value, returned.value] = [null, stands.id]; }} /></td></tr>}
            </Fragment>;
          })}</tbody>
        </table>
      </Scroller>
      {sorted.length > most.value && <button type="button" class="more" onClick={() => { most.value += 200; }}>Show {Math.min(200, sorted.length - most.value)} more</button>}
    </>
  );
}
