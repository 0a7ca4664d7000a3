import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { Cleaning, Line } from '../api/types';
import { announce } from '../parts/Announcer';
import { now } from '../site/clock';
import { cleaningsChanged, zone } from '../site/state';
import { inSiteTime, toInput } from '../words/time';
import { Cautions } from './Cautions';
import { check, type Draft } from './draft';
import { Field, TimeField } from './Field';
import { freshKey, keep, recall } from './key';
import { Undo } from './Undo';

interface Kept { draft: Draft; key: string }

/** Logs a cleaning. `chosen`: the effect whose page this is on; null lets the reader choose. */
export function CleaningForm({ lines, chosen }: { lines: Line[]; chosen: { line: string; effect: string } | null }) {
  const fresh = (): Kept => {
    const at = now.peek();
    const draft: Draft = {
      line: chosen?.line ?? '', effect: chosen?.effect ?? '', start: '', end: toInput(at, zone.peek()), goesOn: false, kind: '', note: '', startSecond: false, endSecond: false,
    };
    return { draft, key: freshKey() };
  };
  const unsent = () => {
    const kept = recall<Kept>();
    return kept && (!chosen || (kept.draft.line === chosen.line && kept.draft.effect === chosen.effect)) ? kept : null;
  };
  const form = useSignal<Kept>(unsent() ?? fresh());
  const errors = useSignal<ReturnType<typeof check>['errors']>(null);
  const failure = useSignal<string | null>(null);
  const sending = useSignal(false);
  const logged = useSignal<(Cleaning & { id: string }) | null>(null);
  const element = useRef<HTMLFormElement>(null);
  const draft = form.value.draft;

  // Another content is another cleaning, so it gets another key; the same content keeps its key for a retry.
  const change = (part: Partial<Draft>) => {
    form.value = { draft: { ...form.peek().draft, ...part }, key: freshKey() };
    if (failure.peek() !== null) keep(form.peek());
    // What has been put right stops being called wrong; nothing new is called wrong while it is typed.
    const wrong = check(form.peek().draft, zone.peek(), now.peek()).errors;
    if (errors.peek()) errors.value = Object.fromEntries(Object.entries(errors.peek()!).filter(([field]) => wrong?.[field as keyof typeof wrong]));
  };

  const submit = async (event: Event) => {
    event.preventDefault();
    if (sending.peek()) return;
    failure.value = null;
    const checked = check(form.peek().draft, zone.peek(), now.peek());
    errors.value = checked.errors;
    if (checked.cleaning === null) {
      setTimeout(() => element.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
      return;
    }
    sending.value = true;
    keep(form.peek());
    try {
      const answer = await send(addresses.cleanings(), {
        method: 'POST', headers: { 'content-type': 'application/json', 'idempotency-key': form.peek().key }, body: JSON.stringify(checked.cleaning),
      });
      logged.value = await answer.json() as Cleaning & { id: string };
      keep(null);
      form.value = fresh();
      cleaningsChanged.value++;
      announce(`Logged: ${checked.cleaning.effect} was cleaned. It can be taken back for ten seconds.`);
    } catch (error) {
      const known = error instanceof RequestFailure ? error : null;
      failure.value = known?.answered
        ? `${known.status === 409 ? 'It overlaps a cleaning already in the log' : 'It was not taken'}: ${inSiteTime(known.message.replace(/\.$/, ''), zone.peek(), now.peek())}.`
        : `It was not sent: ${known?.message ?? 'the answer could not be read'}. It is kept here; send it again when the service answers. A repeat is never counted twice.`;
    } finally { sending.value = false; }
  };

  if (logged.value) return <Undo of={logged.value} done={() => { logged.value = null; }} />;
  return (
    <form ref={element} class="log-form" noValidate onSubmit={event => void submit(event)}>
      {!chosen && <Field name="effect" label="Effect" error={errors.value?.effect}>
        {props => <select {...props} value={`${draft.line}/${draft.effect}`}
          onChange={e => { const [line, effect] = e.currentTarget.value.split('/') as [string, string]; change({ line, effect }); }}>
          <option value="/">choose</option>
          {lines.map(l => <optgroup key={l.name} label={l.name}>{l.effects.map(f => <option key={f.name} value={`${l.name}/${f.name}`}>{f.name}</option>)}</optgroup>)}
        </select>}
      </Field>}
      <TimeField name="start" label="Start" value={draft.start} second={draft.startSecond} error={errors.value?.start} zone={zone.value}
        change={(start, startSecond) => change({ start, startSecond })} />
      {!draft.goesOn && <TimeField name="end" label="End" value={draft.end} second={draft.endSecond} error={errors.value?.end} zone={zone.value}
        change={(end, endSecond) => change({ end, endSecond })} />}
      <label class="tick"><input type="checkbox" checked={draft.goesOn} onChange={e => change({ goesOn: e.currentTarget.checked })} /> The cleaning still goes on</label>
      <Field name="kind" label="Kind, in the words of the plant" error={errors.value?.kind}>
        {props => <>
          <input {...props} type="text" list="kinds" maxLength={60} value={draft.kind} onInput={e => change({ kind: e.currentTarget.value })} />
          <datalist id="kinds"><option value="rinse" /><option value="boil-out" /><option value="chemical" /><option value="mechanical" /></datalist>
        </>}
      </Field>
      <Field name="note" label="Note (may stay empty)" error={errors.value?.note}>
        {props => <textarea {...props} rows={2} maxLength={2000} value={draft.note} onInput={e => change({ note: e.currentTarget.value })} />}
      </Field>
      <Cautions />
      {failure.value && <p class="wrong" role="alert">{failure.value}</p>}
      <button type="submit" class="main" disabled={sending.value}>{sending.value ? 'Sending' : 'Log this cleaning'}</button>
    </form>
  );
}
