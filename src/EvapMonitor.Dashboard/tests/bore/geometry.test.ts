import { describe, expect, test } from 'vitest';
import { hoursShare } from '../../src/bore/deposit';
import { arcPath, boreShape, boundaries, hatch, type Deposit } from '../../src/bore/geometry';
import { effect } from '../words/sample';

const deposit = (part: Partial<Deposit>): Deposit => ({ resistance: 0.5, uncertainty: 0.05, limit: 1, residual: null, growth: [], ...part });
const R = 52, bore = R - 3;

describe('bore', () => {
  test.each([[0.5, 0.8], [1, 0.6], [1.5, 0.4], [2, 0.2], [2.3, 0.2]])('ShareOfLimit%s_ClearRadiusIs%sOfTheBore', (resistance, clear) => {
    const shape = boreShape(deposit({ resistance }), R);
    expect(shape.clear! / bore).toBeCloseTo(clear, 10);
    expect(shape.limit / bore).toBeCloseTo(0.6, 10);
    expect(shape.share).toBeCloseTo(resistance, 10);
  });

  test('EqualWeeks_EqualThickness', () => {
    const { strata } = boreShape(deposit({ resistance: 0.9, growth: [0.3, 0.6] }), R);
    expect(strata).toHaveLength(3);
    const thickness = strata.map(s => s.outer - s.inner);
    expect(thickness[1]).toBeCloseTo(thickness[0]!, 10);
    expect(thickness[2]).toBeCloseTo(thickness[0]!, 10);
  });

  test('GapsBetweenStrata_TakenOutOfTheStrata', () => {
    const shape = boreShape(deposit({ resistance: 0.9, growth: [0.3, 0.6] }), R);
    expect(shape.strata[0]!.inner - shape.strata[1]!.outer).toBeCloseTo(1, 10);
    expect(shape.strata.at(-1)!.inner).toBeCloseTo(shape.clear!, 10);
  });

  test('StrataUnder3Px_Merge', () => {
    const { strata, clear } = boreShape(deposit({ resistance: 0.5, growth: [0.05, 0.1, 0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45] }), R);
    expect(strata.length).toBeLessThan(5);
    for (const s of strata) expect(s.outer - s.inner).toBeGreaterThanOrEqual(2 - 1e-9);
    expect(strata.at(-1)!.inner).toBeCloseTo(clear!, 10);
  });

  test('ThinDeposit_OneRingUpToTheResistance', () => {
    const { strata } = boreShape(deposit({ resistance: 0.1, uncertainty: 0.01, growth: [0.05] }), R);
    expect(strata).toHaveLength(1);
    expect(strata[0]!.outer - strata[0]!.inner).toBeCloseTo(0.1 * 0.4 * bore, 10);
  });

  test('Decline_RemovesTheNewest', () => {
    expect(boundaries([0.2, 0.5, 0.6], 0, 0.4)).toEqual([0.2, 0.4]);
    expect(boundaries([0.5, 0.3], 0, 0.6)).toEqual([0.3, 0.6]);
  });

  test('Residual_LiesAtTheWallAndGrowthOnIt', () => {
    const { residual, strata, clear } = boreShape(deposit({ resistance: 0.6, residual: 0.2, growth: [0.4] }), R);
    expect(bore - residual!.inner).toBeCloseTo(0.2 * 0.4 * bore, 10);
    expect(strata[0]!.outer).toBeLessThanOrEqual(residual!.inner);
    expect(strata.at(-1)!.inner).toBeCloseTo(clear!, 10);
  });

  test('ResidualLargerThanPresent_IsCutToThePresent', () => {
    const shape = boreShape(deposit({ resistance: 0.3, residual: 0.5 }), R);
    expect(shape.residual!.inner).toBeCloseTo(shape.clear!, 10);
    expect(shape.strata).toHaveLength(0);
  });

  test('ResistanceUnderItsUncertainty_NoDeposit', () => {
    const shape = boreShape(deposit({ resistance: 0.04 }), R);
    expect(shape.cleanWithinUncertainty).toBe(true);
    expect(shape.clear).toBe(bore);
    expect(shape.strata).toEqual([]);
  });

  test('NegativeResistance_NoDepositAndNoNegativeRing', () => {
    const shape = boreShape(deposit({ resistance: -0.3 }), R);
    expect(shape.clear).toBe(bore);
    expect(shape.strata).toEqual([]);
    expect(shape.cleanWithinUncertainty).toBe(false);
  });

  test('UnknownResistance_NothingButTheWall', () => {
    const shape = boreShape(deposit({ resistance: null }), R);
    expect([shape.clear, shape.share, shape.whisker, shape.strata, shape.hatch]).toEqual([null, null, null, [], []]);
  });

  test('OverTheLimit_HatchStaysBetweenLimitAndInnerEdge', () => {
    const shape = boreShape(deposit({ resistance: 1.5 }), R);
    expect(shape.hatch.length).toBeGreaterThan(5);
    for (const s of shape.hatch) for (const [x, y] of [[s.x1, s.y1], [s.x2, s.y2]] as const) {
      const r = Math.hypot(x, y);
      expect(r).toBeLessThanOrEqual(shape.limit + 1e-9);
      expect(r).toBeGreaterThanOrEqual(shape.clear! - 1e-9);
    }
    // A line that would cross the clear middle is two lines.
    for (const s of shape.hatch) expect(Math.hypot((s.x1 + s.x2) / 2, (s.y1 + s.y2) / 2)).toBeGreaterThanOrEqual(shape.clear! - 1e-9);
  });

  test('UnderTheLimit_NoHatch', () => expect(boreShape(deposit({ resistance: 0.9 }), R).hatch).toEqual([]));

  test('Whisker_SpansTheUncertaintyBothWays', () => {
    const shape = boreShape(deposit({ resistance: 0.5, uncertainty: 0.1 }), R);
    expect(shape.whisker!.from).toBeCloseTo(bore * (1 - 0.4 * 0.6), 10);
    expect(shape.whisker!.to).toBeCloseTo(bore * (1 - 0.4 * 0.4), 10);
  });

  test('SmallBore_OneGrowthRing', () => {
    const shape = boreShape(deposit({ resistance: 0.9, growth: [0.3, 0.6] }), 22);
    expect(shape.strata).toHaveLength(1);
  });
});

test('HatchOfAFullDisc_CoversIt', () => expect(hatch(10, 0, 5).length).toBeGreaterThanOrEqual(3));

test.each([[0.25, 'M0 -10A10 10 0 0 1 10 0'], [0.5, 'M0 -10A10 10 0 0 1 0 10'], [0.75, 'M0 -10A10 10 0 1 1 -10 0']])('HoursShare%s_ArcClockwiseFromTheTop', (share, path) => {
  expect(arcPath(10, share).replace(/-0(?![.\d])/g, '0')).toBe(path.replace(/-0(?![.\d])/g, '0'));
});

test('HoursArc_SaysWhatTheLimitsTableSays', () => {
  const hours = { limit: 'hours', value: 440, bound: 900, unit: 'h', state: 'not due' as const, since: null };
  const of = (evidence: typeof hours[]) => hoursShare(effect({ due: { state: 'not due', limit: null, since: null, sentence: null, evidence } }));
  expect(of([hours])).toBeCloseTo(0.489, 3);
  expect(of([])).toBeNull();
});
