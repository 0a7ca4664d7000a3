import { useSignal } from '@preact/signals';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { Recomputation } from '../api/types';
import { Scroller } from '../parts/Scroller';
import { calmNow } from '../site/clock';
import { recomputations, zone } from '../site/state';
import { moment } from '../words/time';
import { spanWords, stateWords } from './recomputation';

/** Days computed anew: why, which, how far; to be stopped and gone on with. */
export function Recomputations({ all }: { all: Recomputation[] }) {
  return (
    <Scroller label="Table of days computed anew">
      <table>
        <thead><tr><th scope="col">why</th><th scope="col">days (UTC)</th><th scope="col">how far</th><th scope="col">begun</th><th scope="col"><span class="unseen">stop or go on</span></th></tr></thead>
        <tbody>{all.map(r => <Row key={r.id} one={r} />)}</tbody>
      </table>
    </Scroller>
  );
}

function Row({ one }: { one: Recomputation }) {
  const asked = useSignal(false);
  const failure = useSignal<string | null>(null);
  const turn = async (what: 'cancel' | 'resume') => {
    asked.value = true;
    failure.value = null;
    try { await send(addresses.turnRecomputation(one.id, what), { method: 'POST' }); await recomputations.load(); }
    catch (error) { failure.value = error instanceof RequestFailure ? error.message : String(error); }
    finally { asked.value = false; }
  };
  const name = `recomputation-${one.id}`;
  return (
    <tr>
      <th scope="row" id={name}>{one.why}</th>
      <td>{spanWords(one)}</td>
      <td class="far">
        {stateWords(one)}
        {one.state === 'running' && <progress value={one.days_done} max={Math.max(1, one.days_total)} aria-labelledby={name} />}
      </td>
      <td class="time">{moment(Date.parse(one.started_at), zone.value, calmNow.value)}</td>
      <td>
        {one.state === 'running' && <button type="button" disabled={asked.value} onClick={() => void turn('cancel')}>Stop<span class="unseen"> what began so: {one.why}</span></button>}
        {one.state === 'cancelled' && one.days_left > 0 && <button type="button" disabled={asked.value} onClick={() => void turn('resume')}>Go on<span class="unseen"> with what began so: {one.why}</span></button>}
        {failure.value && <p class="wrong" role="alert">That did not work: {failure.value}.</p>}
      </td>
    </tr>
  );
}
