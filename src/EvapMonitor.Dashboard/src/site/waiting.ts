import { signal } from '@preact/signals';

/** How fast the days that wait for evaluation are worked off. */
export interface Progress { days: number; since: number; daysPerMinute: number | null; secondsLeft: number | null }
export const waiting = signal<Progress | null>(null);

interface Sight { at: number; days: number }
let sights: Sight[] = [];

/** Notes how many days wait at an instant of the service, ms. */
export function observeWaiting(days: number, at: number): void {
  if (days <= 0) { sights = []; waiting.value = null; return; }
  const last = sights.at(-1);
  // More days than before: an import brought new work, the rate so far says nothing.
  if (last && days > last.days) sights = [];
  if (!last || at > last.at || days !== last.days) sights = [...sights, { at, days }].slice(-20);
  waiting.value = progress(sights, waiting.peek()?.since ?? at);
}

/** Rate and time left from what was seen; null while too little was. */
export function progress(seen: readonly Sight[], since: number): Progress {
  const first = seen[0]!, last = seen.at(-1)!;
  const minutes = (last.at - first.at) / 60_000, done = first.days - last.days;
  const daysPerMinute = minutes >= 0.2 && done > 0 ? done / minutes : null;
  return { days: last.days, since, daysPerMinute, secondsLeft: daysPerMinute === null ? null : (last.days / daysPerMinute) * 60 };
}
