import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { AcceptedRevision, PlantProblem, Revision } from '../api/types';
import { Field } from '../cleaning/Field';
import { announce } from '../parts/Announcer';
import { Scroller } from '../parts/Scroller';
import { recomputations, zone } from '../site/state';
import { count } from '../words/number';
import { dayStart, startWords, whyNotStart, type Start } from './start';

/** Takes a corrected or changed plant file. */
export function PlantForm({ all }: { all: Revision[] }) {
  const file = useSignal<File | null>(null);
  const start = useSignal<Start>({ changed: false, day: '' });
  const sending = useSignal(false);
  const errors = useSignal<{ file?: string; day?: string }>({});
  const said = useSignal<{ words: string; wrong: boolean; problems: PlantProblem[] } | null>(null);
  const form = useRef<HTMLFormElement>(null);
  const inForce = all.find(r => r.state === 'in force');

  const submit = async (event: Event) => {
    event.preventDefault();
    if (sending.peek()) return;
    const day = whyNotStart(start.peek());
    errors.value = { ...(file.peek() === null && { file: 'Choose the plant file.' }), ...(day !== null && { day }) };
    said.value = null;
    const chosen = file.peek();
    if (chosen === null || day !== null) return;
    sending.value = true;
    try {
      const from = start.peek().changed ? dayStart(start.peek().day) : null;
      const answer = await send(addresses.acceptPlant(from), { method: 'POST', headers: { 'content-type': 'application/yaml' }, body: chosen });
      const accepted = await answer.json() as AcceptedRevision;
      const days = accepted.recomputation?.days_total ?? 0;
      const words = !accepted.is_new ? `Nothing changed: this file holds then already, as revision ${accepted.revision.revision}.`
        : `Accepted as revision ${accepted.revision.revision}. ${days === 0 ? 'It touches no day with readings.' : `${count(days, 'day')} of readings ${days === 1 ? 'is' : 'are'} computed anew under it; until then each day shows its earlier results.`}`;
      said.value = { words, wrong: false, problems: [] };
      if (accepted.is_new) { file.value = null; form.current?.reset(); start.value = { changed: false, day: '' }; }
      void recomputations.load();
    } catch (error) {
      const known = error instanceof RequestFailure ? error : null;
      const words = known?.answered ? `${chosen.name} was not taken: ${known.message.replace(/\.$/, '')}.`
        : `It was not sent: ${known?.message ?? 'the answer could not be read'}. Sending it again does no harm.`;
      said.value = { words, wrong: true, problems: known?.problem?.problems ?? [] };
    } finally {
      sending.value = false;
      if (said.peek()) announce(said.peek()!.words);
    }
  };

  return (
    <details class="log">
      <summary>Give a corrected or changed plant file</summary>
      <form ref={form} class="log-form" noValidate onSubmit={event => void submit(event)}>
        <Field name="plant-file" label="Plant file (.yaml)" error={errors.value.file}>
          {props => <input {...props} type="file" accept=".yaml,.yml,text/yaml,application/yaml"
            onChange={event => { file.value = event.currentTarget.files?.[0] ?? null; errors.value = {}; said.value = null; }} />}
        </Field>
        <fieldset class="field">
          <legend>From when it holds</legend>
          <label class="tick"><input type="radio" name="plant-start" checked={!start.value.changed} onChange={() => { start.value = { ...start.peek(), changed: false }; }} /> It corrects the file in force: the plant was always so</label>
          <label class="tick"><input type="radio" name="plant-start" checked={start.value.changed} onChange={() => { start.value = { ...start.peek(), changed: true }; }} /> The plant was changed, or will be</label>
        </fieldset>
        {start.value.changed && <Field name="plant-day" label="In force from the UTC day" error={errors.value.day}>
          {props => <input {...props} type="date" value={start.value.day} onInput={event => { start.value = { changed: true, day: event.currentTarget.value }; errors.value = {}; }} />}
        </Field>}
        <p class="quiet">{startWords(start.value, inForce, zone.value)}</p>
        <button type="submit" class="main" disabled={sending.value}>{sending.value ? 'Sending' : 'Give this file'}</button>
      </form>
      {said.value && <p class={said.value.wrong ? 'wrong' : 'quiet'}>{said.value.words}</p>}
      {said.value && said.value.problems.length > 0 && <Mistakes of={said.value.problems} />}
    </details>
  );
}

function Mistakes({ of }: { of: PlantProblem[] }) {
  return (
    <Scroller label="Mistakes in the plant file">
      <table>
        <thead><tr><th scope="col" class="number">line</th><th scope="col" class="number">column</th><th scope="col">where</th><th scope="col">found</th><th scope="col">allowed</th></tr></thead>
        <tbody>{of.map(p => <tr key={`${p.line}:${p.column} ${p.path}`}>
          <td class="number">{p.line}</td><td class="number">{p.column}</td><td class="signal">{p.path || 'the file'}</td><td>{p.found}</td><td>{p.allowed}</td>
        </tr>)}</tbody>
      </table>
    </Scroller>
  );
}
