import type { Trend } from '../api/types';
import { shownAs } from '../words/quantity';

/** A trend as the chart draws it: columns over time in s, in the unit shown. Null breaks a line. */
export interface Columns {
  unit: string;
  x: number[];
  /** Joined values, and their ± one standard uncertainty. */
  value: (number | null)[];
  lower: (number | null)[];
  upper: (number | null)[];
  /** Joined values with a gap on both sides: a line would not show them. */
  alone: (number | null)[];
  /** Values while the line did not produce or was not steady: never joined. */
  idle: (number | null)[];
  unsteady: boolean[];
  extrapolated: boolean[];
  u: (number | null)[];
  reason: (string | null)[];
}

/** Maps a trend. Gaps: a null, a value while not producing or not steady, and a hole in time wider than thinning explains. */
export function columns(trend: Trend): Columns {
  const { factor, unit } = shownAs(trend.quantity, trend.unit);
  const start = Date.parse(trend.start) / 1000;
  const out: Columns = { unit, x: [], value: [], lower: [], upper: [], alone: [], idle: [], unsteady: [], extrapolated: [], u: [], reason: [] };
  const hole = holeWiderThan(trend.offset_s, trend.step_s);
  const push = (x: number, value: number | null, u: number | null, mark: string, steady: boolean | null, reason: string | null) => {
    const unsteady = steady === false && mark !== 'not producing', idle = unsteady || mark === 'not producing';
    const joined = idle ? null : value;
    out.x.push(x);
    out.value.push(joined);
    out.lower.push(joined === null || u === null ? null : joined - u);
    out.upper.push(joined === null || u === null ? null : joined + u);
    out.idle.push(idle ? value : null);
    out.unsteady.push(unsteady && value !== null);
    out.extrapolated.push(mark === 'extrapolated' && value !== null);
    out.u.push(u);
    out.reason.push(reason);
  };
  trend.offset_s.forEach((offset, i) => {
    const before = trend.offset_s[i - 1];
    if (before !== undefined && offset - before > hole) push(start + (before + offset) / 2, null, null, '', null, 'no result stored here');
    const value = trend.value[i] ?? null, u = trend.u[i] ?? null, reason = trend.reasons[trend.reason[i] ?? -1] ?? null;
    push(start + offset, value === null ? null : value * factor, u === null ? null : u * factor, trend.mark[i] ?? '', trend.steady[i] ?? null, reason);
  });
  out.alone = out.value.map((v, i) => (v !== null && (out.value[i - 1] ?? null) === null && (out.value[i + 1] ?? null) === null ? v : null));
  return out;
}

/** Thinning keeps the lowest and the highest of each stretch of three points and more, so at most half of what is left stands a step apart; then points
 * stand up to a few usual distances apart, and anything wider than six of them is a hole. */
export function holeWiderThan(offsets: readonly number[], step: number): number {
  const apart = offsets.slice(1).map((o, i) => o - offsets[i]!).sort((a, b) => a - b);
  if (apart.length === 0 || apart.filter(a => a <= step).length > 0.6 * apart.length) return 1.5 * step;
  return 6 * Math.max(apart[Math.floor(apart.length / 2)]!, apart.reduce((sum, a) => sum + a, 0) / apart.length);
}

/** First, last, lowest and highest joined value in a span of s; null when there is none. */
export function extent(c: Columns, from: number, to: number): { first: number; last: number; lowest: number; highest: number; lastIndex: number } | null {
  let found: ReturnType<typeof extent> = null;
  c.x.forEach((x, i) => {
    const v = c.value[i] ?? null;
    if (v === null || x < from || x > to) return;
    if (found === null) found = { first: v, last: v, lowest: v, highest: v, lastIndex: i };
    else Object.assign(found, { last: v, lastIndex: i, lowest: Math.min(found.lowest, v), highest: Math.max(found.highest, v) });
  });
  return found;
}

/** Reasons for absent values in a span, the commonest first. */
export function reasonsIn(c: Columns, from: number, to: number): string[] {
  const counts = new Map<string, number>();
  c.x.forEach((x, i) => { const r = c.reason[i]; if (r && x >= from && x <= to) counts.set(r, (counts.get(r) ?? 0) + 1); });
  return [...counts].sort((a, b) => b[1] - a[1]).map(([r]) => r);
}
