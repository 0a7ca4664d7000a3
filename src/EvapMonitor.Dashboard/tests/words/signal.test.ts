import { expect, test } from 'vitest';
import type { SignalRow } from '../../src/api/types';
import { ageWords, attentionFirst, byLine, rejectedWords, shareWords, signalsWords, troubleOf } from '../../src/words/signal';
import { now } from './sample';

const none = { bad: 0, not_a_number: 0, out_of_range: 0, frozen: 0 };
const signal = (name: string, part: Partial<SignalRow> = {}): SignalRow => ({
  name, line: 'north', unit: 'bar', latest_at: '2026-11-30T13:31:57Z', latest_value: 1.2, latest_quality: 'good', good_share: 0.98, rejected: none, readings: 1440, fit: null, changed: null, ...part,
});
const silent = signal('silent', { latest_at: '2026-11-30T10:08:00Z' });
const never = signal('never', { latest_at: null, latest_value: null, latest_quality: null, good_share: null, readings: 0 });
const bad = signal('bad', { latest_quality: 'bad' });
const poor = signal('poor', { good_share: 0.42 }), poorer = signal('poorer', { good_share: 0.2 });

test('EachTrouble_IsNamed', () => {
  expect([silent, never, bad, poor, signal('sound')].map(s => troubleOf(s, now))).toEqual(['silent', 'never read', 'bad now', 'often unsound', null]);
});
test('ReadingOf15Min_NotYetSilent', () => expect(troubleOf(signal('a', { latest_at: '2026-11-30T13:17:00Z' }), now)).toBeNull());
test('AttentionFirst_GravestFirstThenThePoorerThenPlantOrder', () => {
  const sorted = attentionFirst([signal('a'), poor, bad, never, signal('b'), poorer, silent], now);
  expect(sorted.map(s => s.name)).toEqual(['silent', 'never', 'bad', 'poorer', 'poor', 'a', 'b']);
});
test('AttentionFirst_LeavesTheGivenOrderAlone', () => {
  const given = [signal('a'), silent];
  attentionFirst(given, now);
  expect(given.map(s => s.name)).toEqual(['a', 'silent']);
});
test('ByLine_PlantOrderAndSignalsOfNoLineLast', () => {
  const groups = byLine([signal('1'), signal('2', { line: null }), signal('3', { line: 'south' }), signal('4')]);
  expect(groups.map(g => [g.line, g.signals.map(s => s.name)])).toEqual([['north', ['1', '4']], ['south', ['3']], [null, ['2']]]);
});
test('Share_NeverRoundsToAllOrNone', () => {
  expect([1, 0.9986, 0.98, 0.004, 0, null].map(shareWords)).toEqual(['100 %', 'over 99 %', '98 %', 'under 1 %', '0 %', 'no reading']);
});
test('Rejected_ByReasonInWords', () => {
  expect(rejectedWords({ bad: 4, not_a_number: 1, out_of_range: 3, frozen: 120 })).toBe('4 bad by source, 1 no number, 3 outside its range, 120 frozen');
  expect(rejectedWords(none)).toBe('');
});
test('Age_InWords', () => expect([signal('a'), silent, never].map(s => ageWords(s, now))).toEqual(['3 s', '3 h', 'never read']));
test('LineOfSignals_CountsEachTroubleAndIsCalmOnlyWithout', () => {
  expect(signalsWords([silent, never, bad, poor], now)).toEqual({ head: '4 signals: ', bold: '2 without a reading in the last 15 min, 1 bad now, 1 sound for less than 90 % of the last 24 h' });
  expect(signalsWords([signal('a'), signal('b')], now)).toEqual({ head: '2 signals, every one with a sound reading in the last 15 min.', bold: '' });
});
