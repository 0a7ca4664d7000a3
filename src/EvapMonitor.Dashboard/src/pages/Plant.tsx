import { addresses } from '../api/addresses';
import type { Import, PlantRevision, Revision } from '../api/types';
import { useResource } from '../api/use-resource';
import { Scroller } from '../parts/Scroller';
import { Shown } from '../parts/Waiting';
import { Upload } from '../parts/Upload';
import { useTitle } from '../parts/use-title';
import { PlantForm } from '../plant/PlantForm';
import { Recomputations } from '../plant/Recomputations';
import { Revisions } from '../plant/Revisions';
import { calmNow } from '../site/clock';
import { eventsMissed, imports, plantChanged, recomputations, site, zone } from '../site/state';
import { bytes, count, fixed } from '../words/number';
import { fullMoment, moment } from '../words/time';
import { useEffect } from 'preact/hooks';

/** What does the program assume, and what was brought in? */
export function Plant() {
  useTitle('Plant');
  const plant = useResource<PlantRevision>(addresses.plant);
  const revisions = useResource<{ revisions: Revision[] }>(addresses.revisions);
  const revision = site.state.value.value?.plant_revision ?? null;
  useEffect(() => { const known = plant.state.peek().value; if (known && revision !== null && known.revision !== revision) { void plant.load(); void revisions.load(); } }, [revision]);
  const changes = eventsMissed.value + plantChanged.value;
  useEffect(() => {
    if (plant.state.peek().value) { void plant.load(); void revisions.load(); }
    void recomputations.load();
  }, [changes]);
  // Days computed under a revision grow as a recomputation goes on; its end is soon enough.
  const running = (recomputations.state.value.value?.recomputations ?? []).filter(r => r.state === 'running').length;
  useEffect(() => { if (revisions.state.peek().value) void revisions.load(); }, [running]);
  return (
    <section class="page">
      <h1 class="page-name">Plant</h1>
      <h2>Imports</h2>
      <Upload />
      <Shown of={imports} what="The imports">
        {({ imports: all }) => (all.length === 0 ? <p class="quiet">No file has been imported yet.</p> : <Imports all={all} />)}
      </Shown>
      <h2>Days computed anew</h2>
      <Shown of={recomputations} what="The recomputations">
        {({ recomputations: all }) => (all.length === 0 ? <p class="quiet">No day has been computed anew yet.</p> : <Recomputations all={all} />)}
      </Shown>
      <h2>Plant files</h2>
      <Shown of={revisions} what="The plant files">
        {({ revisions: all }) => <><Revisions all={all} /><PlantForm all={all} /></>}
      </Shown>
      <h2>Plant file in force</h2>
      <Shown of={plant} what="The plant file">
        {p => <>
          <p>Revision {p.revision}, accepted {fullMoment(Date.parse(p.accepted_at), zone.value)}{p.author && <> from {p.author}</>}
            {p.in_force_from && <>, in force from {fullMoment(Date.parse(p.in_force_from), zone.value)}</>}.</p>
          <pre class="plant-file" tabIndex={0} role="region" aria-label="Text of the plant file">{p.text}</pre>
        </>}
      </Shown>
    </section>
  );
}

const stateWords: Record<Import['state'], string> = { waiting: 'waits', running: 'running', done: 'done', failed: 'failed', cancelled: 'cancelled' };

function Imports({ all }: { all: Import[] }) {
  const now = calmNow.value;
  return (
    <Scroller label="Table of imports">
      <table>
        <thead><tr><th scope="col">file</th><th scope="col">state</th><th scope="col" class="number">readings accepted</th><th scope="col" class="number">repeated</th>
          <th scope="col" class="number">differing</th><th scope="col" class="number">rejected rows</th><th scope="col" class="number">not in plant</th><th scope="col">begun</th></tr></thead>
        <tbody>{all.map(i => <>
          <tr key={i.id}>
            <th scope="row" class="signal">{i.name}<span class="quiet"> {bytes(i.bytes_total)}</span></th><td>{stateWords[i.state]}</td>
            <td class="number">{fixed(i.accepted)}</td><td class="number">{fixed(i.repeated)}</td><td class="number">{fixed(i.differing)}</td>
            <td class="number">{fixed(i.rejected)}</td><td class="number">{fixed(i.not_in_plant)}</td>
            <td class="time">{i.started_at === null ? '' : moment(Date.parse(i.started_at), zone.value, now)}</td>
          </tr>
          {(i.error !== null || i.problems.length > 0 || i.unknown_signals.length > 0) && <tr key={`${i.id} problems`} class="more"><td colSpan={8}><Problems of={i} /></td></tr>}
        </>)}</tbody>
      </table>
    </Scroller>
  );
}

function Problems({ of }: { of: Import }) {
  const found = of.problems.length + of.unknown_signals.length;
  return (
    <>
      {of.error !== null && <p class="wrong">It failed: {of.error}</p>}
      {found > 0 && <details>
        <summary>{[of.problems.length > 0 && count(of.problems.length, 'problem'), of.unknown_signals.length > 0 && count(of.unknown_signals.length, 'unknown signal')]
          .filter(Boolean).join(', ')}<span class="unseen"> of {of.name}</span></summary>
        <ul>
          {of.problems.map(p => <li>line {p.line}: {p.reason}</li>)}
          {of.rejected > of.problems.length && of.problems.length > 0 && <li>and {fixed(of.rejected - of.problems.length)} more</li>}
          {of.unknown_signals.map(u => <li>signal {u.name} is in no plant file: {count(u.count, 'reading')} counted, not stored</li>)}
        </ul>
      </details>}
    </>
  );
}
