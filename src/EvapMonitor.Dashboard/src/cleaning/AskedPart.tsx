import { useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { useEffect, useRef } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { addresses, pages } from '../api/addresses';
import { send } from '../api/request';
import type { Cleaning } from '../api/types';
import { announce } from '../parts/Announcer';
import { now } from '../site/clock';
import { cleaningsChanged, zone } from '../site/state';
import { askedWords } from '../words/cleaning';
import { CleaningFields } from './CleaningFields';
import { draftOf } from './draft';
import { entryName } from './EntryActions';
import { freshKey } from './key';
import { Undo } from './Undo';
import { failureWords, useDraft, type Entry } from './use-draft';

interface Answer { entry: Entry; cleaned: boolean }

/** Recognised cleanings that nobody logged: each waits for a person's word. An answer can be taken back for ten seconds. */
export function AskedPart({ asked }: { asked: readonly Cleaning[] }) {
  const answers = useSignal<Answer[]>([]);
  if (asked.length === 0 && answers.value.length === 0) return null;
  const answered = (entry: Entry, cleaned: boolean) => {
    answers.value = [...answers.peek(), { entry, cleaned }];
    announce(`${cleaned ? 'Logged as a cleaning' : 'Logged: no cleaning'}: ${entryName(entry)}. It can be taken back for ten seconds.`);
  };
  return (
    <section class="asked" aria-labelledby="asked">
      <h2 id="asked">Nobody logged these: were they cleanings?</h2>
      {answers.value.map(({ entry, cleaned }) => <Said key={entry.id}>
        <Undo id={entry.id} said={<><b>{cleaned ? 'Logged as a cleaning' : 'Logged: no cleaning'}</b>: {entryName(entry)}{cleaned && `, ${entry.kind}`}. </>}
          back={`Taken back: ${entryName(entry)} waits for an answer again.`} next="Close" done={() => {
            answers.value = answers.peek().filter(a => a.entry.id !== entry.id);
            document.getElementById('content')?.focus({ preventScroll: true });
          }} />
      </Said>)}
      <ul>{asked.map(c => <li key={`${c.line} ${c.effect} ${c.start}`}><Question of={c} answered={answered} /></li>)}</ul>
    </section>
  );
}

/** Takes the focus, which stood on a button that is gone. */
function Said({ children }: { children: ComponentChildren }) {
  const element = useRef<HTMLDivElement>(null);
  useEffect(() => element.current?.querySelector('button')?.focus(), []);
  return <div ref={element}>{children}</div>;
}

function Question({ of, answered }: { of: Cleaning; answered(entry: Entry, cleaned: boolean): void }) {
  const opened = useSignal(false), failure = useSignal<string | null>(null), sending = useSignal(false), key = useRef(freshKey());
  const { head, rest } = askedWords(of, zone.value, now.value), name = <span class="unseen">: {entryName(of)}</span>;
  const reject = async () => {
    if (sending.peek()) return;
    [sending.value, failure.value] = [true, null];
    try {
      const answer = await send(addresses.cleanings(), {
        method: 'POST', headers: { 'content-type': 'application/json', 'idempotency-key': key.current },
        body: JSON.stringify({ line: of.line, effect: of.effect, start: of.start, end: of.end, kind: '', note: '', body: of.body, rejected: true }),
      });
      answered(await answer.json() as Entry, false);
      cleaningsChanged.value++;
    } catch (error) { failure.value = failureWords(error, false); } finally { sending.value = false; }
  };
  return (
    <>
      <p class="say"><Link href={pages.effect(of.line, of.effect)}>{of.effect}</Link> of {of.line} <b>{head}</b>{rest}</p>
      {opened.value
        ? <ConfirmForm of={of} done={entry => answered(entry, true)} close={() => { opened.value = false; }} />
        : <p class="asked-answers"><button type="button" onClick={() => { opened.value = true; }}>It was cleaned{name}</button>{' '}
          <button type="button" disabled={sending.value || of.end === null} onClick={() => void reject()}>It was not{name}</button></p>}
      {failure.value && <p class="wrong" role="alert">{failure.value}</p>}
    </>
  );
}

/** Asks the plant's word; the times are those of the recovery and may be changed. */
function ConfirmForm({ of, done, close }: { of: Cleaning; done(entry: Entry): void; close(): void }) {
  const form = useDraft(() => ({ draft: draftOf(of, now.peek(), zone.peek()), key: freshKey() }), { method: 'POST', address: addresses.cleanings(), kept: false }, done);
  useEffect(() => form.element.current?.querySelector<HTMLElement>('input[type=text]')?.focus(), []);
  return (
    <form ref={form.element} class="log-form" noValidate aria-label={`The cleaning ${entryName(of)}`} onSubmit={event => void form.submit(event)}>
      <CleaningFields draft={form.draft} errors={form.errors} lines={null} prefix={`asked-${of.line}-${of.effect}-${Date.parse(of.start)}`} open={false} change={form.change} />
      {form.failure && <p class="wrong" role="alert">{form.failure}</p>}
      <p><button type="submit" class="main" disabled={form.sending}>{form.sending ? 'Sending' : 'Log it as cleaned'}</button>{' '}<button type="button" onClick={close}>Not now</button></p>
    </form>
  );
}
