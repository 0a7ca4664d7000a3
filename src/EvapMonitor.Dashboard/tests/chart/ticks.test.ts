import { describe, expect, test } from 'vitest';
import { timeTicks } from '../../src/chart/ticks';
import { civil, weekday } from '../../src/words/zone';

const zone = 'Europe/Copenhagen';
const utc = (text: string) => Date.parse(text);
const iso = (t: number) => new Date(t).toISOString().slice(0, 16);

describe('across the change of clock', () => {
  test('DaysInAutumn_LocalMidnights', () => {
    const ticks = timeTicks(utc('2026-10-23T12:00:00Z'), utc('2026-10-28T12:00:00Z'), zone, 6);
    expect(ticks.map(t => iso(t.at))).toEqual(['2026-10-23T22:00', '2026-10-24T22:00', '2026-10-25T23:00', '2026-10-26T23:00', '2026-10-27T23:00']);
    expect(ticks.map(t => t.label)).toEqual(['24 Oct', '25', '26', '27', '28']);
  });
  test('DaysInSpring_LocalMidnights', () => {
    const ticks = timeTicks(utc('2026-03-28T00:00:00Z'), utc('2026-03-31T00:00:00Z'), zone, 5);
    expect(ticks.map(t => iso(t.at))).toEqual(['2026-03-28T23:00', '2026-03-29T22:00', '2026-03-30T22:00']);
  });
  test('HoursOfTheShortDay_EveryTickOnceAndInOrder', () => {
    const ticks = timeTicks(utc('2026-03-28T23:00:00Z'), utc('2026-03-29T05:00:00Z'), zone, 10);
    expect(ticks.map(t => t.label.split('\n')[0])).toEqual(['00:00', '01:00', '03:00', '04:00', '05:00', '06:00', '07:00']);
    ticks.slice(1).forEach((t, i) => expect(t.at - ticks[i]!.at).toBe(3_600_000));
  });
  test('SixHourTicksOfTheLongDay_KeepLocalHours', () => {
    const ticks = timeTicks(utc('2026-10-24T20:00:00Z'), utc('2026-10-26T00:00:00Z'), zone, 5);
    expect(ticks.map(t => civil(t.at, zone).hour % 6)).toEqual(ticks.map(() => 0));
    expect(ticks.map(t => t.label)).toEqual(['00:00\n25 Oct', '06:00', '12:00', '18:00', '00:00\n26 Oct']);
  });
});

test('FiveWeeks_Mondays', () => {
  const ticks = timeTicks(utc('2026-10-26T12:00:00Z'), utc('2026-11-30T13:00:00Z'), zone, 8);
  expect(ticks.map(t => t.label)).toEqual(['2 Nov', '9', '16', '23', '30']);
  for (const t of ticks) expect(weekday(civil(t.at, zone))).toBe(0);
});

test('Year_FirstsOfMonths', () => {
  const ticks = timeTicks(utc('2025-11-30T12:00:00Z'), utc('2026-11-30T12:00:00Z'), zone, 14);
  expect(ticks.map(t => t.label)).toEqual(['Dec\n2025', 'Jan\n2026', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov']);
  for (const t of ticks) expect(civil(t.at, zone)).toMatchObject({ day: 1, hour: 0, minute: 0 });
});

test('EverySecondDay_StartsAnewEachMonth', () => {
  const ticks = timeTicks(utc('2026-10-26T12:00:00Z'), utc('2026-11-06T00:00:00Z'), zone, 6);
  expect(ticks.map(t => t.label)).toEqual(['27 Oct', '29', '31', '1 Nov', '3', '5']);
});

test.each([1, 2, 10, 40, 100, 400, 4000])('Span%sDays_NeverMoreThanFitByMuch', days => {
  const to = utc('2026-11-30T12:00:00Z');
  expect(timeTicks(to - days * 86_400_000, to, zone, 8).length).toBeLessThanOrEqual(10);
});
