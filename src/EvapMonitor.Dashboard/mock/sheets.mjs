import { readFileSync } from 'node:fs';
import { effectOf, lineOf } from './answers.mjs';
import { start } from './plant.mjs';

const drawn = JSON.parse(readFileSync(new URL('../tests/sheet/plants.json', import.meta.url), 'utf8'));
const iso = t => new Date(t).toISOString();

/** Lines that run in every way that the tests know, with invented figures: the steam falls by 11 K from effect to effect. */
export const everyWay = Object.entries(drawn).map(([name, { places, ways }], l) => {
  const effects = places.filter(p => p.kind === 'effect'), depth = new Map(effects.map(e => [e.id, 0]));
  for (const _ of effects) for (const w of ways) if (w.kind === 'vapour' && depth.has(w.from) && depth.has(w.to)) depth.set(w.to, Math.max(depth.get(w.to), depth.get(w.from) + 1));
  return {
    name, liquor: 'juice', stale: name === 'one-effect' ? 3.4 * 3_600_000 : 0, evaporation: 30, required: 28,
    effects: effects.map((e, i) => {
      const deep = depth.get(e.id), force = 8 + ((i * 7 + l) % 5) * 0.7, elevation = 0.6 + deep * 0.35;
      return { name: e.name, clean: 2900 - 260 * deep, rate: 0.003 + 0.002 * (i % 3), residual: 0.03, cleaned: 24, floor: 900, share: null, hours: null, Ts: 118.4 - 11 * deep, force, elevation, area: 1300, duty: 36500 - 1700 * deep,
        unknown: name === 'mixed-seven-effects' && i === 3 ? 'the vapour pressure of N3 is absent since Sunday' : undefined, cleaning: name === 'nine-effects' && i === 6 ? 2.5 : undefined };
    }),
  };
});

/** The flow sheet of a line as the interface answers it; a line without a drawing of its own runs forward. */
export function sheetOf(line, now) {
  const { name, state, as_of, latest_reading_at, readings } = lineOf(line, now), own = drawn[line.name] ?? forward(line);
  const fresh = m => m && { ...m, at: latest_reading_at, state: line.stale ? 'stale' : 'good' };
  return {
    line: name, now: iso(now), state, as_of, latest_reading_at, readings,
    places: own.places.map(p => ({ ...p, measured: p.measured.map(fresh), effect: p.kind === 'effect' ? effectOf(line, line.effects.find(e => e.name === p.name)) : null })),
    ways: own.ways.map(w => ({ ...w, flow: fresh(w.flow) })),
  };
}

function forward({ effects }) {
  const place = (id, kind, name, measured = []) => ({ id, kind, name, measured, effect: null, bodies: [] });
  const way = (from, to, kind, flow = null) => ({ from, to, kind, share: null, share_u: null, flow, balance: { value: flow?.value ?? 43.21, standard: 0.6, unit: 't/h', as_of: iso(start), agrees: flow ? flow.what !== 'feed' : null } });
  const flow = (what, value) => ({ what, signal: `${what.toUpperCase()}.FT-1`, value, unit: 't/h', at: iso(start), state: 'good' });
  const id = e => `effect/${e.name}`, last = effects.length - 1;
  return {
    places: [...effects.map(e => place(id(e), 'effect', e.name)), place('steam', 'steam', 'steam'), place('feed', 'feed', 'feed'), place('product', 'product', 'product'), place('condenser', 'condenser', 'condenser'), place('condensate', 'condensate', 'condensate')],
    ways: effects.flatMap((e, i) => [
      i === 0 ? way('steam', id(e), 'steam', flow('steam', 48.2)) : way(id(effects[i - 1]), id(e), 'vapour'), i === 0 ? way('feed', id(e), 'liquor', flow('feed', 187.3)) : way(id(effects[i - 1]), id(e), 'liquor'),
      way(id(e), 'condensate', 'condensate', flow(e.name, 44.1 - 3 * i)), ...(i === last ? [way(id(e), 'condenser', 'vapour'), way(id(e), 'product', 'liquor', flow('product', 41.6))] : []),
    ]),
  };
}
