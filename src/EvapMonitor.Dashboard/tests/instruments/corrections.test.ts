import { expect, test } from 'vitest';
import type { Corrections } from '../../src/api/types';
import { correctionPaths, correctionSpan, spokenCorrections } from '../../src/instruments/corrections';

const of = (wanted: (number | null)[], mark: Corrections['mark'] = wanted.map(() => '')): Corrections => ({
  signal: 'N.FT-10', line: 'north', unit: 't/h', step_s: 300, start: '2026-11-30T00:00:00Z', offset_s: wanted.map((_, i) => 300 * i), wanted, in_standards: wanted, mark, data_version: 1,
});
const x = (t: number) => (t - Date.parse('2026-11-30T00:00:00Z')) / 300_000, y = (v: number) => v;

test('Gap_BreaksTheLine', () => expect(correctionPaths(of([1, 2, null, 3]), x, y)).toEqual({ line: 'M0.0 1.0L1.0 2.0M3.0 3.0', out: '' }));
test('ReadingLeftOut_IsDrawnApart', () => expect(correctionPaths(of([1, -18, -19], ['', 'left out', 'left out']), x, y)).toEqual({ line: 'M0.0 1.0', out: 'M1.0 -18.0L2.0 -19.0' }));
test('Span_HoldsZero', () => {
  expect(correctionSpan([-19, null, -3])).toEqual({ lowest: -19, highest: 0 });
  expect(correctionSpan([null])).toBeNull();
  expect(correctionSpan([0])).toEqual({ lowest: -1, highest: 1 });
});
test('Sentence_SaysExtremesAndEnd', () => {
  expect(spokenCorrections(of([0.42, -19.2, -18.7]), 30)).toBe('In the last 30 days between −19 t/h and +0.42 t/h, at the end −19 t/h.');
  expect(spokenCorrections(of([null]), 30)).toBe('No correction of N.FT-10 is known in the last 30 days.');
});
