import type { Effect, Quantity } from '../api/types';
import { decimalsFor, fixed, rounded, significant } from '../words/number';
import { extent, type Columns } from './trend';
import type { Span } from './view';

/** The limit on a quantity's chart, in the unit shown. */
export function limitOf(quantity: Quantity, effect: Effect): { value: number; label: string } | null {
  const { coefficient_w_m2k: coefficient, cleanliness, resistance_m2k_w: resistance } = effect.limits;
  if (quantity === 'coefficient' && coefficient !== null) return { value: coefficient, label: `floor ${fixed(coefficient)}` };
  if (quantity === 'cleanliness' && cleanliness !== null) return { value: cleanliness * 100, label: `floor ${significant(cleanliness * 100, 2)} %` };
  if (quantity === 'fouling_resistance' && resistance !== null) return { value: resistance * 1000, label: `limit ${significant(resistance * 1000, 2)}` };
  return null;
}

/** "now 730 ± 17", or "last 730" when the last value in the span is older than two hours. */
export function latestLabel(c: Columns, span: Span, narrow: boolean, now: number): { value: number; label: string } | null {
  const found = extent(c, span.from / 1000, span.to / 1000);
  if (found === null) return null;
  const given = c.u[found.lastIndex] ?? null, u = given !== null && given > 0 ? given : null;
  const word = now / 1000 - c.x[found.lastIndex]! < 7200 ? 'now' : 'last';
  const value = u === null ? significant(found.last, 3) : rounded(found.last, decimalsFor(u));
  return { value: found.last, label: `${word} ${value}${u === null || narrow ? '' : ` ± ${rounded(u, decimalsFor(u))}`}` };
}
