import { signal } from '@preact/signals';

const spoken = signal(''), urgent = signal('');

/** Says a change to those who listen to the page; `now` interrupts, for what someone must act upon. */
export function announce(words: string, now = false): void {
  const region = now ? urgent : spoken;
  region.value = region.peek() === words ? `${words}\u00a0` : words;
}

/** The live regions of the page: words elsewhere may change every minute without being read out each time. */
export function Announcer() {
  return (
    <>
      <div class="unseen" role="status" aria-live="polite">{spoken.value}</div>
      <div class="unseen" role="alert">{urgent.value}</div>
    </>
  );
}
