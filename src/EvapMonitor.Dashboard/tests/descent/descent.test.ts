import { expect, test } from 'vitest';
import type { Effect, FlowSheet } from '../../src/api/types';
import { fallsOf, liftsOf } from '../../src/descent/descent';
import { barsOf } from '../../src/descent/bars';
import { scaleOf } from '../../src/descent/scale';
import { columnsOf } from '../../src/sheet/order';
import { sheet } from '../sheet/plants';
import { effect } from '../words/sample';

/** Heating and boiling temperature, elevation, coefficient, clean coefficient. */
function with_(e: [number | null, number | null, number | null, number | null, number | null]): Effect {
  const [heating, boiling, elevation, coefficient, clean] = e, sample = effect();
  return { ...sample, clean_coefficient_w_m2k: clean, now: { ...sample.now!, heating_temperature_c: heating, boiling_temperature_c: boiling, elevation_k: elevation, coefficient_w_m2k: coefficient, cleanliness: coefficient === null || clean === null ? null : coefficient / clean, reason: coefficient === null ? 'chest pressure is absent' : null } };
}

function filled(name: string, effects: Record<string, Parameters<typeof with_>[0]>): Pick<FlowSheet, 'places' | 'ways'> {
  const { places, ways } = sheet(name);
  return { ways, places: places.map(p => (p.kind === 'effect' ? { ...p, effect: with_(effects[p.name]!) } : p)) };
}

const forward = filled('forward-four-effects', {
  W1: [108.9, 97.2, 0.7, 2552, 2900], W2: [96.1, 89.0, 1.0, 2100, 2500], W3: [87.6, 78.3, 1.5, 1634, 1900], W4: [76.3, 59.4, 3.4, 715, 960],
});

test('the parts of every column add up to the kelvins between the two chests', () => {
  const falls = fallsOf(forward), chain = ['W1', 'W2', 'W3', 'W4'].map(n => falls.get(`effect/${n}`)!);
  chain.forEach((f, i) => {
    expect(f.heating! - f.clean! - f.scale!).toBeCloseTo(f.boiling!, 12);
    expect(f.boiling! - f.elevation!).toBeCloseTo(f.condensing!, 12);
    const next = chain[i + 1];
    if (next) expect(f.heating! - f.clean! - f.scale! - f.elevation! - f.loss!).toBeCloseTo(next.heating!, 12);
    else expect(f.loss).toBeNull();
  });
  const spent = chain.reduce((sum, f) => sum + f.clean! + f.scale! + f.elevation! + (f.loss ?? 0), 0);
  expect(spent).toBeCloseTo(108.9 - 56.0, 10);
});

test('scale is heat flux times fouling resistance', () => {
  // By hand: q = 2552 W/(m²·K) · 11.7 K; Rf = 1/2552 − 1/2900 m²·K/W; q·Rf = 11.7 · (1 − 2552/2900) = 1.404 K.
  const f = fallsOf(forward).get('effect/W1')!;
  expect(f.scale).toBeCloseTo(2552 * 11.7 * (1 / 2552 - 1 / 2900), 10);
  expect(f.scale).toBeCloseTo(1.404, 3);
});

test('a wall better than clean has negative scale, never clipped', () => {
  const f = fallsOf(filled('one-effect', { E1: [110, 100, 0, 2200, 2000] })).get('effect/E1')!;
  expect(f.scale).toBeCloseTo(-1, 12);
  expect(f.clean! + f.scale!).toBeCloseTo(10, 12);
});

test('without a coefficient nothing is divided, and the reason is kept', () => {
  const f = fallsOf(filled('one-effect', { E1: [110, 100, 0.4, null, 2000] })).get('effect/E1')!;
  expect([f.drive, f.clean, f.scale, f.reason]).toEqual([10, null, null, 'chest pressure is absent']);
  const dark = fallsOf(filled('one-effect', { E1: [null, 100, null, null, 2000] })).get('effect/E1')!;
  expect([dark.drive, dark.condensing, dark.loss]).toEqual([null, null, null]);
});

