import { describe, expect, test } from 'vitest';
import { laneLabels, laneMarks, marksIn } from '../../src/chart/lane';
import { cleaning, recognised, result } from '../words/sample-cleaning';

const stop = { surface: 'N4', start: '2026-11-04T00:00:00Z', end: '2026-11-04T10:00:00Z', reason: 'nothing recovered' };

describe('marks', () => {
  test('EachFormByHowItIsKnown_InTheOrderOfTime_WithoutRejected', () => {
    const failed = cleaning({ start: '2026-11-10T00:00:00Z', end: '2026-11-10T05:00:00Z', known_by: 'signal', result: result({ verdict: 'did not clean' }) });
    const marks = laneMarks([failed, recognised(), cleaning({ start: '2026-09-01T00:00:00Z' }), cleaning({ known_by: 'rejected' })], [stop]);
    expect(marks.map(m => [m.form, m.failed])).toEqual([['logged', false], ['recognised', false], ['stop', false], ['signal', true]]);
  });
  test('OneThatGoesOn_IsInTheSpanToItsEnd', () => {
    const marks = laneMarks([cleaning({ end: null })], []), start = Date.parse('2026-10-26T00:00:00Z');
    expect(marksIn(marks, start + 1000, start + 2000)).toHaveLength(1);
    expect(marksIn(marks, start - 2000, start - 1000)).toHaveLength(0);
  });
});

describe('labels', () => {
  const place = (at: number, weight = 0, long = 100, short = 30) => ({ at, long, short, weight });
  test('Room_LongWordsWhereTheMarkBegins', () => expect(laneLabels([place(50)], 0, 600, 10)).toEqual([{ index: 0, at: 50, words: 'long' }]));
  test('NearTheEdge_MovedInside', () => expect(laneLabels([place(580)], 0, 600, 10)[0]!.at).toBe(500));
  test('Crowded_TheNewestInFullAndTheOthersShort', () => expect(laneLabels([place(0), place(60), place(120)], 0, 600, 10).map(l => [l.index, l.words])).toEqual([[2, 'long'], [1, 'short'], [0, 'short']]));
  test('Failed_HasItsWordsBeforeANewerOne', () => expect(laneLabels([place(0, 1), place(60)], 0, 600, 10)[0]).toEqual({ index: 0, at: 0, words: 'long' }));
  test('NoLabelTouchesAnother', () => {
    const labels = laneLabels(Array.from({ length: 30 }, (_, i) => place(i * 17)), 0, 520, 10).sort((a, b) => a.at - b.at);
    labels.slice(1).forEach((l, i) => expect(l.at).toBeGreaterThanOrEqual(labels[i]!.at + (labels[i]!.words === 'long' ? 100 : 30) + 10));
  });
  test('NoWords_NoLabel', () => expect(laneLabels([place(50, 0, 0, 0)], 0, 600, 10)).toEqual([]));
});
