import type { Corrections } from '../api/types';
import { significant } from '../words/number';
import { prettyUnit } from '../words/quantity';

/** The values that the axis must hold: zero, and all there is; null when there is nothing. */
export function correctionSpan(wanted: readonly (number | null)[]): { lowest: number; highest: number } | null {
  const known = wanted.filter(v => v !== null);
  if (known.length === 0) return null;
  const lowest = Math.min(0, ...known), highest = Math.max(0, ...known);
  return lowest === highest ? { lowest: -1, highest: 1 } : { lowest, highest };
}

/** Lines through the values, broken at gaps; those of a reading that was left out apart. */
export function correctionPaths(of: Corrections, x: (t: number) => number, y: (v: number) => number): { line: string; out: string } {
  const zero = Date.parse(of.start), paths = { line: '', out: '' };
  let pen: 'line' | 'out' | null = null;
  of.wanted.forEach((v, i) => {
    if (v === null) { pen = null; return; }
    const now = of.mark[i] === 'left out' ? 'out' : 'line';
    paths[now] += `${pen === now ? 'L' : 'M'}${x(zero + of.offset_s[i]! * 1000).toFixed(1)} ${y(v).toFixed(1)}`;
    pen = now;
  });
  return paths;
}

/** What the corrections did over the time shown, in a sentence. */
export function spokenCorrections(of: Corrections, days: number): string {
  const known = of.wanted.filter(v => v !== null), unit = prettyUnit(of.unit), say = (v: number) => `${v > 0 ? '+' : ''}${significant(v, 2)} ${unit}`;
  if (known.length === 0) return `No correction of ${of.signal} is known in the last ${days} days.`;
  return `In the last ${days} days between ${say(Math.min(...known))} and ${say(Math.max(...known))}, at the end ${say(known.at(-1)!)}.`;
}
