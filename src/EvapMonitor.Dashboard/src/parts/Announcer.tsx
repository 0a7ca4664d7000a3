import { signal } from '@preact/signals';

const spoken = signal('');

/** Says a change to those who listen to the page. */
export function announce(words: string): void {
  spoken.value = spoken.peek() === words ? `${words}\u00a0` : words;
}

/** The one live region of the page. */
export function Announcer() {
  return <div class="unseen" role="status" aria-live="polite">{spoken.value}</div>;
}
