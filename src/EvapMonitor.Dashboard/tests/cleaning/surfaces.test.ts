import { describe, expect, test } from 'vitest';
import { median, strokes, surfaceRecords } from '../../src/cleaning/surfaces';
import { bodiesIn } from '../../src/cleaning/use-bodies';
import { campaign, cleaning, recognised, result } from '../words/sample-cleaning';

const of = (day: number, before: number | null, removed: number | null, verdict: 'cleaned' | 'did not clean' = 'cleaned') => cleaning({
  id: `c${day}`, start: `2026-10-${String(day).padStart(2, '0')}T00:00:00Z`, end: `2026-10-${String(day).padStart(2, '0')}T08:00:00Z`,
  result: result({
    verdict, before_m2k_w: { value: before, u: 1e-6 }, removed_m2k_w: { value: removed, u: 1e-6 }, left_m2k_w: { value: before === null || removed === null ? null : before - removed, u: 1e-6 },
    removed_share: before === null || removed === null ? null : removed / before,
  }),
});

describe('records', () => {
  test('BySurface_OldestFirst_TheLastTen', () => {
    const [one] = surfaceRecords(Array.from({ length: 14 }, (_, i) => of(i + 1, 4e-4, 3e-4)).reverse());
    expect(one!.cleanings.map(c => c.id)).toEqual(Array.from({ length: 10 }, (_, i) => `c${i + 5}`));
  });
  test('MedianBestAndLast', () => expect(surfaceRecords([of(1, 4e-4, 3.9e-4), of(2, 4e-4, 1e-4), of(3, 4e-4, 3.6e-4), of(4, null, null)])[0]).toMatchObject({ median: 0.9, best: expect.closeTo(1e-5, 12), left: { value: expect.closeTo(4e-5, 12) } }));
  test('RejectedOpenAndNotComputed_DoNotCount', () => expect(surfaceRecords([cleaning({ known_by: 'rejected' }), cleaning({ end: null }), cleaning({ result: null })])).toEqual([]));
  test('Recognised_Counts', () => expect(surfaceRecords([recognised()])).toHaveLength(1));
  test('NothingKnown_NoNumber', () => expect(surfaceRecords([of(1, null, null)])[0]).toMatchObject({ median: null, best: null, left: null }));
});

describe('strokes', () => {
  test('HighestReachesTheTop_OthersOnTheSameScale', () => {
    const { pairs, width } = strokes(surfaceRecords([of(1, 4e-4, 3e-4), of(2, 2e-4, 1e-4)])[0]!, 40, 20);
    expect(pairs.map(p => [p.x, Math.round(p.before!), Math.round(p.after!)])).toEqual([[10, 40, 10], [30, 20, 10]]);
    expect(width).toBe(40);
  });
  test('LeftUnderNothing_IsDrawnAsNothing', () => expect(strokes(surfaceRecords([of(1, 4e-4, 4.1e-4)])[0]!, 40, 20).pairs[0]!.after).toBe(0));
  test('NotKnown_IsToldFromNothing', () => expect(strokes(surfaceRecords([of(1, null, null)])[0]!, 40, 20).pairs[0]).toEqual({ x: 10, before: null, after: null, failed: false }));
  test('DidNotClean_IsMarked', () => expect(strokes(surfaceRecords([of(1, 4e-4, 1e-6, 'did not clean')])[0]!, 40, 20).pairs[0]!.failed).toBe(true));
});

test('Median_OfEvenAndOdd', () => expect([median([]), median([3]), median([1, 3]), median([5, 1, 3])]).toEqual([null, 3, 2, 3]));
test('Bodies_TakenApart_WithoutTheEffectItself', () => expect(bodiesIn({ effect: 'S2', surface: 'SB', campaigns: [campaign({ surface: 'SD+SB' }), campaign({ surface: 'S2' })], stops: [] })).toEqual(['SB', 'SD']));
