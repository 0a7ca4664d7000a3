import type { Rejected, SignalRow } from '../api/types';
import { misfit } from './balance';
import { duration } from './duration';
import { fixed } from './number';

/** A signal without a reading for this long is silent; the service calls readings live under the same age. */
const silentAfter = 15 * 60_000;

/** Under this share of sound time a signal's results have more gaps than a night shift should have to explain. */
const leastGoodShare = 0.9;

/** What is wrong with a signal, the gravest first; null when nothing asks for attention. */
export type Trouble = 'never read' | 'silent' | 'bad now' | 'does not fit' | 'changed' | 'often unsound' | null;
const gravity: Trouble[] = ['silent', 'never read', 'bad now', 'does not fit', 'changed', 'often unsound', null];

export function troubleOf(s: SignalRow, now: number): Trouble {
  if (s.latest_at === null) return 'never read';
  if (now - Date.parse(s.latest_at) > silentAfter) return 'silent';
  if (s.latest_quality === 'bad') return 'bad now';
  if (misfit(s.fit)) return 'does not fit';
  if (s.changed) return 'changed';
  return s.good_share !== null && s.good_share < leastGoodShare ? 'often unsound' : null;
}

/** Age of the latest reading in words. */
export function ageWords(s: SignalRow, now: number): string {
  if (s.latest_at === null) return 'never read';
  const old = now - Date.parse(s.latest_at);
  return old < 1000 ? 'just in' : duration(old);
}

/** A share as a percentage that never rounds up to all nor down to none. */
export function shareWords(share: number | null): string {
  if (share === null) return 'no reading';
  if (share >= 1) return '100 %';
  if (share > 0.99) return 'over 99 %';
  return share > 0 && share < 0.01 ? 'under 1 %' : `${Math.round(share * 100)} %`;
}

/** Readings that were not used, by reason: "3 outside its range, 120 frozen"; empty when all were. */
export function rejectedWords(r: Rejected): string {
  return ([[r.bad, 'bad by source'], [r.not_a_number, 'no number'], [r.out_of_range, 'outside its range'], [r.frozen, 'frozen']] as const)
    .filter(([n]) => n > 0).map(([n, why]) => `${fixed(n)} ${why}`).join(', ');
}

/** Signals by line in the order they came, which is the plant file's; those of no line last. */
export function byLine(signals: readonly SignalRow[]): { line: string | null; signals: SignalRow[] }[] {
  const groups = new Map<string | null, SignalRow[]>();
  for (const s of signals) groups.set(s.line, [...(groups.get(s.line) ?? []), s]);
  const shared = groups.get(null);
  groups.delete(null);
  return [...[...groups].map(([line, own]) => ({ line, signals: own })), ...(shared ? [{ line: null, signals: shared }] : [])];
}

/** What asks for attention first, the gravest on top; within the same gravity the smaller good share, then the plant file's order. */
export function attentionFirst(signals: readonly SignalRow[], now: number): SignalRow[] {
  const rank = (s: SignalRow) => gravity.indexOf(troubleOf(s, now));
  return [...signals].sort((a, b) => rank(a) - rank(b) || (a.good_share ?? 1) - (b.good_share ?? 1));
}

/** The state of a line's signals in a sentence. */
export function signalsWords(signals: readonly SignalRow[], now: number): { head: string; bold: string } {
  const of = (...kinds: Trouble[]) => signals.filter(s => kinds.includes(troubleOf(s, now))).length;
  const parts = [[of('silent', 'never read'), 'without a reading in the last 15 min'], [of('bad now'), 'bad now'], [of('does not fit'), 'not fitting the others'], [of('changed'), 'changed against the others'], [of('often unsound'), 'sound for less than 90 % of the last 24 h']] as const;
  const bold = parts.filter(([n]) => n > 0).map(([n, what]) => `${n} ${what}`).join(', ');
  const head = `${signals.length} ${signals.length === 1 ? 'signal' : 'signals'}`;
  return { head: bold === '' ? `${head}, ${signals.length === 1 ? '' : 'every one '}with a sound reading in the last 15 min.` : `${head}: `, bold };
}
