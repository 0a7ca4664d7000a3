import { clock, months } from '../words/time';
import { civil, firstInstant, shifted, weekday, type Civil } from '../words/zone';

/** A tick of the time axis at an instant, ms, with one or two rows of label. */
export interface Tick { at: number; label: string }

type Step = { unit: 'hour' | 'day' | 'week' | 'month'; every: number; days: number };
const steps: Step[] = [
  ...[1, 2, 3, 6, 12].map(every => ({ unit: 'hour' as const, every, days: every / 24 })),
  ...[1, 2].map(every => ({ unit: 'day' as const, every, days: every })),
  ...[1, 2].map(every => ({ unit: 'week' as const, every, days: 7 * every })),
  ...[1, 2, 3, 6, 12, 24, 60].map(every => ({ unit: 'month' as const, every, days: 30.4 * every })),
];

/** Ticks in a span at local hours, midnights, Mondays or firsts of months of the zone, as many as fit. */
export function timeTicks(from: number, to: number, zone: string, most: number): Tick[] {
  const days = (to - from) / 86_400_000;
  const step = steps.find(s => days / s.days <= most) ?? steps.at(-1)!;
  const ticks: Tick[] = [];
  let before: Civil | null = null;
  for (const at of instantsOf(step, from, to, zone)) {
    const c = civil(at, zone);
    ticks.push({ at, label: label(step, c, before) });
    before = c;
  }
  return ticks;
}

function* instantsOf(step: Step, from: number, to: number, zone: string): Generator<number> {
  let at = startOf(step, civil(from, zone));
  for (let last = -Infinity; ;) {
    const instant = firstInstant(at, zone);
    if (instant > to) return;
    // An hour that the clocks skip falls together with the next one.
    if (instant >= from && instant > last) yield last = instant;
    at = next(step, at);
  }
}

function startOf(step: Step, c: Civil): Civil {
  const midnight = { ...c, hour: 0, minute: 0, second: 0 };
  switch (step.unit) {
    case 'hour': return midnight;
    // Every second day counts from the first of the month, every second week from a fixed Monday, so that ticks stay put while panning.
    case 'day': return step.every === 1 ? midnight : { ...midnight, day: c.day - ((c.day - 1) % step.every) };
    case 'week': {
      const monday = shifted(midnight, { day: -weekday(midnight) });
      const number = Math.round(Date.UTC(monday.year, monday.month - 1, monday.day) / (7 * 86_400_000));
      return shifted(monday, { day: -7 * (number % step.every) });
    }
    case 'month': {
      const number = c.year * 12 + c.month - 1;
      const start = number - (number % step.every);
      return { ...midnight, year: Math.floor(start / 12), month: (start % 12) + 1, day: 1 };
    }
  }
}

function next(step: Step, c: Civil): Civil {
  switch (step.unit) {
    case 'hour': return shifted(c, { hour: step.every });
    case 'day': {
      const following = shifted(c, { day: step.every });
      if (step.every === 1 || following.month === c.month) return following;
      return { ...following, day: 1 };
    }
    case 'week': return shifted(c, { day: 7 * step.every });
    case 'month': return shifted(c, { month: step.every });
  }
}

function label(step: Step, c: Civil, before: Civil | null): string {
  const day = `${c.day} ${months[c.month - 1]}`;
  switch (step.unit) {
    case 'hour': return before === null || before.day !== c.day ? `${clock(c)}\n${day}` : clock(c);
    case 'day': case 'week': return before === null || before.month !== c.month ? day : String(c.day);
    case 'month': {
      const name = step.every >= 12 ? String(c.year) : months[c.month - 1]!;
      return step.every < 12 && (before === null || before.year !== c.year) ? `${name}\n${c.year}` : name;
    }
  }
}
