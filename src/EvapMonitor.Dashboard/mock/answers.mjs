import { campaignsOf, cleaningOf } from './fouling.mjs';
import { cleanings, start } from './plant.mjs';
import { at } from './series.mjs';

const day = 86_400_000, iso = t => new Date(t).toISOString();

/** An effect as the interface answers it. */
export function effectOf(line, e) {
  const t = start - Math.max(line.stale, 300_000);
  const known = !e.unknown && !e.cleaning;
  const s = at(line, e, t - 1);
  const coefficient = s.coefficient, clean = s.clean;
  const r = coefficient === null ? null : 1 / coefficient - 1 / clean;
  const limitR = e.floor === null && e.share === null ? null : Math.min(e.floor ? 1 / e.floor - 1 / clean : Infinity, e.share ? (1 / e.share - 1) / clean : Infinity);
  const own = cleanings.filter(c => c.effect === e.name && c.end !== null).sort((a, b) => b.end.localeCompare(a.end))[0];
  const hours = own ? (start - Date.parse(own.end)) / 3_600_000 : null;
  const weeks = own ? Math.floor((start - Date.parse(own.end)) / (7 * day)) : 0;
  const growth = own ? Array.from({ length: weeks }, (_, i) => at(line, e, Date.parse(own.end) + (i + 1) * 7 * day).fouling) : [];
  const evidence = [];
  const put = (limit, value, bound, unit, due) => evidence.push({ limit, value, bound, unit, state: value === null ? 'unknown' : due ? 'due' : 'not due', since: due ? iso(start - 34 * 3_600_000) : null });
  if (e.floor) put('coefficient', coefficient, e.floor, 'W/(m2.K)', coefficient !== null && coefficient < e.floor);
  if (e.share) put('cleanliness', coefficient === null ? null : coefficient / clean, e.share, '1', coefficient !== null && coefficient / clean < e.share);
  if (e.hours) put('hours_since_cleaning', hours, e.hours, 'h', hours > e.hours);
  const due = evidence.find(x => x.state === 'due');
  const state = due ? 'due' : evidence.length === 0 ? 'no limit' : !known ? 'unknown' : 'not due';
  return {
    name: e.name, line: line.name, area_m2: e.area, clean_coefficient_w_m2k: e.clean,
    now: {
      at: iso(Math.floor((t - 3_600_000) / 3_600_000) * 3_600_000), hours: 1, coefficient_w_m2k: coefficient, coefficient_u: coefficient && s.u, coefficient_u_random: coefficient && s.u / 4,
      heating_temperature_c: e.unknown ? null : e.Ts, boiling_temperature_c: e.Ts - e.force - e.elevation, elevation_k: e.elevation, driving_force_k: e.unknown ? null : e.force, driving_force_u: e.unknown ? null : 0.4, head_corrected_driving_force_k: null, head_corrected_driving_force_u: null,
      duty_kw: e.duty, duty_u: e.duty * 0.018, heat_flux_kw_m2: e.duty / e.area, cleanliness: coefficient && coefficient / clean, cleanliness_u: coefficient && 0.02,
      fouling_resistance_m2k_w: r, fouling_resistance_u: r === null ? null : 0.02 / clean * 1.1, clean_coefficient_w_m2k: coefficient && clean, clean_coefficient_u: coefficient && clean * 0.006,
      coefficient_at_reference_w_m2k: coefficient && 1 / (1 / e.clean + r), coefficient_at_reference_u: coefficient && s.u * 0.6,
      clean_from: 'level of 2 of the last 3 cleanings with this product, the last on 2026-11-03; conditions learnt from 1645 hours of 72 days', duty_from: 'condensate', heating_temperature_from: 'chest pressure', boiling_temperature_from: 'vapour pressure and elevation', reason: s.reason,
    },
    limits: { coefficient_w_m2k: e.floor, cleanliness: e.share, hours_since_cleaning: e.hours, resistance_m2k_w: limitR },
    due: {
      state, limit: due?.limit ?? null, since: due?.since ?? null, evidence,
      sentence: due && due.limit === 'coefficient' ? `${e.name} has been under its coefficient floor for 34 h: ${Math.round(due.value)} of ${due.bound} W/(m²·K).`
        : due ? `${e.name} has run longer than its ${due.bound} h since the last cleaning.` : null,
    },
    last_cleaning: own ? cleaningOf(own, line, e) : null,
    cleaning_since: e.cleaning ? iso(start - e.cleaning * 3_600_000) : null, growth, surface: e.name, campaign: own ? campaignsOf([line], line, e).campaigns[0] : null,
  };
}

export function lineOf(l, now) {
  const latest = l.stale ? start - l.stale : now - 3000;
  return {
    name: l.name, liquor: l.liquor, state: 'producing', as_of: iso(l.stale ? start - l.stale : start - 120_000), latest_reading_at: iso(latest), readings: l.stale ? 'stale' : 'live',
    evaporation_kg_s: l.evaporation, required_evaporation_kg_s: l.required, effects: l.effects.map(e => effectOf(l, e)),
  };
}
