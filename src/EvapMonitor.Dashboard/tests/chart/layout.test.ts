import { describe, expect, test } from 'vitest';
import { bodyOf, splits, valueAxis } from '../../src/chart/axis';
import { place } from '../../src/chart/gutter';
import { keyAct } from '../../src/chart/keys';
import { readView, spanOf, viewOf, writeView, zoomed } from '../../src/chart/view';

describe('labels in the gutter', () => {
  test('FarApart_StayWhereTheyBelong', () => expect(place([20, 100], 18, 0, 200)).toEqual([20, 100]));
  test.each([[[100, 101, 102]], [[5, 6, 190]], [[199, 198, 197, 10]], [[50, 50, 50, 50]]])('Wanted%s_NoneOverAnotherAndAllInside', wanted => {
    const placed = place(wanted, 18, 9, 191);
    const sorted = [...placed].sort((a, b) => a - b);
    sorted.slice(1).forEach((y, i) => expect(y - sorted[i]!).toBeGreaterThanOrEqual(18 - 1e-6));
    expect(sorted[0]).toBeGreaterThanOrEqual(9 - 1e-6);
    expect(sorted.at(-1)).toBeLessThanOrEqual(191 + 1e-6);
    // The order of the heights is kept.
    wanted.forEach((a, i) => wanted.forEach((b, j) => { if (a < b) expect(placed[i]).toBeLessThan(placed[j]!); }));
  });
});

describe('value axis', () => {
  test('FarFromZero_StartsOnARoundNumberBelow', () => expect(valueAxis(655, 985)).toEqual({ from: 600, to: 1000, step: 100 }));
  test('NearZero_StartsAtZero', () => expect(valueAxis(0.1, 0.43).from).toBe(0));
  test('Negative_IsNotClipped', () => expect(valueAxis(-0.05, 0.4).from).toBeLessThanOrEqual(-0.05));
  test('OneValue_HasRoomAround', () => { const a = valueAxis(700, 700); expect(a.from).toBeLessThan(700); expect(a.to).toBeGreaterThan(700); });
  test('Splits_FromEndToEnd', () => expect(splits({ from: 600, to: 1000, step: 100 })).toEqual([600, 700, 800, 900, 1000]));
});

describe('view', () => {
  const now = Date.parse('2026-11-30T13:32:10Z');
  test('EmptyAddress_FiveWeeksUntilNow', () => {
    const span = spanOf(readView(''), now);
    expect(new Date(span.to).toISOString()).toBe('2026-11-30T13:35:00.000Z');
    expect(span.to - span.from).toBe(35 * 86_400_000);
  });
  test('AddressOfAView_ReadsAsTheSame', () => {
    const view = { from: Date.parse('2026-11-01T00:00:00Z'), to: Date.parse('2026-11-02T12:30:00Z'), quantity: 'duty' as const };
    expect(writeView(view)).toBe('?from=2026-11-01T00:00:00Z&to=2026-11-02T12:30:00Z&quantity=duty');
    expect(readView(writeView(view))).toEqual(view);
  });
  test.each(['?from=x', '?from=2026-11-02T00:00:00Z&to=2026-11-01T00:00:00Z', '?quantity=<script>', '?quantity=driving_force'])('WrongAddress %s_CountsAsAbsent', search => {
    expect(readView(search)).toEqual({ from: null, to: null, quantity: null });
  });
  test('SpanThatReachesThePresent_KeepsFollowing', () => expect(viewOf({ from: now - 1000, to: now + 1 }, 'duty', now).to).toBeNull());
  test('Zoom_KeepsTheInstantUnderTheCursor', () => {
    const span = zoomed({ from: 0, to: 400 * 3_600_000 }, 0.5, 100 * 3_600_000);
    expect(span).toEqual({ from: 50 * 3_600_000, to: 250 * 3_600_000 });
  });
  test('Zoom_NeverUnderAnHour', () => { const s = zoomed({ from: 0, to: 3_600_000 }, 0.1, 0); expect(s.to - s.from).toBe(3_600_000); });
});

test('Keys_OnlyTheCharts', () => expect([keyAct('ArrowLeft', false), keyAct('T', false), keyAct('Tab', false)]).toEqual([{ move: -1 }, { table: true }, null]));

describe('body of the values', () => {
  const calm = Array.from({ length: 500 }, (_, i) => 700 + (i % 50));
  test('OneFarOffValue_IsLeftOut', () => expect(bodyOf([...calm, 400_000])).toEqual({ lowest: 700, highest: 749 }));
  test('NothingFarOff_AllIsIn', () => expect(bodyOf([...calm, 800])).toEqual({ lowest: 700, highest: 800 }));
  test('FewValues_AllAreIn', () => expect(bodyOf([1, 5, 90])).toEqual({ lowest: 1, highest: 90 }));
  test('AllTheSameButOne_AllAreIn', () => expect(bodyOf([...Array.from({ length: 300 }, () => 5), 9])).toEqual({ lowest: 5, highest: 9 }));
});
