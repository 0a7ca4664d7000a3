import { expect, test } from 'vitest';
import { addresses } from '../../src/api/addresses';
import type { Recomputation, Revision } from '../../src/api/types';
import { spanWords, stateWords } from '../../src/plant/recomputation';
import { dayStart, differenceWords, inForceWords, startWords, whyNotStart } from '../../src/plant/start';

const zone = 'Europe/Copenhagen';
const revision = (part: Partial<Revision>): Revision => ({
  revision: 2, accepted_at: '2026-11-30T09:00:00Z', in_force_from: '2026-03-01T00:00:00Z', in_force_until: null, state: 'in force', replaced_by: null, author: 'k.olm', sha256: '', days_computed: 4, ...part,
});
const recomputation = (part: Partial<Recomputation>): Recomputation => ({
  id: 7, cause: 'plant revision', why: 'Plant revision 2 was accepted.', revision: 2, line: null, from: '2026-03-01', to: '2026-11-30', days_total: 800, days_done: 200, days_left: 600,
  state: 'running', days_per_minute: 240, seconds_left: 150, started_at: '2026-11-30T09:00:00Z', ended_at: null, author: 'k.olm', ...part,
});

test.each([['2026-03-01', '2026-03-01T00:00:00.000Z'], ['2026-02-30', null], ['', null], ['2026-3-1', null]])('Day %j_Begins %j', (day, instant) => {
  const at = dayStart(day);
  expect(at === null ? null : new Date(at).toISOString()).toBe(instant);
});
test('ChangeWithoutADay_IsAskedForIt', () => {
  expect(whyNotStart({ changed: true, day: '' })).toMatch(/^Give the day/);
  expect(whyNotStart({ changed: false, day: '' })).toBeNull();
  expect(whyNotStart({ changed: true, day: '2026-03-01' })).toBeNull();
});
test('Change_NamesTheUtcDay_AndLocalTime', () =>
  expect(startWords({ changed: true, day: '2026-07-01' }, revision({}), zone)).toBe('The UTC day of Wed 1 Jul 2026 begins at Wed 1 Jul 2026 02:00 (Europe/Copenhagen).'));
test('Correction_NamesWhatItReplaces', () =>
  expect(startWords({ changed: false, day: '' }, revision({}), zone)).toBe('It takes the place of the file in force now, from Sun 1 Mar 2026 01:00 on.'));
test('TimeInForce_InWords', () => {
  expect(inForceWords(revision({}), zone)).toEqual({ from: 'Sun 1 Mar 2026 01:00', until: 'further notice' });
  expect(inForceWords(revision({ in_force_until: '2026-06-01T00:00:00Z' }), zone).until).toBe('Mon 1 Jun 2026 02:00');
  expect(inForceWords(revision({ state: 'replaced', replaced_by: 3 }), zone).until).toBe('replaced by revision 3');
});
test('Differences_InWords', () => {
  expect(differenceWords(1, 0, 1)).toBe('Against revision 1: 1 line added.');
  expect(differenceWords(2, 1, 1)).toBe('Against revision 1: 2 lines added, 1 line removed.');
  expect(differenceWords(0, 0, 1)).toBe('The same text as revision 1.');
});
test('Recomputation_SaysHowFarItIs', () => {
  expect(stateWords(recomputation({}))).toBe('200 of 800 days, 240 a minute, about 3 min left');
  expect(stateWords(recomputation({ days_per_minute: null, seconds_left: null }))).toBe('200 of 800 days, time left not known yet');
  expect(stateWords(recomputation({ state: 'done', days_done: 800, days_left: 0 }))).toBe('done: 800 days');
  expect(stateWords(recomputation({ state: 'cancelled' }))).toBe('stopped: 200 of 800 days computed; 600 keep their earlier results');
  expect(spanWords(recomputation({}))).toBe('all lines, Sun 1 Mar 2026 to Mon 30 Nov 2026');
  expect(spanWords(recomputation({ line: 'north', to: '2026-03-01' }))).toBe('north, Sun 1 Mar 2026');
});
test('Addresses_CarryTheStart', () => {
  expect(addresses.acceptPlant(null)).toBe('/api/v1/plant/revisions');
  expect(addresses.acceptPlant(Date.UTC(2026, 2, 1))).toBe('/api/v1/plant/revisions?in_force_from=2026-03-01T00%3A00%3A00.000Z');
});
