import type { UnknownSignal } from '../api/types';
import { zone } from '../site/state';
import { fixed } from '../words/number';
import { moment } from '../words/time';

/** Signals that come in and that no plant file names. */
export function UnknownSignals({ all, now }: { all: UnknownSignal[]; now: number }) {
  if (all.length === 0) return null;
  return (
    <section class="line instruments" aria-labelledby="unknown">
      <h2 class="line-name" id="unknown">not in the plant</h2>
      <div>
        <p class="say">Signals that no plant file names. <b>Name them in the plant file</b>, or stop sending them; their readings are counted, not stored.</p>
        <table class="signals">
          <thead><tr><th scope="col">signal</th><th scope="col" class="number">readings</th><th scope="col">last seen</th><th scope="col">from</th></tr></thead>
          <tbody>{all.map(u => <tr key={`${u.source} ${u.name}`}><th scope="row" class="signal">{u.name}</th><td class="number" data-name="readings">{fixed(u.count)}</td>
            <td data-name="last seen">{u.last_seen === null ? '' : moment(Date.parse(u.last_seen), zone.value, now)}</td><td data-name="from">{u.source ?? ''}</td></tr>)}</tbody>
        </table>
      </div>
    </section>
  );
}
