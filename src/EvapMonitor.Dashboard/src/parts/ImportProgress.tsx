import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { Import } from '../api/types';
import { now } from '../site/clock';
import { imports } from '../site/state';
import { waiting } from '../site/waiting';
import { useSignal } from '@preact/signals';
import { duration, timeLeft } from '../words/duration';
import { count, fixed, significant } from '../words/number';

/** Work under way: files being read and days waiting for evaluation, with share, rate, time left and a way to stop. */
export function ImportProgress() {
  const running = (imports.state.value.value?.imports ?? []).filter(i => i.state === 'running' || i.state === 'waiting');
  const days = waiting.value;
  if (running.length === 0 && days === null) return null;
  return (
    <section class="work" aria-label="Work under way">
      {running.map(i => <Running key={i.id} one={i} />)}
      {days && <p>
        <b>{count(days.days, 'day')} of readings {days.days === 1 ? 'waits' : 'wait'} for evaluation</b>
        {days.daysPerMinute !== null && <>, {significant(days.daysPerMinute, 2)} a minute, {timeLeft(days.secondsLeft)}</>}
        {days.daysPerMinute === null && now.value - days.since > 60_000 && <>, for {duration(now.value - days.since)}</>}. Results appear as they are ready.
      </p>}
    </section>
  );
}

function Running({ one }: { one: Import }) {
  const failure = useSignal<string | null>(null);
  const asked = useSignal(false);
  const share = one.bytes_total > 0 ? Math.min(1, one.bytes_read / one.bytes_total) : null;
  const cancel = async () => {
    asked.value = true;
    failure.value = null;
    try { await send(addresses.cancelImport(one.id), { method: 'POST' }); void imports.load(); }
    catch (error) { asked.value = false; failure.value = error instanceof RequestFailure ? error.message : String(error); }
  };
  return (
    <div class="work-one">
      <p id={`work-${one.id}`}>
        <b>{one.state === 'waiting' ? 'Waits to be imported' : 'Importing'}</b> {one.name}
        {one.state === 'running' && <>{share !== null && `: ${Math.floor(share * 100)} %`}
          {one.rows_per_s !== null && one.rows_per_s > 0 && `, ${fixed(Number(one.rows_per_s.toPrecision(2)))} rows/s`}, {timeLeft(one.seconds_left)}</>}
        {one.rejected > 0 && `; ${count(one.rejected, 'row')} rejected so far`}
      </p>
      {share !== null && <progress value={share} max={1} aria-labelledby={`work-${one.id}`} />}
      <button type="button" disabled={asked.value} onClick={() => void cancel()}>{asked.value ? 'Stopping' : 'Cancel'}<span class="unseen"> the import of {one.name}</span></button>
      {failure.value && <p class="wrong" role="alert">It could not be cancelled: {failure.value}.</p>}
    </div>
  );
}
