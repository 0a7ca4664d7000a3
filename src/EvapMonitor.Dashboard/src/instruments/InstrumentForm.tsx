import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import { Field, TimeField } from '../cleaning/Field';
import { freshKey } from '../cleaning/key';
import { announce } from '../parts/Announcer';
import { now } from '../site/clock';
import { instrumentsChanged, zone } from '../site/state';
import { inSiteTime, toInput } from '../words/time';
import { checkEvent, type CheckedEvent, type InstrumentDraft } from './draft';

/** Logs that an instrument is not to be believed for a time, or that it was set right. */
export function InstrumentForm({ signal }: { signal: string }) {
  const fresh = (): InstrumentDraft => ({
    kind: 'instrument-excluded', start: '', startSecond: false, end: toInput(now.peek(), zone.peek()), endSecond: false, goesOn: true, note: '',
  });
  const form = useSignal(fresh()), key = useSignal(freshKey()), failure = useSignal<string | null>(null), sending = useSignal(false);
  const errors = useSignal<CheckedEvent['errors']>(null), element = useRef<HTMLFormElement>(null);
  const draft = form.value, excluded = draft.kind === 'instrument-excluded';
  // Another content is another entry, so it gets another key; the same content keeps its key for a retry.
  const change = (part: Partial<InstrumentDraft>) => { form.value = { ...form.peek(), ...part }; key.value = freshKey(); errors.value = null; };

  const submit = async (event: Event) => {
    event.preventDefault();
    if (sending.peek()) return;
    failure.value = null;
    const checked = checkEvent(signal, form.peek(), zone.peek(), now.peek());
    errors.value = checked.errors;
    if (checked.event === null) {
      setTimeout(() => element.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
      return;
    }
    sending.value = true;
    try {
      await send(addresses.instrumentLog(), { method: 'POST', headers: { 'content-type': 'application/json', 'idempotency-key': key.peek() }, body: JSON.stringify(checked.event) });
      announce(excluded ? `Logged: ${signal} is excluded. What it touches is computed anew.` : `Logged: ${signal} was set right.`);
      form.value = fresh();
      key.value = freshKey();
      instrumentsChanged.value++;
    } catch (error) {
      failure.value = error instanceof RequestFailure && error.answered ? `It was not taken: ${inSiteTime(error.message, zone.peek(), now.peek())}`
        : 'It was not sent; send it again when the service answers. A repeat is never counted twice.';
    } finally { sending.value = false; }
  };

  return (
    <form ref={element} class="log-form" noValidate onSubmit={event => void submit(event)}>
      <fieldset class="field"><legend>What is to be logged of {signal}?</legend>
        <label class="tick"><input type="radio" name={`kind-${signal}`} checked={excluded} onChange={() => change({ kind: 'instrument-excluded' })} /> Excluded: its readings do not count. Every window they touch is computed anew without them.</label>
        <label class="tick"><input type="radio" name={`kind-${signal}`} checked={!excluded} onChange={() => change({ kind: 'recalibration' })} /> Set right (recalibrated): no window changes, but nothing is compared across it.</label>
      </fieldset>
      <TimeField name="start" label={excluded ? 'From' : 'When'} value={draft.start} second={draft.startSecond} error={errors.value?.start} zone={zone.value} change={(start, startSecond) => change({ start, startSecond })} />
      {excluded && <label class="tick"><input type="checkbox" checked={draft.goesOn} onChange={e => change({ goesOn: e.currentTarget.checked })} /> Until further notice</label>}
      {excluded && !draft.goesOn && <TimeField name="end" label="To" value={draft.end} second={draft.endSecond} error={errors.value?.end} zone={zone.value} change={(end, endSecond) => change({ end, endSecond })} />}
      <Field name="note" label="Note (may stay empty)" error={errors.value?.note}>
        {props => <textarea {...props} rows={2} maxLength={2000} value={draft.note} onInput={e => change({ note: e.currentTarget.value })} />}
      </Field>
      {failure.value && <p class="wrong" role="alert">{failure.value}</p>}
      <button type="submit" class="main" disabled={sending.value}>{sending.value ? 'Sending' : excluded ? `Exclude ${signal}` : 'Log that it was set right'}</button>
    </form>
  );
}
