import type { Effect } from '../api/types';
import { fixed, measured } from '../words/number';

/** What stands in the box of an effect: heating temperature over boiling temperature, and its coefficient. */
export interface EffectText { heating: string; boiling: string; coefficient: string; known: boolean }

export function effectText(effect: Effect): EffectText {
  const n = effect.now, celsius = (v: number | null | undefined) => (v === null || v === undefined ? '? °C' : `${fixed(v, 1)} °C`);
  const u = n?.coefficient_w_m2k ?? null;
  return {
    heating: celsius(n?.heating_temperature_c), boiling: celsius(n?.boiling_temperature_c),
    coefficient: u !== null ? measured(u, n!.coefficient_u) : effect.cleaning_since !== null ? 'cleaning' : 'none', known: u !== null,
  };
}
