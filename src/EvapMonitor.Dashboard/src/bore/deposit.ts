import type { Effect } from '../api/types';
import { residualOf } from '../words/fouling';
import type { Deposit } from './geometry';

/** How many weeks one stratum stands for, the same for a page: one, or four once any campaign on it is longer than twelve weeks. */
export function weeksPerStratum(effects: readonly Effect[]): 1 | 4 {
  return effects.some(e => e.growth.length > 12) ? 4 : 1;
}

/** What the limit circle stands for. */
export type Scale = 'limit' | 'half clean';

/** The deposit of an effect, and what its circle stands for. Without a limit the circle is where the coefficient is half the clean one. Null: no scale can be given. */
export function depositOf(effect: Effect, weeks: 1 | 4): { deposit: Deposit; scale: Scale } | null {
  const set = effect.limits.resistance_m2k_w;
  const clean = cleanCoefficient(effect);
  const limit = set !== null && set > 0 ? set : clean === null ? null : 1 / clean;
  if (limit === null) return null;
  const left = residualOf(effect);
  return {
    scale: limit === set ? 'limit' : 'half clean',
    deposit: {
      resistance: effect.now?.fouling_resistance_m2k_w ?? null,
      uncertainty: effect.now?.fouling_resistance_u ?? null,
      limit,
      residual: left?.told ? left.value : null,
      growth: effect.growth.filter((_, i) => (i + 1) % weeks === 0),
    },
  };
}

/** The clean coefficient in use: the one behind the present cleanliness, else the design value. */
function cleanCoefficient(effect: Effect): number | null {
  const { coefficient_w_m2k: u, cleanliness } = effect.now ?? { coefficient_w_m2k: null, cleanliness: null };
  if (u !== null && cleanliness !== null && cleanliness > 0) return u / cleanliness;
  return effect.clean_coefficient_w_m2k;
}

/** Share of the hours allowed since the last cleaning, as the limits table has it; null without such a limit or without a known cleaning. */
export function hoursShare(effect: Effect): number | null {
  const hours = effect.due.evidence.find(e => e.limit.startsWith('hours'));
  return hours === undefined || hours.value === null || hours.bound === null || hours.bound <= 0 ? null : hours.value / hours.bound;
}
