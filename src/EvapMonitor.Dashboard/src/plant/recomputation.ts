import type { Recomputation } from '../api/types';
import { timeLeft } from '../words/duration';
import { count, fixed, significant } from '../words/number';
import { dayStart, utcDay } from './start';

/** Which days of which lines: "north, Sun 1 Mar 2026 to Tue 31 Mar 2026". */
export function spanWords(one: Recomputation): string {
  const [from, to] = [dayStart(one.from), dayStart(one.to)];
  const days = from === null || to === null ? '' : from === to ? `, ${utcDay(from)}` : `, ${utcDay(from)} to ${utcDay(to)}`;
  return `${one.line ?? 'all lines'}${days}`;
}

/** How far it is. */
export function stateWords(one: Recomputation): string {
  const done = `${fixed(one.days_done)} of ${count(one.days_total, 'day')}`;
  switch (one.state) {
    case 'done': return `done: ${count(one.days_total, 'day')}`;
    case 'cancelled': return `stopped: ${done} computed; ${one.days_left === 1 ? 'one keeps its' : `${fixed(one.days_left)} keep their`} earlier results`;
    default: return `${done}${one.days_per_minute === null ? '' : `, ${significant(one.days_per_minute, 2)} a minute`}, ${timeLeft(one.seconds_left)}`;
  }
}
