import type { Campaign, Cleaning, CleaningResult } from '../../src/api/types';

export const result = (part: Partial<CleaningResult> = {}): CleaningResult => ({
  surface: 'N4', verdict: 'cleaned', reason: '', before_m2k_w: { value: 0.000388, u: 0.000002 }, removed_m2k_w: { value: 0.00037, u: 0.0000016 }, left_m2k_w: { value: 0.000018, u: 0.000002 },
  removed_share: 0.953, confidence: 0.999, ...part,
});

export const cleaning = (part: Partial<Cleaning> = {}): Cleaning => ({
  id: 'a', line: 'north', effect: 'N4', body: null, start: '2026-10-26T00:00:00Z', end: '2026-10-26T08:00:00Z', kind: 'chemical', note: '', logged_at: '2026-10-26T09:00:00Z', known_by: 'logged',
  result: result(), ...part,
});

export const recognised = (part: Partial<Cleaning> = {}) => cleaning({ id: null, kind: '', logged_at: null, known_by: 'recognised', ...part });

export const campaign = (part: Partial<Campaign> = {}): Campaign => ({
  surface: 'N1', start: '2026-11-13T10:00:00Z', end: null, started_by: 'logged', confidence: 1, products: ['juice'], initial_resistance_m2k_w: { value: 0.000019, u: 0.000005 },
  final_resistance_m2k_w: { value: 0.000395, u: 0.000006 }, removed_share: 0.95, rate_m2k_w_per_day: { value: 0.000022, u: 0.0000006 }, production_hours: 400, hours_since_cleaned: 400, ...part,
});