test('without a clean value the drive stays whole and there is no reason to give', () => {
  const f = fallsOf(filled('one-effect', { E1: [110, 100, 0.4, 1800, null] })).get('effect/E1')!;
  expect([f.drive, f.clean, f.scale, f.reason]).toEqual([10, null, null, null]);
});

test('a recompressor lifts from where the vapour condenses to the chest', () => {
  const jet = filled('thermal-recompression', { F1: [70, 65, 0.3, 2000, 2600], F2: [64, 60, 0.4, 2000, 2300], F3: [59, 53, 0.8, 1500, 1700], FINISHER: [90, 60, 2, 700, 900] });
  expect(liftsOf(jet, fallsOf(jet)).get('recompressor/J1')!.lift).toBeCloseTo(70 - 64.7, 12);
  const fan = filled('mechanical-recompression', { E1: [75, 70, 0.6, 1900, 2100] });
  expect(liftsOf(fan, fallsOf(fan)).get('recompressor/FAN')!.lift).toBeCloseTo(75 - 69.4, 12);
});

test('vapour that heats two chests loses most on the way to the colder', () => {
  const s = filled('one-effect', { E1: [110, 100, 0, 1800, 2000] });
  const two = { places: [...s.places, ...['A', 'B'].map((n, i) => ({ ...s.places[0]!, id: `effect/${n}`, name: n, effect: with_([99.5 - i, 90, 0, 1000, 2000]) }))], ways: [...s.ways, ...['A', 'B'].map(n => ({ ...s.ways[0]!, from: 'effect/E1', to: `effect/${n}`, kind: 'vapour' as const }))] };
  expect(fallsOf(two).get('effect/E1')!.loss).toBeCloseTo(1.5, 12);
});

test('the scale holds every value on round ticks', () => {
  const s = scaleOf([108.9, 55.6, null])!;
  expect(s.ticks).toEqual([60, 70, 80, 90, 100, 110]);
  expect([s.high > 110, s.low < 55.6]).toEqual([true, true]);
  expect(scaleOf([null])).toBeNull();
  expect(scaleOf([60, 60])!.ticks).toEqual([60]);
});

test('the pieces of a column follow each other from the chest to the next one', () => {
  const falls = fallsOf(forward), columns = columnsOf(forward), bars = barsOf(columns, falls, new Map(), forward.ways);
  const first = bars.filter(b => columns[b.column]!.name === 'W1');
  expect(first.map(b => b.fill)).toEqual(['clean', 'scale', 'elevation', 'loss']);
  expect(first[0]!.from).toBe(108.9);
  first.slice(1).forEach((b, i) => expect(b.from).toBeCloseTo(first[i]!.to, 12));
  expect(first.at(-1)!.to).toBeCloseTo(96.1, 12);
});

test('scale that cannot be told from clean is not drawn', () => {
  const s = filled('one-effect', { E1: [110, 100, 0, 1990, 2000] });
  expect(barsOf(columnsOf(s), fallsOf(s), new Map(), s.ways).map(b => b.fill)).toEqual(['clean']);
});

test('without a coefficient the column is an outline, of no more than what heats it and what it heats allow', () => {
  const dark = filled('forward-four-effects', { W1: [108.9, 97.2, 0.7, 2552, 2900], W2: [null, null, null, null, 2500], W3: [87.6, 78.3, 1.5, null, 1900], W4: [76.3, 59.4, 3.4, 715, 960] });
  const columns = columnsOf(dark), bars = barsOf(columns, fallsOf(dark), new Map(), dark.ways), of = (name: string) => bars.filter(b => columns[b.column]!.name === name);
  expect(of('W2')).toEqual([{ column: 2, fill: 'unknown', from: 96.5, to: 87.6 }]);
  expect(of('W3')[0]).toMatchObject({ fill: 'unsure', from: 87.6, to: 78.3 });
});
