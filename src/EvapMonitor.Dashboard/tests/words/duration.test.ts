import { describe, expect, test } from 'vitest';
import { age, band, duration, timeLeft } from '../../src/words/duration';

const s = 1000, min = 60 * s, h = 60 * min, d = 24 * h;

test.each([
  [-5, '0 s'], [3 * s, '3 s'], [59.9 * s, '59 s'], [60 * s, '1 min'], [89 * min, '89 min'], [90 * min, '1 h'], [34.9 * h, '34 h'], [47.9 * h, '47 h'],
  [48 * h, '2 days'], [59 * d, '59 days'], [60 * d, '8 weeks'], [729 * d, '104 weeks'], [731 * d, '2 years'],
])('%s ms_Reads%s', (ms, words) => expect(duration(ms)).toBe(words));

describe('age', () => {
  test('NoReading_SaysSo', () => expect(age(null, 0)).toBe('no readings yet'));
  test('ReadingFromTheFuture_IsJustIn', () => expect(age(5 * s, 0)).toBe('readings just in'));
  test('ThreeSeconds_ReadsOld', () => expect(age(0, 3 * s)).toBe('readings 3 s old'));
});

test.each([[null, 'time left not known yet'], [4, 'a few seconds left'], [42, 'about 40 s left'], [600, 'about 10 min left']])('%s sLeft_Reads%s', (seconds, words) => {
  expect(timeLeft(seconds)).toBe(words);
});

describe('band', () => {
  test.each([
    [5, 8, 'in 5 to 8 days'], [4.6, 5.4, 'in 5 days'], [0.4, 1.4, 'today or tomorrow'],
    [7, 28, 'within 1 to 4 weeks; too early to say closer'], [2, 9, 'within 2 to 9 days; too early to say closer'],
    [60, 80, 'not within 8 weeks'], [40, 60, 'in 40 days or later'], [null, null, 'not within 8 weeks'],
  ])('P10 %s P90 %s_Reads%s', (p10, p90, words) => expect(band(p10, p90)).toBe(words));
});
