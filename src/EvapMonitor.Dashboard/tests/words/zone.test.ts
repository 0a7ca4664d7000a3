import { describe, expect, test } from 'vitest';
import { fromInput, inSiteTime, moment, toInput } from '../../src/words/time';
import { firstInstant, instants, offset } from '../../src/words/zone';

const zone = 'Europe/Copenhagen';
const civil = (year: number, month: number, day: number, hour = 0, minute = 0) => ({ year, month, day, hour, minute, second: 0 });
const utc = (text: string) => Date.parse(text);

test('Winter_OneHourEast', () => expect(offset(utc('2026-11-30T12:00:00.250Z'), zone)).toBe(3_600_000));

describe('change of clock', () => {
  test('SkippedHour_NoInstant', () => expect(instants(civil(2026, 3, 29, 2, 30), zone)).toEqual([]));
  test('SkippedHour_FirstInstantIsAfterTheSkip', () => expect(new Date(firstInstant(civil(2026, 3, 29, 2, 0), zone)).toISOString()).toBe('2026-03-29T01:00:00.000Z'));
  test('RepeatedHour_TwoInstantsInOrder', () => {
    expect(instants(civil(2026, 10, 25, 2, 30), zone).map(t => new Date(t).toISOString())).toEqual(['2026-10-25T00:30:00.000Z', '2026-10-25T01:30:00.000Z']);
  });
  test('ZoneSouthOfTheEquator_MidnightOfTheChange', () => {
    expect(new Date(firstInstant(civil(2026, 10, 4), 'Australia/Adelaide')).toISOString()).toBe('2026-10-03T14:30:00.000Z');
  });
});

test('Input_ComesBackAsTheSameInstant', () => {
  const at = utc('2026-07-01T10:20:00Z');
  expect(toInput(at, zone)).toBe('2026-07-01T12:20');
  expect(fromInput(toInput(at, zone), zone)).toEqual([at]);
});
test('InstantsInATextOfTheService_InSiteTime', () => {
  expect(inSiteTime('cleaned from 2026-11-03T04:32:00.000Z to 2026-11-03T13:32:00Z, code 12', zone, utc('2026-11-30T12:00:00Z'))).toBe('cleaned from Tue 3 Nov 05:32 to Tue 3 Nov 14:32, code 12');
});
test('InputThatIsNoTime_Null', () => expect(fromInput('yesterday', zone)).toBeNull());

test('SameLocalDay_ClockAlone', () => expect(moment(utc('2026-11-29T23:30:00Z'), zone, utc('2026-11-30T12:00:00Z'))).toBe('00:30'));
test('DayBefore_NamesTheDay', () => expect(moment(utc('2026-11-29T22:30:00Z'), zone, utc('2026-11-30T12:00:00Z'))).toBe('Sun 29 Nov 23:30'));
test('OtherYear_NamesTheYear', () => expect(moment(utc('2025-12-31T12:00:00Z'), zone, utc('2026-01-02T12:00:00Z'))).toBe('Wed 31 Dec 2025 13:00'));
