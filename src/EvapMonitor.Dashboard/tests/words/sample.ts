import type { Effect, Line } from '../../src/api/types';

export const now = Date.parse('2026-11-30T13:32:00Z');

export function effect(part: Partial<Effect> = {}): Effect {
  return {
    name: 'N1', line: 'north', area_m2: 1300, clean_coefficient_w_m2k: 960,
    now: {
      at: '2026-11-30T12:00:00Z', hours: 1, coefficient_w_m2k: 730, coefficient_u: 17, coefficient_u_random: 4, heating_temperature_c: 76.3, boiling_temperature_c: 59.4,
      elevation_k: 3.4, driving_force_k: 16.9, driving_force_u: 0.4, head_corrected_driving_force_k: null, head_corrected_driving_force_u: null, duty_kw: 16000, duty_u: 300, heat_flux_kw_m2: 12.3, cleanliness: 0.76, cleanliness_u: 0.02,
      fouling_resistance_m2k_w: 0.00033, fouling_resistance_u: 0.00003, clean_coefficient_w_m2k: 960, clean_coefficient_u: 12, coefficient_at_reference_w_m2k: 731, coefficient_at_reference_u: 15, clean_from: 'design value', duty_from: 'condensate', heating_temperature_from: 'chest pressure',
      boiling_temperature_from: 'vapour pressure and elevation', reason: null,
    },
    limits: { coefficient_w_m2k: 690, cleanliness: null, hours_since_cleaning: null, resistance_m2k_w: 0.00041 },
    due: { state: 'not due', limit: null, since: null, sentence: null, evidence: [] },
    last_cleaning: null, cleaning_since: null, growth: [], surface: 'N1', campaign: null,
    ...part,
  };
}

export function line(effects: Effect[], part: Partial<Line> = {}): Line {
  return {
    name: 'north', liquor: 'juice', state: 'producing', as_of: '2026-11-30T13:30:00Z', latest_reading_at: '2026-11-30T13:31:57Z', readings: 'live',
    evaporation_kg_s: 33, required_evaporation_kg_s: 33, effects, ...part,
  };
}

export const due = (name: string, since: string) => effect({
  name, due: { state: 'due', limit: 'coefficient', since, evidence: [], sentence: `${name} has been under its coefficient floor for 34 h: 680 of 690 W/(m²·K).` },
});

export const unknown = (name: string, reason: string) => {
  const e = effect({ name, due: { state: 'unknown', limit: null, since: null, sentence: null, evidence: [] } });
  return { ...e, now: { ...e.now!, coefficient_w_m2k: null, cleanliness: null, fouling_resistance_m2k_w: null, reason } };
};
