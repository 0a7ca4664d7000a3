import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { addresses } from '../../src/api/addresses';
import { connect, connection } from '../../src/live/connection';

class Stream {
  static all: Stream[] = [];
  static readonly CLOSED = 2;
  readyState = 1;
  onopen?: () => void;
  onerror?: () => void;
  #listeners = new Map<string, (e: unknown) => void>();
  constructor(readonly url: string) { Stream.all.push(this); }
  addEventListener(name: string, act: (e: unknown) => void) { this.#listeners.set(name, act); }
  close() { this.readyState = 2; }
  send(name: string, data: string, lastEventId: string) { this.#listeners.get(name)?.({ data, lastEventId }); }
  fail() { this.readyState = 2; this.onerror!(); }
}

const address = { first: addresses.events, after: addresses.eventsAfter };
const latest = () => Stream.all.at(-1)!;
let stop = () => {};
beforeEach(() => { vi.useFakeTimers(); vi.stubGlobal('EventSource', Stream); Stream.all = []; connection.value = { state: 'opening' }; });
afterEach(() => { stop(); vi.useRealTimers(); vi.unstubAllGlobals(); });
const begin = () => {
  const seen = vi.fn(), missed = vi.fn();
  stop = connect(address, { site: seen }, missed);
  latest().onopen!();
  return { seen, missed };
};

test('FreshStreamAfterAnError_AsksForWhatCameAfterTheLastEvent', () => {
  const { missed } = begin();
  expect(latest().url).toBe('/api/v1/events');
  latest().send('site', '{}', 'a/7');
  latest().fail();
  expect(connection.value.state).toBe('lost');
  vi.advanceTimersByTime(5000);
  expect(latest().url).toBe('/api/v1/events?last_event_id=a%2F7');
  latest().onopen!();
  expect(connection.value.state).toBe('open');
  expect(missed).not.toHaveBeenCalled();
});
test('SilentStream_IsReplacedAndResumed', () => {
  begin();
  latest().send('site', '{}', '9');
  vi.advanceTimersByTime(45_000);
  expect(Stream.all).toHaveLength(2);
  expect(Stream.all[0]!.readyState).toBe(2);
  expect(latest().url).toContain('last_event_id=9');
});
test('Reset_EverythingIsFetchedAnew_EvenWithoutData', () => {
  const { missed } = begin();
  latest().send('reset', '', '12');
  expect(missed).toHaveBeenCalledTimes(1);
  latest().fail();
  vi.advanceTimersByTime(5000);
  expect(latest().url).toContain('last_event_id=12');
});
test('LostBeforeAnyEvent_EverythingIsFetchedAnew', () => {
  const { missed } = begin();
  latest().fail();
  vi.advanceTimersByTime(5000);
  latest().onopen!();
  expect(missed).toHaveBeenCalledTimes(1);
});
test('EventThatIsNoJson_IsLeftOutAndTheStreamGoesOn', () => {
  const { seen } = begin();
  latest().send('site', 'not json', '1');
  latest().send('site', '{"n":2}', '2');
  expect(seen.mock.calls).toEqual([[{ n: 2 }]]);
});
