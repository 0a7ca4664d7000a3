import { expect, test } from 'vitest';
import type { Notice } from '../../src/api/types';
import { firstSentences, wallFirst } from '../../src/words/first';
import { noticeLine, noticeWords, orderedNotices } from '../../src/words/notice';
import { due, effect, line, now, unknown } from './sample';
import { recognised } from './sample-cleaning';

const zone = 'Europe/Copenhagen';
const full: Notice = { key: 'spool-full', since: '2026-11-30T13:20:00Z', sentence: 'The spool is full. Readings are refused until there is room.' };
const cut: Notice = { key: 'source:gateway', since: '2026-11-30T10:08:00Z', sentence: 'The MQTT broker gateway at gateway.example:8883 is not connected: no host answers.' };
const calm = (name: string) => line([effect()], { name });
const dueAt = (name: string, since: string) => line([due('N4', since)], { name });
const silentSince = (name: string, at: string) => line([effect()], { name, readings: 'stale', latest_reading_at: at });

const keys = (...given: Parameters<typeof firstSentences>) => firstSentences(...given).first.map(f => f.key);

test('Order_NoticesDueSilentUnknown_WhateverTheRows', () => {
  const lines = [calm('a'), line([unknown('N1', 'x')], { name: 'b' }), silentSince('c', '2026-11-30T10:00:00Z'), dueAt('d', '2026-11-30T04:00:00Z')];
  expect(keys([cut], lines, [], now, zone)).toEqual(['notice source:gateway', 'line d', 'line c', 'line b']);
  expect(lines.map(l => l.name)).toEqual(['a', 'b', 'c', 'd']);
});
test('LongestDueAndLongestSilent_ComeFirst', () => {
  expect(keys([], [dueAt('a', '2026-11-30T04:00:00Z'), dueAt('b', '2026-11-29T04:00:00Z'), silentSince('c', '2026-11-30T10:00:00Z'), silentSince('d', '2026-11-29T10:00:00Z')], [], now, zone))
    .toEqual(['line b', 'line a', 'line d', 'line c']);
});
test('MoreThanFive_FiveStandAndTheRestAreCounted', () => {
  const { first, left } = firstSentences([full], ['a', 'b', 'c', 'd', 'e', 'f'].map(n => dueAt(n, '2026-11-30T04:00:00Z')), [], now, zone);
  expect([first.length, left]).toEqual([5, 2]);
  expect(first[0]!.key).toBe('notice spool-full');
});
test('CalmSite_NothingComesFirst', () => expect(firstSentences([], [calm('a')], [], now, zone)).toEqual({ first: [], left: 0 }));
test('SilentLineWithADueEffect_IsSilentAndAsksForNoAct', () => {
  const { first } = firstSentences([], [line([due('N4', '2026-11-29T04:00:00Z')], { name: 'a', readings: 'stale', latest_reading_at: '2026-11-30T10:08:00Z' })], [], now, zone);
  expect(first).toHaveLength(1);
  expect(first[0]!.act).toBe(false);
  expect(first[0]!.pieces[0]!.text).toBe('No reading has come for 3 h');
});
test('OnlyWhereSomeoneMustAct_IsMarked', () => {
  expect(firstSentences([cut, full], [dueAt('a', '2026-11-30T04:00:00Z'), line([unknown('N1', 'x')], { name: 'b' })], [], now, zone).first.map(f => [f.key, f.act]))
    .toEqual([['notice spool-full', true], ['notice source:gateway', false], ['line a', true], ['line b', false]]);
});
test('EveryFirst_OneBoldClause', () => {
  for (const f of firstSentences([cut, full], [dueAt('a', '2026-11-30T04:00:00Z')], [], now, zone).first) expect(f.pieces.filter(p => p.bold)).toHaveLength(1);
});

test('Wall_ActsInFullFirstAndTheRestByName', () => {
  const entry = (name: string, act: boolean) => ({ key: name, line: name, act, pieces: [] });
  const all = [entry('known', false), ...Array.from({ length: 11 }, (_, i) => entry(`L${i + 1}`, true))];
  const { full, also } = wallFirst(all, 3);
  expect(full.map(f => f.line)).toEqual(['L1', 'L2']);
  expect(also).toBe('Also L3, L4, L5, L6, L7, L8, L9, L10 and 2 more');
  expect(wallFirst(all.slice(0, 3), 3)).toMatchObject({ full: [{ line: 'L1' }, { line: 'L2' }, { line: 'known' }], also: '' });
});

test('Notice_BoldUpToItsFirstStopAndSinceWhen', () => {
  expect(noticeWords(full, zone, now)).toEqual({ head: 'The spool is full', rest: '. Readings are refused until there is room.', since: 'Since 14:20, for 12 min.' });
  expect(noticeWords(cut, zone, now).head).toBe('The MQTT broker gateway at gateway.example:8883 is not connected');
  expect(noticeWords({ ...full, sentence: 'Without an end' }, zone, now)).toMatchObject({ head: 'Without an end', rest: '.' });
});
test('Notices_ThoseToActUponFirst', () => expect(orderedNotices([cut, full]).map(n => n.key)).toEqual(['spool-full', 'source:gateway']));
test('NoticeLine_TheFirstAndHowManyMore', () => {
  expect(noticeLine([cut, full], zone, now)).toBe('The spool is full. Readings are refused until there is room. Since 14:20, for 12 min. 1 more notice stands on Today.');
  expect(noticeLine([], zone, now)).toBe('');
});
test('RecognisedCleanings_OnceForEachEffect_AfterAllElse_WithThePageThatAnswers', () => {
  const asked = [recognised(), recognised({ start: '2026-09-01T00:00:00Z', end: '2026-09-01T08:00:00Z' })];
  const { first } = firstSentences([cut], [dueAt('a', '2026-11-30T04:00:00Z')], asked, now, zone);
  expect(first.map(f => f.key)).toEqual(['notice source:gateway', 'line a', 'asked north N4']);
  expect(first[2]).toMatchObject({ act: false, answer: '/cleanings' });
  expect(first[2]!.pieces.map(p => p.text).join('')).toBe('N4 came back better on Mon 26 Oct without an entry: was it cleaned?');
});
