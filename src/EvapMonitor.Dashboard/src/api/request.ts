import type { Problem } from './types';

/** A request that did not succeed, with words for the reader. `answered`: the service did answer, so repeating it changes nothing. */
export class RequestFailure extends Error {
  constructor(message: string, readonly answered: boolean, readonly status: number | null, readonly problem: Problem | null = null) {
    super(message);
  }
}

const patience = 30_000;

/** Sends a request and returns the answer; every way to fail becomes a RequestFailure in words. */
export async function send(address: string, options: RequestInit = {}): Promise<Response> {
  let answer: Response, late = false;
  const abort = new AbortController();
  const stop = () => abort.abort();
  const timer = setTimeout(() => { late = true; stop(); }, patience);
  options.signal?.addEventListener('abort', stop);
  try {
    answer = await fetch(address, { ...options, signal: abort.signal });
  } catch (error) {
    if (options.signal?.aborted) throw error;
    throw new RequestFailure(late ? 'the service did not answer within 30 s' : 'the service does not answer', false, null);
  } finally {
    clearTimeout(timer);
  }
  if (answer.ok) return answer;
  const problem = await answer.json().catch(() => null) as Problem | null;
  throw new RequestFailure(describe(problem, answer.status), answer.status < 500, answer.status, problem);
}

/** Fetches JSON. */
export async function fetchJson<T>(address: string, signal?: AbortSignal): Promise<T> {
  const answer = await send(address, { signal: signal ?? null, headers: { accept: 'application/json' } });
  try {
    return await answer.json() as T;
  } catch {
    throw new RequestFailure('the answer of the service could not be read', true, answer.status);
  }
}

/** The words of a problem: its detail, else its title; then what each member got wrong. */
export function describe(problem: Problem | null, status: number): string {
  const errors = Object.values(problem?.errors ?? {}).flat().join('; ');
  const words = [problem?.detail ?? problem?.title, errors].filter(Boolean).join(': ');
  return words || `the service answered with status ${status}`;
}
