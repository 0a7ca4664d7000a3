import { useEffect } from 'preact/hooks';
import { useLocation, useSearch } from 'wouter-preact';
import { addresses } from '../api/addresses';
import type { Cleaning } from '../api/types';
import { useResource } from '../api/use-resource';
import { AskedPart } from '../cleaning/AskedPart';
import { CleaningForm } from '../cleaning/CleaningForm';
import { SurfacesPart } from '../cleaning/SurfacesPart';
import { CleaningsTable } from '../parts/CleaningsTable';
import { Shown } from '../parts/Waiting';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { cleaningsChanged, lines, resultsChanged } from '../site/state';
import { waiting } from '../words/cleaning';

/** Did it work? What waits for an answer, what cleanings brought, the log, and where one is added to it. */
export function Cleanings() {
  useTitle('Cleanings');
  const search = useSearch(), [path, navigate] = useLocation();
  const cleanings = useResource<{ cleanings: Cleaning[] }>(addresses.cleanings());
  const changes = `${cleaningsChanged.value} ${Object.values(resultsChanged.value).join(' ')}`;
  useEffect(() => { if (cleanings.state.peek().value) void cleanings.load(); }, [changes]);
  const names = lines.state.value.value?.lines.map(l => l.name) ?? [];
  const line = names.find(n => n === new URLSearchParams(search).get('line')) ?? '';
  const known = cleanings.state.value.value?.cleanings ?? [], of = line === '' ? known : known.filter(c => c.line === line);
  return (
    <section class="page">
      <h1 class="page-name">Cleanings</h1>
      <p class="jump"><a href="#log-a-cleaning">Log a cleaning</a></p>
      <AskedPart asked={waiting(known)} />
      {names.length > 1 && known.length > 0 && <label class="picker">Show <select value={line} onChange={e => navigate(path + (e.currentTarget.value === '' ? '' : `?line=${encodeURIComponent(e.currentTarget.value)}`), { replace: true })}>
        <option value="">every line</option>
        {names.map(n => <option key={n} value={n}>{n}</option>)}
      </select></label>}
      <SurfacesPart all={of} />
      <h2>Log</h2>
      <Shown of={cleanings} what="The cleanings">
        {({ cleanings: all }) => (all.length === 0
          ? <p class="quiet">No cleaning is known yet. Cleanings of the past can be added too; results are computed anew from then on.</p>
          : of.length === 0 ? <p class="quiet">No cleaning of {line} is known.</p> : <CleaningsTable all={of} now={calmNow.value} everywhere first={20} />)}
      </Shown>
      <h2 id="log-a-cleaning" tabIndex={-1}>Log a cleaning</h2>
      <Shown of={lines} what="The lines">
        {({ lines: all }) => (all.some(l => l.effects.length > 0) ? <CleaningForm lines={all} chosen={null} />
          : <p class="quiet">A cleaning can be logged once a plant file names an effect.</p>)}
      </Shown>
    </section>
  );
}
