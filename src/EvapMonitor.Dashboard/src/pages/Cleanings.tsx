import { useEffect } from 'preact/hooks';
import { addresses } from '../api/addresses';
import type { Cleaning } from '../api/types';
import { useResource } from '../api/use-resource';
import { CleaningForm } from '../cleaning/CleaningForm';
import { CleaningsTable } from '../parts/CleaningsTable';
import { Shown } from '../parts/Waiting';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { cleaningsChanged, lines } from '../site/state';

/** The log of cleanings, and where one is added to it. */
export function Cleanings() {
  useTitle('Cleanings');
  const cleanings = useResource<{ cleanings: Cleaning[] }>(addresses.cleanings());
  const changes = cleaningsChanged.value;
  useEffect(() => { if (cleanings.state.peek().value) void cleanings.load(); }, [changes]);
  return (
    <section class="page">
      <h1 class="page-name">Cleanings</h1>
      <Shown of={lines} what="The lines">
        {({ lines: all }) => (all.some(l => l.effects.length > 0)
          ? <><h2>Log a cleaning</h2><CleaningForm lines={all} chosen={null} /></>
          : <p class="quiet">A cleaning can be logged once a plant file names an effect.</p>)}
      </Shown>
      <h2>Log</h2>
      <Shown of={cleanings} what="The cleanings">
        {({ cleanings: all }) => (all.length === 0
          ? <p class="quiet">No cleaning is logged yet. Cleanings of the past can be added too; results are computed anew from then on.</p>
          : <CleaningsTable all={all} now={calmNow.value} everywhere />)}
      </Shown>
    </section>
  );
}
