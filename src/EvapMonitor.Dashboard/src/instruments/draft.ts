import type { InstrumentEventKind } from '../api/types';
import { fromInput } from '../words/time';

/** What the form holds, as typed: times are local to the site. `goesOn`: excluded until further notice. */
export interface InstrumentDraft { kind: InstrumentEventKind; start: string; startSecond: boolean; end: string; endSecond: boolean; goesOn: boolean; note: string }

/** An entry ready to send. */
export interface NewInstrumentEvent { signal: string; kind: InstrumentEventKind; start: string; end: string | null; note: string }

export type CheckedEvent = { event: NewInstrumentEvent; errors: null } | { event: null; errors: Partial<Record<'start' | 'end' | 'note', string>> };

/** Checks a draft. `now`: the service's time, ms. */
export function checkEvent(signal: string, draft: InstrumentDraft, zone: string, now: number): CheckedEvent {
  const errors: Partial<Record<'start' | 'end' | 'note', string>> = {};
  const at = (text: string, second: boolean, field: 'start' | 'end') => {
    const found = fromInput(text, zone);
    if (found === null) errors[field] = 'Give a date and a time.';
    else if (found.length === 0) errors[field] = 'The clocks went forward: this time did not exist on that day.';
    return found === null || found.length === 0 ? null : second ? found.at(-1)! : found[0]!;
  };
  const start = at(draft.start, draft.startSecond, 'start');
  const open = draft.kind === 'recalibration' || draft.goesOn, end = open ? null : at(draft.end, draft.endSecond, 'end');
  if (start !== null && start > now) errors.start = 'It lies in the future; a log holds what has been found or done.';
  if (start !== null && end !== null && end <= start) errors.end = 'The end must come after the start.';
  if (draft.note.length > 2000) errors.note = 'At most 2000 characters.';
  if (Object.keys(errors).length > 0 || start === null) return { event: null, errors };
  return { errors: null, event: { signal, kind: draft.kind, start: new Date(start).toISOString(), end: end === null ? null : new Date(end).toISOString(), note: draft.note.trim() } };
}
