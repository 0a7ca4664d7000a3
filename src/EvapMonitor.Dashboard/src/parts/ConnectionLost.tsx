import { connection } from '../live/connection';
import { now, serviceTime } from '../site/clock';
import { zone } from '../site/state';
import { duration } from '../words/duration';
import { moment } from '../words/time';

/** Says that nothing on the page changes by itself at present, since when, and that it will heal. A short break is not worth a word. */
export function ConnectionLost() {
  const state = connection.value;
  if (state.state !== 'lost') return null;
  const since = serviceTime(state.since);
  if (now.value - since < 3000) return null;
  return (
    <div class="notice" role="alert">
      <p><b>The connection to the service is lost</b>, since {moment(since, zone.value, now.value)} (<span aria-hidden="true">{duration(now.value - since)}</span>). What
        you see is as of then. The page keeps trying and catches up by itself; if it lasts, see whether the service runs and the network is up.</p>
    </div>
  );
}
