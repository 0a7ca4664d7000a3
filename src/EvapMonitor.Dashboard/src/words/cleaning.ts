import type { Cleaning, Verdict } from '../api/types';
import { duration } from './duration';
import { percent, resistance, resistanceUnit } from './resistance';
import { date, moment } from './time';

/** How a cleaning is known, in words. */
export const knownWords = (c: Cleaning): string => {
  switch (c.known_by) {
    case 'logged': return 'logged';
    case 'signal': return 'by signal';
    case 'recognised': return 'recognised, not logged';
    case 'rejected': return 'rejected: no cleaning';
  }
};

/** What it brought, in words; why when that cannot be told. */
export function verdictWords(c: Cleaning): { words: string; why: string } {
  if (c.known_by === 'rejected') return { words: 'no cleaning', why: 'somebody says so' };
  if (c.end === null) return { words: 'goes on', why: '' };
  if (c.result === null) return { words: 'not computed yet', why: '' };
  const { verdict, reason } = c.result;
  return { words: verdict === 'awaiting hours' ? 'waits for hours of production' : verdict, why: reason };
}

/** The verdict that a mark stands for; null when there is none yet. */
export const verdictOf = (c: Cleaning): Verdict | null => (c.known_by === 'rejected' || c.end === null ? null : c.result?.verdict ?? null);

/** The surface in words: the effect's name, and the body's where one was cleaned. */
export function surfaceWords(c: Cleaning): string | null {
  const surface = c.result?.surface ?? c.body;
  return surface === null || surface === c.effect ? null : surface;
}

/** Short words for a chart: "chemical, 97 % removed", and shorter: "97 %". */
export function laneWords(c: Cleaning): { long: string; short: string } {
  const surface = surfaceWords(c), named = (words: string) => (surface === null ? words : `${surface}: ${words}`);
  if (c.end === null) return { long: named('being cleaned'), short: 'being cleaned' };
  const how = c.known_by === 'recognised' ? 'recognised' : c.known_by === 'signal' ? 'by signal' : c.kind || 'cleaned';
  if (c.result?.verdict === 'did not clean') return { long: named(`${how}, did not clean`), short: 'did not clean' };
  const share = c.result?.removed_share ?? null;
  return share === null ? { long: named(how), short: '' } : { long: named(`${how}, ${percent(share)} removed`), short: percent(share) };
}

/** Recognised ones that wait for an answer, newest first. One that an entry of the log touches is answered, even before results follow it. */
export function waiting(all: readonly Cleaning[]): Cleaning[] {
  const end = (c: Cleaning) => (c.end === null ? Infinity : Date.parse(c.end));
  const answers = (entry: Cleaning, c: Cleaning) => entry.id !== null && entry.line === c.line && entry.effect === c.effect && Date.parse(entry.start) < end(c) && end(entry) > Date.parse(c.start);
  return all.filter(c => c.id === null && c.known_by === 'recognised' && !all.some(entry => answers(entry, c))).sort((a, b) => Date.parse(b.start) - Date.parse(a.start));
}

/** Of those that wait, the newest of each effect. */
export const onePerEffect = (asked: readonly Cleaning[]): Cleaning[] => asked.filter((c, i) => asked.findIndex(d => d.line === c.line && d.effect === c.effect) === i);

/** The question that a recognised cleaning asks, after the name of its effect. */
export function askedWords(c: Cleaning, zone: string, now: number): { head: string; rest: string } {
  const start = Date.parse(c.start), end = c.end === null ? null : Date.parse(c.end), r = c.result;
  const removed = r && resistance(r.removed_m2k_w), share = r?.removed_share ?? null;
  const day = date(end ?? start, zone, now);
  const head = removed === null ? `came back better on ${day} without an entry` : `lost ${removed} ${resistanceUnit} of resistance on ${day} without an entry`;
  const out = end === null ? `It is out of production since ${moment(start, zone, now)}` : `It was out of production from ${moment(start, zone, now)} for ${duration(end - start)}`;
  const confidence = r?.confidence ?? null;
  const sure = confidence === null ? '' : confidence > 0.995 ? '; that its coefficient rose is as good as certain' : `; that its coefficient rose is ${percent(confidence)} sure`;
  return { head, rest: `${share === null ? '' : `, ${percent(share)} of what was there`}: was it cleaned? ${out}${sure}.` };
}
