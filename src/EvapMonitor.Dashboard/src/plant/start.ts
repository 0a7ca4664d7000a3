import type { Revision } from '../api/types';
import { date, fullMoment } from '../words/time';

/** From when a plant file is to hold: it corrects the one in force, or the plant was changed with a UTC day, "2026-03-01". */
export interface Start { changed: boolean; day: string }

/** The instant at which a UTC day begins, ms; null when the text is no day. */
export function dayStart(day: string): number | null {
  if (!/^\d{4}-\d\d-\d\d$/.test(day)) return null;
  const at = Date.parse(`${day}T00:00:00Z`);
  return Number.isNaN(at) || new Date(at).toISOString().slice(0, 10) !== day ? null : at;
}

/** What is wrong with a start, in words; null when nothing is. */
export function whyNotStart(start: Start): string | null {
  return start.changed && dayStart(start.day) === null ? 'Give the day with which the change is in force.' : null;
}

/** What a start means, with the local time of the site beside the UTC day. */
export function startWords(start: Start, inForce: Revision | undefined, zone: string): string {
  if (!start.changed) return inForce ? `It takes the place of the file in force now, from ${fullMoment(Date.parse(inForce.in_force_from), zone)} on.` : '';
  const at = dayStart(start.day);
  return at === null ? 'A day is computed as a whole, so a change begins with a UTC day.' : `The UTC day of ${utcDay(at)} begins at ${fullMoment(at, zone)} (${zone}).`;
}

/** "Sun 1 Mar 2026", in UTC. */
export const utcDay = (at: number) => date(at, 'UTC', 0);

/** The time in which a revision is in force, in words. */
export function inForceWords(one: Revision, zone: string): { from: string; until: string } {
  const from = fullMoment(Date.parse(one.in_force_from), zone);
  if (one.replaced_by !== null) return { from, until: `replaced by revision ${one.replaced_by}` };
  return { from, until: one.in_force_until === null ? 'further notice' : fullMoment(Date.parse(one.in_force_until), zone) };
}

/** How two files differ, in words. */
export function differenceWords(added: number, removed: number, other: number): string {
  const lines = (n: number) => `${n} ${n === 1 ? 'line' : 'lines'}`;
  if (added === 0 && removed === 0) return `The same text as revision ${other}.`;
  const parts = [added > 0 && `${lines(added)} added`, removed > 0 && `${lines(removed)} removed`].filter(Boolean);
  return `Against revision ${other}: ${parts.join(', ')}.`;
}
