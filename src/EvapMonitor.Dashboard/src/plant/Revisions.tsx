import { useSignal } from '@preact/signals';
import type { Revision } from '../api/types';
import { Scroller } from '../parts/Scroller';
import { zone } from '../site/state';
import { fixed } from '../words/number';
import { fullMoment } from '../words/time';
import { DifferencesOf } from './DifferencesOf';
import { inForceWords } from './start';

/** Every accepted plant file: from when until when, from whom, and what it changed. */
export function Revisions({ all }: { all: Revision[] }) {
  const opened = useSignal<number | null>(null);
  const open = all.find(r => r.revision === opened.value);
  return (
    <>
      <Scroller label="Table of plant files">
        <table>
          <thead><tr><th scope="col" class="number">revision</th><th scope="col">state</th><th scope="col">in force from</th><th scope="col">until</th><th scope="col">from whom, when</th>
            <th scope="col" class="number">days computed under it</th><th scope="col"><span class="unseen">differences</span></th></tr></thead>
          <tbody>{all.map(r => {
            const { from, until } = inForceWords(r, zone.value);
            return (
              <tr key={r.revision}>
                <th scope="row" class="number">{r.revision}</th><td>{r.state === 'in force' ? <b>in force</b> : r.state}</td><td class="time">{from}</td><td class="time">{until}</td>
                <td>{r.author}, {fullMoment(Date.parse(r.accepted_at), zone.value)}</td><td class="number">{fixed(r.days_computed)}</td>
                <td>{all.length > 1 && <button type="button" aria-expanded={opened.value === r.revision}
                  onClick={() => { opened.value = opened.peek() === r.revision ? null : r.revision; }}>Differences<span class="unseen"> of revision {r.revision}</span></button>}</td>
              </tr>
            );
          })}</tbody>
        </table>
      </Scroller>
      {open && <DifferencesOf key={open.revision} one={open} all={all} />}
    </>
  );
}
