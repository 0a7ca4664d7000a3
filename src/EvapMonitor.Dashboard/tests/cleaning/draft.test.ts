import { expect, test } from 'vitest';
import { check, draftOf, twice, type Draft } from '../../src/cleaning/draft';
import { cleaning } from '../words/sample-cleaning';

const zone = 'Europe/Copenhagen', now = Date.parse('2026-11-30T13:32:00Z');
const draft = (part: Partial<Draft>): Draft => ({
  line: 'north', effect: 'N4', body: '', start: '2026-11-30T06:00', end: '2026-11-30T12:00', goesOn: false, kind: ' chemical ', note: '', startSecond: false, endSecond: false, ...part,
});

test('GoodDraft_UtcInstants', () => {
  expect(check(draft({}), zone, now).cleaning).toEqual({ line: 'north', effect: 'N4', start: '2026-11-30T05:00:00.000Z', end: '2026-11-30T11:00:00.000Z', kind: 'chemical', note: '', body: null });
});
test('StillGoingOn_NoEnd', () => expect(check(draft({ goesOn: true, end: 'nonsense' }), zone, now).cleaning?.end).toBeNull());
test.each([
  [{ effect: '' }, 'effect'], [{ start: '' }, 'start'], [{ start: '2026-12-01T06:00', goesOn: true }, 'start'], [{ end: '2026-11-30T05:00' }, 'end'],
  [{ end: '2026-11-30T20:00' }, 'end'], [{ kind: '  ' }, 'kind'], [{ note: 'x'.repeat(2001) }, 'note'], [{ start: '2026-03-29T02:30' }, 'start'],
] as const)('Wrong %j_ErrorAt %s', (part, field) => {
  const { cleaning, errors } = check(draft(part), zone, now);
  expect(cleaning).toBeNull();
  expect(Object.keys(errors!)).toEqual([field]);
});
test('RepeatedHour_TheOneChosen', () => {
  const part = { start: '2026-10-25T02:30', end: '2026-10-25T09:00' };
  expect(twice(part.start, zone)).toHaveLength(2);
  expect(check(draft(part), zone, now).cleaning?.start).toBe('2026-10-25T00:30:00.000Z');
  expect(check(draft({ ...part, startSecond: true }), zone, now).cleaning?.start).toBe('2026-10-25T01:30:00.000Z');
});
test('DraftOfAnEntry_ReadsBackAsTheSameTimes', () => {
  // The second 02:30 of the night that the clocks went back.
  const entry = cleaning({ start: '2026-10-25T01:30:00Z', end: '2026-10-25T09:00:00Z', body: 'NB', note: 'lances' });
  const read = check(draftOf(entry, now, zone), zone, now).cleaning;
  expect(read).toMatchObject({ start: '2026-10-25T01:30:00.000Z', end: '2026-10-25T09:00:00.000Z', kind: 'chemical', note: 'lances', body: 'NB' });
});
test('DraftOfOneThatGoesOn_StaysOpen', () => expect(check(draftOf(cleaning({ end: null }), now, zone), zone, now).cleaning?.end).toBeNull());
