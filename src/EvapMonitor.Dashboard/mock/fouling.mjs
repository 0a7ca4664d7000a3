import { cleanings, start } from './plant.mjs';
import { at } from './series.mjs';

const day = 86_400_000, iso = t => new Date(t).toISOString();
const nothing = { value: null, u: null };
const known = (value, share = 0.02) => ({ value, u: Math.max(Math.abs(value) * share, 1e-6) });

/** Ways in which cleanings of the invented site are not simply logged and good. */
const how = { 'c-N4-1': { known_by: 'recognised', id: null, kind: '', note: '', logged_at: null }, 'c-B1-1': { known_by: 'signal', id: null, kind: '', note: '', logged_at: null } };
const verdicts = {
  'c-N2-0': { verdict: 'did not clean', kept: 0.97 }, 'c-S2-1': { verdict: 'cannot be told', reason: 'product or effect changed, and the clean coefficient with juice is not learnt' },
  'c-S3-0': { verdict: 'awaiting hours', reason: 'nothing was produced since' },
};

/** A cleaning as the interface answers it, with what it brought. */
export function cleaningOf(c, line, effect) {
  const own = { body: null, known_by: 'logged', result: null, ...c, ...how[c.id] };
  const told = verdicts[c.id], surface = c.body ?? c.effect;
  if (own.rejected) return { ...own, known_by: 'rejected' };
  if (c.end === null || !effect) return own;
  if (told?.reason) return { ...own, result: { surface, verdict: told.verdict, reason: told.reason, before_m2k_w: nothing, removed_m2k_w: nothing, left_m2k_w: nothing, removed_share: null, confidence: null } };
  const before = at(line, effect, Date.parse(c.start) - 1).fouling, left = told ? before * told.kept : effect.residual / effect.clean * (0.7 + 0.6 * ((Date.parse(c.start) / day) % 1));
  return { ...own, result: { surface, verdict: told?.verdict ?? 'cleaned', reason: '', before_m2k_w: known(before), removed_m2k_w: known(before - left), left_m2k_w: known(left, 0.2), removed_share: (before - left) / before, confidence: told ? 0.2 : 0.999 } };
}

/** Cleanings of a plant that are asked for, newest first. */
export const cleaningsOf = (plant, line, effect) => cleanings
  .filter(c => (!line || c.line === line) && (!effect || c.effect === effect))
  .map(c => { const l = plant.find(x => x.name === c.line); return cleaningOf(c, l, l?.effects.find(e => e.name === c.effect)); })
  .sort((a, b) => b.start.localeCompare(a.start));

/** Campaigns of an effect as the interface answers them: one after each cleaning. */
export function campaignsOf(plant, line, effect) {
  const ended = cleaningsOf(plant, line.name, effect.name).filter(c => c.end !== null && c.known_by !== 'rejected');
  const campaigns = ended.map((c, i) => {
    const from = Date.parse(c.end), to = i === 0 ? start : Date.parse(ended[i - 1].start), days = (to - from) / day;
    return {
      surface: effect.name, start: c.end, end: i === 0 ? null : ended[i - 1].start, started_by: c.known_by, confidence: c.result?.confidence ?? 1, products: [line.liquor],
      initial_resistance_m2k_w: c.result?.left_m2k_w ?? nothing, final_resistance_m2k_w: known(at(line, effect, to - 1).fouling), removed_share: c.result?.removed_share ?? null,
      rate_m2k_w_per_day: days < 1 ? nothing : known(effect.rate / effect.clean, effect.name === 'S3' ? 0.8 : 0.03), production_hours: Math.round(days * 23), hours_since_cleaned: Math.round(days * 23),
    };
  });
  const from = campaigns[0]?.start ?? iso(start);
  return {
    line: line.name, effect: effect.name, surface: effect.name, campaigns, version: campaigns.length === 0 ? 0 : 7,
    stops: [{ surface: effect.name, start: iso(start - 6.4 * day), end: iso(start - 6 * day), reason: 'nothing recovered' }],
    water_tests: effect.name === 'B1' ? [{ surface: 'B1', start: iso(start - 10.2 * day), end: iso(start - 10.1 * day), coefficient_w_m2k: known(2310, 0.01), resistance_since_previous_m2k_w: nothing }] : [],
    clean_references: campaigns.length === 0 ? [] : [{
      surface: effect.name, product: line.liquor, since: from, source: 'level of 2 of the last 3 cleanings with this product, the last on 2026-11-03; conditions learnt from 1645 hours of 72 days: solids -0.21 ± 0.03, boiling temperature 0.004 ± 0.001, flux 0 ± 0.018 (not told from 0)',
      coefficient_w_m2k: known(effect.clean, 0.006), by_solids: { value: -0.21, u: 0.03 }, by_boiling_temperature: { value: 0.004, u: 0.001 }, by_heat_flux: { value: 0, u: 0.018 },
      reference_solids: 0.34, reference_boiling_temperature_c: effect.Ts - effect.force, reference_heat_flux_kw_m2: effect.duty / effect.area,
    }],
  };
}
