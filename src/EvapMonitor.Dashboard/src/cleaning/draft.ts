import type { Cleaning, NewCleaning } from '../api/types';
import { fromInput, toInput } from '../words/time';
import { zoneName } from '../words/zone';

/** What the form holds, as typed: times are local to the site. `second`: of an hour that the clocks repeat, the second one is meant. */
export interface Draft {
  line: string;
  effect: string;
  /** The body that was cleaned; empty: the one that served. */
  body: string;
  start: string;
  end: string;
  goesOn: boolean;
  kind: string;
  note: string;
  startSecond: boolean;
  endSecond: boolean;
}

/** A draft of nothing yet, that ends now. */
export const emptyDraft = (line: string, effect: string, now: number, zone: string): Draft =>
  ({ line, effect, body: '', start: '', end: toInput(now, zone), goesOn: false, kind: '', note: '', startSecond: false, endSecond: false });

/** A draft of what is already known: an entry to correct, or a recognised cleaning to confirm. */
export function draftOf(c: Cleaning, now: number, zone: string): Draft {
  const second = (at: number) => { const found = fromInput(toInput(at, zone), zone); return found?.length === 2 && found[1]! <= at; };
  const start = Date.parse(c.start), end = c.end === null ? null : Date.parse(c.end);
  return {
    line: c.line, effect: c.effect, body: c.body ?? '', start: toInput(start, zone), end: toInput(end ?? now, zone), goesOn: end === null, kind: c.kind, note: c.note ?? '',
    startSecond: second(start), endSecond: end !== null && second(end),
  };
}

/** A cleaning ready to send, or what is wrong, by field. */
export type Checked = { cleaning: NewCleaning; errors: null } | { cleaning: null; errors: Partial<Record<'effect' | 'start' | 'end' | 'kind' | 'note', string>> };

/** Checks a draft. `now`: the service's time, ms. */
export function check(draft: Draft, zone: string, now: number): Checked {
  const errors: Partial<Record<'effect' | 'start' | 'end' | 'kind' | 'note', string>> = {};
  if (draft.effect === '') errors.effect = 'Choose the effect that was cleaned.';
  const start = resolve(draft.start, draft.startSecond, zone, 'start', errors);
  const end = draft.goesOn ? null : resolve(draft.end, draft.endSecond, zone, 'end', errors);
  if (draft.kind.trim() === '') errors.kind = 'Say what kind of cleaning it was, in the words of the plant.';
  if (draft.kind.length > 60) errors.kind = 'At most 60 characters.';
  if (draft.note.length > 2000) errors.note = 'At most 2000 characters.';
  if (start !== null && start > now) errors.start = 'The start lies in the future; a log holds what has begun.';
  if (end !== null && end > now) errors.end = 'The end lies in the future. Leave it open while the cleaning goes on.';
  if (start !== null && end !== null && end <= start) errors.end = 'The end must come after the start.';
  if (Object.keys(errors).length > 0 || start === null) return { cleaning: null, errors };
  return {
    errors: null,
    cleaning: {
      line: draft.line, effect: draft.effect, start: new Date(start).toISOString(), end: end === null ? null : new Date(end).toISOString(),
      kind: draft.kind.trim(), note: draft.note.trim(), body: draft.body === '' ? null : draft.body,
    },
  };
}

function resolve(text: string, second: boolean, zone: string, field: 'start' | 'end', errors: Partial<Record<string, string>>): number | null {
  const found = fromInput(text, zone);
  if (found === null) { errors[field] = 'Give a date and a time.'; return null; }
  if (found.length === 0) { errors[field] = 'The clocks went forward: this time did not exist on that day.'; return null; }
  return second ? found.at(-1)! : found[0]!;
}

/** The two readings of a local time in the hour that the clocks repeat, named by zone; null when there is only one. */
export function twice(text: string, zone: string): [string, string] | null {
  const found = fromInput(text, zone);
  return found?.length === 2 ? [zoneName(found[0]!, zone), zoneName(found[1]!, zone)] : null;
}
