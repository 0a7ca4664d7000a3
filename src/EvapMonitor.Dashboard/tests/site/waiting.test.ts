import { expect, test, vi } from 'vitest';
import { throttle } from '../../src/live/throttle';
import { progress } from '../../src/site/waiting';

test('TwoDaysInAMinute_RateAndTimeLeft', () => {
  expect(progress([{ at: 0, days: 12 }, { at: 60_000, days: 10 }], 0)).toEqual({ days: 10, since: 0, daysPerMinute: 2, secondsLeft: 300 });
});
test('NothingDoneYet_NoRate', () => expect(progress([{ at: 0, days: 12 }, { at: 60_000, days: 12 }], 0)).toMatchObject({ daysPerMinute: null, secondsLeft: null }));

test('ManyWishes_OneAtOnceAndOneAfterTheInterval', () => {
  vi.useFakeTimers();
  let done = 0;
  const wish = throttle(() => { done++; }, 2000);
  for (let i = 0; i < 50; i++) wish();
  expect(done).toBe(1);
  vi.advanceTimersByTime(2000);
  expect(done).toBe(2);
  vi.advanceTimersByTime(10_000);
  expect(done).toBe(2);
  vi.useRealTimers();
});
