import { cleanings, start } from './plant.mjs';

const day = 86_400_000, window = 300_000;

/** A number from 0 to 1 that depends on its arguments alone. */
export function noise(seed, i) {
  let h = Math.imul(seed ^ 0x9e3779b9, 0x85ebca6b) ^ Math.imul(i + 1, 0xc2b2ae35);
  h = Math.imul(h ^ (h >>> 15), 0x2c1b3c6d);
  h ^= h >>> 12;
  return ((h >>> 0) % 100_000) / 100_000;
}

const seedOf = name => [...name].reduce((s, c) => (s * 31 + c.charCodeAt(0)) | 0, 7);

/** What holds for an effect at an instant: clean coefficient, coefficient, marks, reasons. */
export function at(line, effect, t) {
  const seed = seedOf(effect.name), i = Math.floor(t / window);
  const clean = effect.clean * (1 + 0.014 * Math.sin(t / day / 3) + 0.004 * Math.sin(t / day * 6.28));
  const own = cleanings.filter(c => c.effect === effect.name);
  const during = own.find(c => t >= Date.parse(c.start) && (c.end === null || t < Date.parse(c.end)));
  const last = Math.max(...own.map(c => (c.end === null ? -Infinity : Date.parse(c.end))).filter(e => e <= t), -Infinity);
  const age = last === -Infinity ? (((t / day) % 28) + 28) % 28 : (t - last) / day;
  const fouling = (effect.residual + effect.rate * age * (age < 18 || effect.name !== 'N3' ? 1 : 18 / age)) / effect.clean;
  const coefficient = 1 / (1 / clean + fouling) * (1 + 0.012 * (noise(seed, i) - 0.5) + 0.01 * (noise(seed + 1, Math.floor(i / 60)) - 0.5));
  const dayNumber = Math.floor(t / day);
  const stop = noise(99, dayNumber) > 0.93 && t % day < day / 4;
  const missing = noise(seed + 2, dayNumber) > 0.95 && t % day > day * 0.6;
  const reason = during ? 'cleaning' : missing ? 'no driving force: chest pressure is absent' : effect.unknown && t > start - 1.5 * day ? effect.unknown : t > start - line.stale ? 'no reading' : null;
  return { clean, coefficient: reason ? null : stop ? coefficient * (0.7 + 0.3 * noise(seed, i + 9)) : noise(seed, i) > 0.9998 ? coefficient * 30 : coefficient, fouling, u: coefficient * 0.023, mark: stop ? 'not producing' : noise(5, Math.floor(t / day * 2)) > 0.97 ? 'extrapolated' : '', reason };
}

const units = { solids: '%', feed_flow: 'kg/s', coefficient_at_reference: 'W/(m2.K)', head_corrected_driving_force: 'K', coefficient: 'W/(m2.K)', clean_coefficient: 'W/(m2.K)', cleanliness: '1', fouling_resistance: 'm2.K/W', driving_force: 'K', duty: 'kW', heating_temperature: 'degC', boiling_temperature: 'degC', elevation: 'K', heat_flux: 'kW/m2' };

function value(quantity, line, effect, s, t) {
  if (s.coefficient === null) return [null, null];
  const wave = 1 + 0.02 * Math.sin(t / day * 2.1) + 0.006 * (noise(3, Math.floor(t / window)) - 0.5);
  switch (quantity) {
    case 'coefficient': return [s.coefficient, s.u];
    case 'clean_coefficient': return [s.clean, s.clean * 0.02];
    case 'cleanliness': return [s.coefficient / s.clean, 0.02];
    case 'fouling_resistance': return [1 / s.coefficient - 1 / s.clean, 0.023 / s.coefficient];
    case 'driving_force': return [effect.force * wave, 0.4];
    case 'solids': return [30 * wave, null];
    case 'feed_flow': return [52 * wave, null];
    case 'coefficient_at_reference': return [1 / (1 / effect.clean + 1 / s.coefficient - 1 / s.clean), s.u * 0.6];
    case 'head_corrected_driving_force': return [null, null];
    case 'duty': return [effect.duty * wave, effect.duty * 0.018];
    case 'heating_temperature': return [effect.Ts * (0.99 + 0.01 * wave), 0.2];
    case 'boiling_temperature': return [effect.Ts - effect.force * wave, 0.3];
    case 'elevation': return [effect.elevation, 0.2];
    default: return [effect.duty * wave / effect.area, effect.duty * 0.018 / effect.area];
  }
}

/** A trend as the interface answers it. */
export function trend(line, effect, quantity, from, to, points) {
  const hourly = to - from > 40 * day;
  const step = hourly ? 3_600_000 : window;
  const first = Math.ceil(from / step) * step, last = Math.min(to, start);
  const n = Math.max(0, Math.floor((last - first) / step));
  const every = Math.max(1, Math.ceil(n / points));
  const out = { line: line.name, effect: effect.name, quantity, unit: units[quantity], resolution: hourly ? 'hour' : 'window', step_s: step / 1000, start: new Date(first).toISOString(),
    offset_s: [], value: [], u: [], u_random: [], mark: [], steady: [], reasons: [], reason: [], data_version: 1 };
  for (let i = 0; i < n; i += every) {
    const t = first + i * step, s = at(line, effect, t), [v, u] = value(quantity, line, effect, s, t);
    out.offset_s.push((i * step) / 1000);
    out.value.push(v);
    out.u.push(u);
    out.u_random.push(u === null ? null : u / 4);
    out.mark.push(v === null ? '' : s.mark);
    out.steady.push(v === null ? null : s.mark !== 'not producing');
    if (s.reason && !out.reasons.includes(s.reason)) out.reasons.push(s.reason);
    out.reason.push(v === null && s.reason ? out.reasons.indexOf(s.reason) : -1);
  }
  return out;
}
