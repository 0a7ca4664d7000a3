import { describe, expect, test } from 'vitest';
import type { Trend } from '../../src/api/types';
import { columns, extent, holeWiderThan, reasonsIn } from '../../src/chart/trend';

const trend = (part: Partial<Trend>): Trend => ({
  line: 'north', effect: 'N4', quantity: 'coefficient', unit: 'W/(m2.K)', resolution: 'window', step_s: 300, start: '2026-11-01T00:00:00Z',
  offset_s: [0, 300, 600, 900], value: [731, 730, null, 728], u: [17, 17, null, 17], u_random: [4, 4, null, 4], mark: ['', '', '', ''], steady: [true, true, null, null],
  reasons: ['no driving force'], reason: [-1, -1, 0, -1], data_version: 1, ...part,
});
const start = Date.parse('2026-11-01T00:00:00Z') / 1000;

describe('trend', () => {
  test('Null_BreaksLineAndBandAndKeepsItsReason', () => {
    const c = columns(trend({}));
    expect(c.value).toEqual([731, 730, null, 728]);
    expect(c.lower).toEqual([714, 713, null, 711]);
    expect(c.upper).toEqual([748, 747, null, 745]);
    expect(c.reason[2]).toBe('no driving force');
    expect(c.x[1]).toBe(start + 300);
  });
  test('WindowsAbsentAltogether_BreakTheLine', () => {
    const c = columns(trend({ offset_s: [0, 300, 1500, 1800], value: [1, 2, 3, 4], u: [1, 1, 1, 1], reason: [-1, -1, -1, -1] }));
    expect(c.value).toEqual([1, 2, null, 3, 4]);
    expect(c.x[2]).toBe(start + 900);
  });
  test('ThinnedUnevenly_IsNotAGap', () => {
    const c = columns(trend({ offset_s: [0, 1200, 1500, 2700], value: [1, 2, 3, 4], u: [1, 1, 1, 1], reason: [-1, -1, -1, -1] }));
    expect(c.value).toEqual([1, 2, 3, 4]);
  });
  test('NotProducing_IsADotAndNeverJoined', () => {
    const c = columns(trend({ value: [731, 500, 510, 728], u: [17, 17, 17, 17], mark: ['', 'not producing', 'not producing', ''] }));
    expect(c.value).toEqual([731, null, null, 728]);
    expect(c.idle).toEqual([null, 500, 510, null]);
    expect(c.upper[1]).toBeNull();
  });
  test('NotSteady_IsHollowAndNeverJoined', () => {
    const c = columns(trend({ value: [731, 700, 705, 728], u: [17, 17, 17, 17], mark: ['', '', 'not producing', ''], steady: [true, false, false, null] }));
    expect(c.value).toEqual([731, null, null, 728]);
    expect(c.idle).toEqual([null, 700, 705, null]);
    expect(c.unsteady).toEqual([false, true, false, false]);
  });
  test('ValueBetweenGaps_StandsAlone', () => {
    expect(columns(trend({})).alone).toEqual([null, null, null, 728]);
  });
  test('Extrapolated_StaysJoinedAndIsMarked', () => {
    const c = columns(trend({ mark: ['', 'extrapolated', 'extrapolated', ''] }));
    expect(c.extrapolated).toEqual([false, true, false, false]);
    expect(c.value[1]).toBe(730);
  });
  test('ValueWithoutUncertainty_HasNoBand', () => {
    const c = columns(trend({ u: [null, 17, null, 17] }));
    expect([c.value[0], c.lower[0], c.upper[0]]).toEqual([731, null, null]);
  });
  test('Resistance_ScaledWithItsUncertainty', () => {
    const c = columns(trend({ quantity: 'fouling_resistance', unit: 'm2.K/W', value: [0.0003, 0.0003, null, 0.0003], u: [0.00003, 0.00003, null, 0.00003] }));
    expect(c.unit).toBe('m²·K/kW');
    expect(c.upper[0]).toBeCloseTo(0.33, 10);
  });
  test('Empty_NothingBreaks', () => {
    const c = columns(trend({ offset_s: [], value: [], u: [], u_random: [], mark: [], steady: [], reason: [] }));
    expect(c.x).toEqual([]);
    expect(extent(c, 0, Infinity)).toBeNull();
  });
});

test('Extent_OnlyWhatIsInTheSpan', () => {
  expect(extent(columns(trend({})), start + 100, start + 400)).toMatchObject({ first: 730, last: 730, lastIndex: 1 });
});
test('Reasons_CommonestFirst', () => {
  const c = columns(trend({ value: [null, null, null, null], reasons: ['a', 'b'], reason: [0, 1, 1, -1] }));
  expect(reasonsIn(c, 0, Infinity)).toEqual(['b', 'a']);
});
test('FullSeries_OneMissingWindowIsAHole', () => expect(holeWiderThan([0, 300, 600, 1200], 300)).toBeLessThan(600));
test('ThinnedToHalf_PointsTwoAndThreeStepsApartAreJoined', () => {
  // As the service thins 840 hours to 800 points: the lowest and the highest of each three.
  const offsets = Array.from({ length: 200 }, (_, i) => [3 * i, 3 * i + 1 + (i % 2)]).flat().map(h => h * 3600);
  expect(holeWiderThan(offsets, 3600)).toBeGreaterThan(3 * 3600);
});
