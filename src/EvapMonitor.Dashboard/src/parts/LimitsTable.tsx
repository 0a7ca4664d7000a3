import type { Effect } from '../api/types';
import { zone } from '../site/state';
import { limitName } from '../words/due';
import { against } from '../words/effect';
import { moment } from '../words/time';

/** Each limit that the plant file sets, against the present. `fresh`: the readings are live. */
export function LimitsTable({ effect, now, fresh }: { effect: Effect; now: number; fresh: boolean }) {
  if (effect.due.evidence.length === 0) return <p class="quiet">The plant file sets no limit for {effect.name}.</p>;
  return (
    <table class="limits">
      <thead><tr><th scope="col">limit</th><th scope="col">now against its bound</th><th scope="col">state</th></tr></thead>
      <tbody>{effect.due.evidence.map(e => {
        const words = against(e.value, e.bound, e.unit);
        return <tr key={e.limit}>
          <th scope="row">{limitName(e.limit)}</th><td>{e.value === null ? <>not known, bound</> : <><b>{words.value}</b> against</>} {words.bound} {words.unit}</td>
          <td>{e.state === 'due' ? <b>{fresh ? 'due' : 'was due'}{e.since && ` since ${moment(Date.parse(e.since), zone.value, now)}`}</b> : fresh || e.state !== 'not due' ? e.state : 'was not due'}</td>
        </tr>;
      })}</tbody>
    </table>
  );
}
