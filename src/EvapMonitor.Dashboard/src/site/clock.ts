import { computed, signal } from '@preact/signals';

/** How far the service's clock is ahead of this machine's, ms. Ages are told by the service's clock. */
const ahead = signal(0);
const tick = signal(Date.now());

/** The service's time, ms, every second. */
export const now = computed(() => tick.value + ahead.value);

/** The same in steps of ten seconds, for what need not be redrawn every second. */
export const calmNow = computed(() => Math.floor(now.value / 10_000) * 10_000);

/** Turns an instant of this machine's clock into the service's. */
export const serviceTime = (local: number) => local + ahead.peek();

/** Learns the service's time from an answer that has just come. */
export function learnTime(serviceNow: string): void {
  const difference = Date.parse(serviceNow) - Date.now();
  if (Number.isFinite(difference) && Math.abs(difference - ahead.peek()) > 500) ahead.value = difference;
  tick.value = Date.now();
}

/** Starts the clock; returns what stops it. */
export function startClock(): () => void {
  const timer = setInterval(() => { tick.value = Date.now(); }, 1000);
  return () => clearInterval(timer);
}
