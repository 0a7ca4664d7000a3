import { useSignal } from '@preact/signals';
import { useEffect, useRef } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { send } from '../api/request';
import type { Cleaning } from '../api/types';
import { announce } from '../parts/Announcer';
import { now } from '../site/clock';
import { cleaningsChanged, zone } from '../site/state';
import { moment } from '../words/time';
import { CleaningFields } from './CleaningFields';
import { draftOf } from './draft';
import { freshKey } from './key';
import { failureWords, useDraft, type Entry } from './use-draft';

/** What an entry of the log is called when several could be meant. */
export const entryName = (c: Cleaning) => `${c.effect}, ${moment(Date.parse(c.start), zone.peek(), now.peek())}`;

/** The buttons of an entry in the log. `focus`: its correction was just closed, so the focus comes back here. */
export function EntryButtons({ of, focus, correct }: { of: Entry; focus: boolean; correct(): void }) {
  const first = useRef<HTMLButtonElement>(null);
  useEffect(() => { if (focus) first.current?.focus(); }, []);
  const asks = useSignal(false), failure = useSignal<string | null>(null);
  const rejected = of.known_by === 'rejected', name = <span class="unseen"> the entry {entryName(of)}</span>;
  const withdraw = async () => {
    failure.value = null;
    try {
      await send(addresses.cleaning(of.id), { method: 'DELETE' });
      announce(rejected ? `Taken back: ${entryName(of)} is open again.` : `Withdrawn: ${entryName(of)} no longer counts as cleaned by this entry.`);
      cleaningsChanged.value++;
    } catch (error) { failure.value = failureWords(error, false); }
  };
  if (rejected) return <><button type="button" onClick={() => void withdraw()}>Take back{name}</button>{failure.value && <p class="wrong" role="alert">{failure.value}</p>}</>;
  return (
    <>
      {asks.value
        ? <span role="group" aria-label={`Withdraw ${entryName(of)}`}>Results are computed anew without it.{' '}
          <button type="button" onClick={() => void withdraw()}>Withdraw it</button>{' '}<button type="button" onClick={() => { asks.value = false; }}>Keep it</button></span>
        : <><button type="button" ref={first} onClick={correct}>Correct{name}</button>{' '}<button type="button" onClick={() => { asks.value = true; }}>Withdraw{name}</button></>}
      {failure.value && <p class="wrong" role="alert">{failure.value}</p>}
    </>
  );
}

/** The form that puts a corrected entry in the place of a logged one. */
export function CorrectionForm({ of, done }: { of: Entry; done(entry: Entry): void }) {
  const form = useDraft(() => ({ draft: draftOf(of, now.peek(), zone.peek()), key: freshKey() }), { method: 'PUT', address: addresses.cleaning(of.id), kept: false }, entry => {
    announce(`Corrected: ${entryName(entry)}.`);
    done(entry);
  });
  useEffect(() => form.element.current?.querySelector<HTMLElement>('select, input')?.focus(), []);
  return (
    <form ref={form.element} class="log-form correction" noValidate aria-label={`Correct the entry ${entryName(of)}`} onSubmit={event => void form.submit(event)}>
      <CleaningFields draft={form.draft} errors={form.errors} lines={null} prefix={of.id} open change={form.change} />
      {form.failure && <p class="wrong" role="alert">{form.failure}</p>}
      <p><button type="submit" class="main" disabled={form.sending}>{form.sending ? 'Sending' : 'Put it right'}</button>{' '}<button type="button" onClick={() => done(of)}>Leave it as it was</button></p>
    </form>
  );
}
