import { measured, significant } from '../words/number';
import { fullMoment } from '../words/time';
import type { Columns } from './trend';

/** The values at the cursor, or the latest, in a row that never moves. */
export function valueWords(c: Columns, clean: Columns | null, index: number | null, zone: string): { when: string; value: string; more: string } | null {
  const i = index ?? lastIndex(c);
  const x = i === null ? undefined : c.x[i];
  if (i === null || x === undefined) return null;
  const joined = c.value[i] ?? null, idle = c.idle[i] ?? null, v = joined ?? idle;
  const expected = clean && nearest(clean, x);
  return {
    when: fullMoment(x * 1000, zone),
    value: v === null ? 'no value' : `${measured(v, c.u[i] ?? null)} ${c.unit}`,
    more: [
      v === null ? c.reason[i] : null, c.extrapolated[i] ? 'extrapolated' : null, c.unsteady[i] ? 'not steady' : idle !== null ? 'not producing' : null,
      v !== null && expected !== null ? `if clean ${significant(expected, 3)}` : null,
    ].filter(Boolean).join(', '),
  };
}

function lastIndex(c: Columns): number | null {
  for (let i = c.x.length - 1; i >= 0; i--) if ((c.value[i] ?? c.idle[i] ?? null) !== null) return i;
  return c.x.length > 0 ? c.x.length - 1 : null;
}

function nearest(c: Columns, x: number): number | null {
  let low = 0, high = c.x.length - 1;
  while (low < high) { const mid = (low + high) >> 1; if (c.x[mid]! < x) low = mid + 1; else high = mid; }
  const around = [low - 1, low].filter(i => i >= 0 && i < c.x.length && (c.value[i] ?? null) !== null);
  const best = around.sort((a, b) => Math.abs(c.x[a]! - x) - Math.abs(c.x[b]! - x))[0];
  return best === undefined ? null : c.value[best]!;
}
