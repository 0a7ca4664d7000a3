/** A fresh idempotency key. Not randomUUID: browsers keep that from pages served without TLS, as in many plants. */
export function freshKey(): string {
  return Array.from(crypto.getRandomValues(new Uint8Array(16)), b => b.toString(16).padStart(2, '0')).join('');
}

const kept = 'cleaning-draft';

/** What is kept over a reload: the draft and the key it was sent with, so that a retry is never counted twice. */
export function keep<T>(draft: T | null): void {
  try { if (draft === null) sessionStorage.removeItem(kept); else sessionStorage.setItem(kept, JSON.stringify(draft)); } catch { /* storage is switched off: the draft lives as long as the page */ }
}

export function recall<T>(): T | null {
  try { return JSON.parse(sessionStorage.getItem(kept) ?? 'null') as T | null; } catch { return null; }
}
