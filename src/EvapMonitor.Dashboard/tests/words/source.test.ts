import { expect, test } from 'vitest';
import type { Source } from '../../src/api/types';
import { countsWords, isCut, kindWords, sourceWords, spoolWords } from '../../src/words/source';
import { now } from './sample';

const source = (part: Partial<Source> = {}): Source => ({
  name: 'gateway', kind: 'mqtt', address: 'gateway.example:8883', connected_since: '2026-11-30T06:32:00Z', last_message_at: '2026-11-30T13:31:30Z', accepted: 81234,
  malformed: 0, out_of_time: 0, unknown: 0, instant_unknown: 0, shed: 0, refused: 0, reconnects: 0, last_error: null, samples: [], ...part,
});
const text = (s: Source) => { const { bold, rest } = sourceWords(s, 'Europe/Copenhagen', now); return bold + rest; };

test('Connected_SinceWhenAndLastMessage', () => expect(text(source())).toBe('Connected since 07:32. Last message 30 s ago.'));
test('Cut_SaysSoFirst', () => {
  const cut = source({ connected_since: null, last_message_at: '2026-11-30T10:08:00Z' });
  expect(text(cut)).toBe('Not connected. Last message 3 h ago.');
  expect(isCut(cut)).toBe(true);
});
test('PostedReadings_HoldNoConnectionToLose', () => {
  const posted = source({ kind: 'http', connected_since: null, last_message_at: null });
  expect(text(posted)).toBe('No message has come since the service started.');
  expect(isCut(posted)).toBe(false);
});
test('OwnBroker_Listens', () => expect(text(source({ kind: 'broker', last_message_at: null }))).toBe('Listening since 07:32. No message has come since the service started.'));
test('UnforeseenKind_ShownAsItCame', () => expect(kindWords(source({ kind: 'serial' as Source['kind'] }))).toBe('serial'));
test('Counts_OnlyWhatHappened', () => {
  expect(countsWords(source())).toEqual(['81\u202f234 readings accepted']);
  expect(countsWords(source({ accepted: 1, malformed: 2, out_of_time: 7, unknown: 5, instant_unknown: 1, shed: 40, refused: 2, reconnects: 1 }))).toEqual([
    '1 reading accepted', '2 malformed', '7 out of time (too far ahead, or before the history)', '5 of signals that no plant file names',
    '1 retained without a time, left out', '40 dropped because the intake was full', 'told to come again later 2 times', 'connected anew once',
  ]);
});
test('Spool_EmptyOrWhatWaits', () => {
  expect(spoolWords({ bytes: 0 })).toBe('Nothing waits for the database.');
  expect(spoolWords({ bytes: 40960 })).toBe('41 kB of readings wait on disk for the database.');
});
