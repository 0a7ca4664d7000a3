import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import { addresses } from '../../src/api/addresses';
import { describe as words } from '../../src/api/request';
import { Resource, retryDelay } from '../../src/api/resource';

beforeEach(() => { vi.useFakeTimers(); });
afterEach(() => { vi.useRealTimers(); vi.unstubAllGlobals(); });
const answers = (...list: (() => Response)[]) => {
  const fetch = vi.fn(async () => list[Math.min(fetch.mock.calls.length, list.length) - 1]!());
  vi.stubGlobal('fetch', fetch);
  return fetch;
};

test('ServiceDown_KeepsTheValueSaysSinceWhenAndHealsByItself', async () => {
  const fetch = answers(() => Response.json({ n: 1 }), () => { throw new TypeError('refused'); }, () => { throw new TypeError('refused'); }, () => Response.json({ n: 2 }));
  const r = new Resource<{ n: number }>('/x');
  await r.load();
  await r.load();
  const first = r.state.value.failure!;
  expect(first.words).toBe('the service does not answer');
  expect(r.state.value.value).toEqual({ n: 1 });
  await vi.advanceTimersByTimeAsync(2000);
  expect(r.state.value.failure!.since).toBe(first.since);
  await vi.advanceTimersByTimeAsync(4000);
  expect(fetch).toHaveBeenCalledTimes(4);
  expect(r.state.value).toMatchObject({ value: { n: 2 }, failure: null });
});

test('Released_TriesNoMore', async () => {
  const fetch = answers(() => { throw new TypeError('refused'); });
  const r = new Resource('/x');
  await r.load();
  r.release();
  await vi.advanceTimersByTimeAsync(300_000);
  expect(fetch).toHaveBeenCalledTimes(1);
});

test('ProblemDetails_BecomeTheWords', async () => {
  answers(() => Response.json({ title: 'Not found', detail: 'There is no line east.' }, { status: 404 }));
  const r = new Resource('/x');
  await r.load();
  expect(r.state.value.failure).toMatchObject({ words: 'There is no line east.', status: 404 });
  r.release();
});

test('ErrorsByMember_AreNamed', () => expect(words({ title: 'Wrong', errors: { start: ['start lies in the future'] } }, 400)).toBe('Wrong: start lies in the future'));
test('RetryDelay_GrowsToAMinute', () => expect([1, 2, 3, 9].map(n => retryDelay(n, false))).toEqual([2000, 4000, 8000, 60_000]));
test('HostileName_StaysOnePathSegment', () => expect(addresses.effect('a/../b', 'x?y#z')).toBe('/api/v1/lines/a%2F..%2Fb/effects/x%3Fy%23z'));

test('ManyWishesWhileOneFetchRuns_OneMoreAfterItAndNoneIsCutOff', async () => {
  const open: ((r: Response) => void)[] = [];
  const fetch = vi.fn(() => new Promise<Response>(resolve => { open.push(resolve); }));
  vi.stubGlobal('fetch', fetch);
  const r = new Resource<{ n: number }>('/x');
  const first = r.load();
  void r.load();
  void r.load();
  open[0]!(Response.json({ n: 1 }));
  await vi.advanceTimersByTimeAsync(0);
  expect(r.state.value.value).toEqual({ n: 1 });
  expect(fetch).toHaveBeenCalledTimes(2);
  open[1]!(Response.json({ n: 2 }));
  await first;
  expect(r.state.value.value).toEqual({ n: 2 });
  expect(fetch).toHaveBeenCalledTimes(2);
});

test('AnotherAddress_SupersedesTheFetchThatRuns', async () => {
  const open: ((r: Response) => void)[] = [];
  vi.stubGlobal('fetch', vi.fn((_: string, options: RequestInit) => new Promise<Response>((resolve, reject) => {
    open.push(resolve);
    options.signal!.addEventListener('abort', () => reject(new DOMException('aborted', 'AbortError')));
  })));
  const r = new Resource<{ n: number }>('/x');
  void r.load();
  const second = r.load('/y');
  open[0]!(Response.json({ n: 1 }));
  open[1]!(Response.json({ n: 2 }));
  await second;
  expect(r.state.value).toMatchObject({ value: { n: 2 }, failure: null, loadingSince: null });
});

test('ServiceThatNeverAnswers_GivenUpAfter30s', async () => {
  vi.stubGlobal('fetch', vi.fn((_: string, options: RequestInit) => new Promise<Response>((_resolve, reject) => {
    options.signal!.addEventListener('abort', () => reject(new DOMException('aborted', 'AbortError')));
  })));
  const r = new Resource('/x');
  void r.load();
  await vi.advanceTimersByTimeAsync(29_999);
  expect(r.state.value.failure).toBeNull();
  await vi.advanceTimersByTimeAsync(1);
  expect(r.state.value.failure!.words).toBe('the service did not answer within 30 s');
  r.release();
});
