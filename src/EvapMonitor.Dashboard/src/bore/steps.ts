import type { Effect } from '../api/types';
import { depositOf } from './deposit';

/** Share of the limit in five steps for the smallest mark: under a quarter, half, three quarters, the limit, and at or over it. */
export type Step = 0 | 1 | 2 | 3 | 4;

export const stepWords = ['under a quarter of the limit', 'under half of the limit', 'under three quarters of the limit', 'near the limit', 'at or over the limit'] as const;

/** Deposit as a share of the limit; null when it is not known. */
export function limitShare(effect: Effect): number | null {
  const found = depositOf(effect, 1);
  const r = found?.deposit.resistance ?? null;
  return found === null || r === null ? null : r / found.deposit.limit;
}

export function stepOf(share: number): Step {
  return Math.min(4, Math.max(0, Math.floor(share * 4))) as Step;
}
