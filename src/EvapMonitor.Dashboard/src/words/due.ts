import type { Effect } from '../api/types';
import { duration } from './duration';

export type MarkKind = 'now' | 'unknown' | 'cleaning' | null;

/** The words under an effect and the mark that goes with them. */
export interface DueWords { mark: MarkKind; words: string }

/** What is due at an effect. `fresh`: its line's readings are live; calm words are kept for fresh readings alone. */
export function dueWords(effect: Effect, now: number, fresh: boolean): DueWords {
  const { due } = effect;
  if (effect.cleaning_since !== null) return { mark: 'cleaning', words: `cleaning for ${duration(now - Date.parse(effect.cleaning_since))}` };
  switch (due.state) {
    case 'due': {
      const since = due.since === null ? '' : ` for ${duration(now - Date.parse(due.since))}`;
      return { mark: 'now', words: `due${since}: ${limitName(due.limit)}` };
    }
    case 'not due': return { mark: null, words: fresh ? 'not due' : 'was not due' };
    case 'no limit': return { mark: null, words: 'no limit set' };
    case 'unknown': return { mark: 'unknown', words: 'cannot be judged' };
  }
}

/** A limit in words. */
export function limitName(limit: string | null): string {
  switch (limit) {
    case 'coefficient': return 'coefficient floor';
    case 'cleanliness': return 'cleanliness floor';
    case 'hours_since_cleaning': case 'hours since cleaning': case 'hours': return 'hours since cleaning';
    case null: return 'a limit';
    default: return limit;
  }
}

/** Cleanliness, or why there is none: "cleanliness 76 %", "cannot be told from clean". */
export function cleanlinessWords(effect: Effect): string {
  const now = effect.now;
  if (now === null) return 'no result yet';
  if (now.cleanliness === null) return 'cleanliness not known';
  const { fouling_resistance_m2k_w: r, fouling_resistance_u: u } = now;
  if (r !== null && u !== null && Math.abs(r) < u) return 'cannot be told from clean';
  return `cleanliness ${Math.round(now.cleanliness * 100)} %`;
}

/** Why the effect cannot be judged, in the service's own words. */
export function unknownReason(effect: Effect): string {
  return effect.now?.reason ?? (effect.now === null ? 'no hour has a result yet' : 'the reason was not given');
}
