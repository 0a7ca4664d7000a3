import type { ComponentChildren } from 'preact';
import type { Resource } from '../api/resource';
import { calmNow, now, serviceTime } from '../site/clock';
import { zone } from '../site/state';
import { duration } from '../words/duration';
import { moment } from '../words/time';

/** Shows what a resource holds; while it does not, or no longer does, says since when and what to do. `what` begins a sentence: "The cleanings". */
export function Shown<T>({ of, what, children }: { of: Resource<T>; what: string; children: (value: T) => ComponentChildren }) {
  const { value, asOf, failure } = of.state.value;
  return (
    <>
      {failure && <div class="notice" role="alert">
        <p>
          <b>{what} could not be fetched</b>: {failure.words}, since {moment(serviceTime(failure.since), zone.value, calmNow.value)}.{' '}
          {value !== null && asOf !== null && <>Shown here as of {moment(serviceTime(asOf), zone.value, calmNow.value)}. </>}
          It is tried again by itself.{' '}
          <button type="button" onClick={() => void of.load()}>Try now</button>
        </p>
      </div>}
      {value !== null ? children(value) : !failure && <Loading of={of} what={what} />}
    </>
  );
}

function Loading<T>({ of, what }: { of: Resource<T>; what: string }) {
  const since = of.state.value.loadingSince;
  const waited = since === null ? 0 : now.value - serviceTime(since);
  // Most answers come at once; words that flash by help nobody.
  return <p class="quiet loading" aria-busy="true">{what} {what.endsWith('s') ? 'are' : 'is'} on the way{waited >= 2000 && `, asked for ${duration(waited)} ago; after 30 s it is asked again`}.</p>;
}
