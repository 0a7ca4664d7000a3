import { signal, type Signal } from '@preact/signals';
import { fetchJson, RequestFailure } from './request';

/** Something fetched: the last good value, and what is being waited for or went wrong, each with since when (ms). */
export interface Loaded<T> {
  value: T | null;
  /** When the value came. */
  asOf: number | null;
  /** Since when an answer is awaited; null when none is. */
  loadingSince: number | null;
  /** The failure that stands, with the first instant of an unbroken run of them. */
  failure: { words: string; since: number; status: number | null } | null;
}

/** A fetched value that keeps itself alive: a failed fetch is tried again, later each time, until it succeeds or is released. */
export class Resource<T> {
  readonly state: Signal<Loaded<T>> = signal({ value: null, asOf: null, loadingSince: null, failure: null });
  #address: string;
  #abort: AbortController | null = null;
  #retry: ReturnType<typeof setTimeout> | undefined;
  #failures = 0;
  #again = false;

  constructor(address: string) {
    this.#address = address;
  }

  /** Fetches. Another address supersedes a fetch that is still running; the same one waits for it and then fetches once more, so that many wishes never starve it. */
  async load(address = this.#address): Promise<void> {
    if (this.#abort && address === this.#address) { this.#again = true; return; }
    this.#address = address;
    this.#abort?.abort();
    this.#again = false;
    clearTimeout(this.#retry);
    const abort = this.#abort = new AbortController();
    this.state.value = { ...this.state.value, loadingSince: this.state.value.loadingSince ?? Date.now() };
    try {
      const value = await fetchJson<T>(address, abort.signal);
      if (abort.signal.aborted) return;
      this.#failures = 0;
      this.state.value = { value, asOf: Date.now(), loadingSince: null, failure: null };
    } catch (error) {
      if (abort.signal.aborted) return;
      const failure = error instanceof RequestFailure ? error : new RequestFailure('the page could not use the answer', true, null);
      this.#failures++;
      this.state.value = {
        ...this.state.value, loadingSince: null,
        failure: { words: failure.message, since: this.state.value.failure?.since ?? Date.now(), status: failure.status },
      };
      this.#retry = setTimeout(() => void this.load(), retryDelay(this.#failures, failure.answered));
    } finally {
      if (this.#abort === abort) this.#abort = null;
    }
    if (this.#again && this.state.peek().failure === null) await this.load();
  }

  /** Puts a value that came another way, as by an event. */
  put(value: T): void {
    this.state.value = { value, asOf: Date.now(), loadingSince: this.state.value.loadingSince, failure: null };
  }

  /** Stops fetching and trying again. */
  release(): void {
    this.#abort?.abort();
    this.#abort = null;
    this.#again = false;
    clearTimeout(this.#retry);
  }
}

/** Delay before the next try, ms: 2, 4, 8 … 60 s; a minute at once when the service answered and refused. */
export function retryDelay(failures: number, answered: boolean): number {
  return answered ? 60_000 : Math.min(60_000, 1000 * 2 ** failures);
}
