import type { Effect } from '../api/types';
import { zone } from '../site/state';
import { limitName } from '../words/due';
import { against } from '../words/effect';
import { moment } from '../words/time';

/** Each limit that the plant file sets, against the present. */
export function LimitsTable({ effect, now }: { effect: Effect; now: number }) {
  if (effect.due.evidence.length === 0) return <p class="quiet">The plant file sets no limit for {effect.name}.</p>;
  return (
    <table class="limits">
      <thead><tr><th scope="col">limit</th><th scope="col">now, and where it is reached</th><th scope="col">state</th></tr></thead>
      <tbody>{effect.due.evidence.map(e => {
        const words = against(e.value, e.bound, e.unit);
        return <tr key={e.limit}>
          <th scope="row">{limitName(e.limit)}</th><td><b>{words.value}</b> of {words.bound} {words.unit}</td>
          <td>{e.state === 'due' ? <b>due{e.since && ` since ${moment(Date.parse(e.since), zone.value, now)}`}</b> : e.state}</td>
        </tr>;
      })}</tbody>
    </table>
  );
}
