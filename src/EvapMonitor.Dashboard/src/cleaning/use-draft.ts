import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { RequestFailure, send } from '../api/request';
import type { Cleaning } from '../api/types';
import { now } from '../site/clock';
import { cleaningsChanged, zone } from '../site/state';
import { inSiteTime } from '../words/time';
import { check, type Checked, type Draft } from './draft';
import { freshKey, keep } from './key';

export interface Kept { draft: Draft; key: string }

/** A cleaning that is in the log. */
export type Entry = Cleaning & { id: string };

/** Where a draft goes. `kept`: what could not be sent is kept over a reload. */
export interface Destination { method: 'POST' | 'PUT'; address: string; kept: boolean }

/** A form's draft: what is typed, what is wrong with it, and sending it. A retry of the same content never counts twice. */
export function useDraft(first: () => Kept, to: Destination, done: (entry: Entry) => void) {
  const form = useSignal<Kept | null>(null), errors = useSignal<Checked['errors']>(null), failure = useSignal<string | null>(null), sending = useSignal(false);
  const element = useRef<HTMLFormElement>(null);
  if (form.peek() === null) form.value = first();

  // Another content is another cleaning, so it gets another key; the same content keeps its key for a retry.
  const change = (part: Partial<Draft>) => {
    form.value = { draft: { ...form.peek()!.draft, ...part }, key: freshKey() };
    if (to.kept && failure.peek() !== null) keep(form.peek());
    // What has been put right stops being called wrong; nothing new is called wrong while it is typed.
    const wrong = check(form.peek()!.draft, zone.peek(), now.peek()).errors;
    if (errors.peek()) errors.value = Object.fromEntries(Object.entries(errors.peek()!).filter(([field]) => wrong?.[field as keyof typeof wrong]));
  };

  const submit = async (event: Event) => {
    event.preventDefault();
    if (sending.peek()) return;
    failure.value = null;
    const checked = check(form.peek()!.draft, zone.peek(), now.peek());
    errors.value = checked.errors;
    if (checked.cleaning === null) {
      setTimeout(() => element.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus());
      return;
    }
    sending.value = true;
    if (to.kept) keep(form.peek());
    try {
      const answer = await send(to.address, { method: to.method, headers: { 'content-type': 'application/json', 'idempotency-key': form.peek()!.key }, body: JSON.stringify(checked.cleaning) });
      const entry = await answer.json() as Entry;
      if (to.kept) keep(null);
      form.value = first();
      cleaningsChanged.value++;
      done(entry);
    } catch (error) { failure.value = failureWords(error, to.kept); } finally { sending.value = false; }
  };
  return { draft: form.value!.draft, change, errors: errors.value, failure: failure.value, sending: sending.value, submit, element };
}

/** What went wrong with sending an entry, and what becomes of it. */
export function failureWords(error: unknown, kept: boolean): string {
  const known = error instanceof RequestFailure ? error : null;
  return known?.answered
    ? `${known.status === 409 ? 'It overlaps a cleaning already in the log' : 'It was not taken'}: ${inSiteTime(known.message.replace(/\.$/, ''), zone.peek(), now.peek())}.`
    : `It was not sent: ${known?.message ?? 'the answer could not be read'}. ${kept ? 'It is kept here; send' : 'Send'} it again when the service answers. A repeat is never counted twice.`;
}
