import { useSignal } from '@preact/signals';
import { addresses } from '../api/addresses';
import type { Line } from '../api/types';
import { announce } from '../parts/Announcer';
import { Shown } from '../parts/Waiting';
import { now } from '../site/clock';
import { site, zone } from '../site/state';
import { Cautions } from './Cautions';
import { CleaningFields } from './CleaningFields';
import { emptyDraft } from './draft';
import { freshKey, recall } from './key';
import { Undo } from './Undo';
import { useDraft, type Entry, type Kept } from './use-draft';

interface FormProps { lines: readonly Line[]; chosen: { line: string; effect: string } | null }

/** Logs a cleaning. `chosen`: the effect whose page this is on; null lets the reader choose. Times are local to the site, so it waits until the site is known. */
export function CleaningForm(props: FormProps) {
  return <Shown of={site} what="The site">{() => <Form {...props} />}</Shown>;
}

function Form({ lines, chosen }: FormProps) {
  const logged = useSignal<Entry | null>(null);
  const unsent = () => {
    // A draft kept by an older page knows no body.
    const found = recall<Kept>(), kept = found && { ...found, draft: { ...found.draft, body: found.draft.body ?? '' } };
    return kept && (!chosen || (kept.draft.line === chosen.line && kept.draft.effect === chosen.effect)) ? kept : null;
  };
  const form = useDraft(
    () => unsent() ?? { draft: emptyDraft(chosen?.line ?? '', chosen?.effect ?? '', now.peek(), zone.peek()), key: freshKey() },
    { method: 'POST', address: addresses.cleanings(), kept: true },
    entry => {
      logged.value = entry;
      announce(`Logged: ${entry.effect} was cleaned. It can be taken back for ten seconds.`);
    });

  if (logged.value) {
    const of = logged.value;
    return <Undo said={<><b>Logged</b>: {of.effect} of {of.line}, {of.kind}. </>} back={`Taken back: ${of.effect} is not logged as cleaned.`} id={of.id} next="Log another" done={() => { logged.value = null; }} />;
  }
  return (
    <form ref={form.element} class="log-form" noValidate onSubmit={event => void form.submit(event)}>
      <CleaningFields draft={form.draft} errors={form.errors} lines={chosen ? null : lines} prefix="" open change={form.change} />
      <Cautions />
      {form.failure && <p class="wrong" role="alert">{form.failure}</p>}
      <button type="submit" class="main" disabled={form.sending}>{form.sending ? 'Sending' : 'Log this cleaning'}</button>
    </form>
  );
}
