const second = 1000, minute = 60 * second, hour = 60 * minute, day = 24 * hour;

/** A length of time in one unit, two figures at most where that is honest: "3 s", "12 min", "34 h", "9 days", "7 weeks". Negative counts as none. */
export function duration(ms: number): string {
  const t = Math.max(0, ms);
  if (t < minute) return `${Math.floor(t / second)} s`;
  if (t < 90 * minute) return `${Math.floor(t / minute)} min`;
  if (t < 48 * hour) return `${Math.floor(t / hour)} h`;
  if (t < 60 * day) return `${Math.floor(t / day)} days`;
  if (t < 730 * day) return `${Math.floor(t / (7 * day))} weeks`;
  return `${Math.floor(t / (365.25 * day))} years`;
}

/** Age of the readings: "readings 3 s old"; under a second or from the future counts as new. */
export function age(at: number | null, now: number): string {
  if (at === null) return 'no readings yet';
  return now - at < second ? 'readings just in' : `readings ${duration(now - at)} old`;
}

/** Time left of a piece of work, rounded as such a forecast deserves. */
export function timeLeft(seconds: number | null): string {
  if (seconds === null || !Number.isFinite(seconds)) return 'time left not known yet';
  if (seconds < 10) return 'a few seconds left';
  if (seconds < 60) return `about ${Math.round(seconds / 10) * 10} s left`;
  return `about ${duration(seconds * 1000 + 30_000)} left`;
}

/** When a limit is reached, from the 10 % and 90 % points of the forecast in days: four chances in five. `horizon`: how far the forecast looks, days. */
export function band(p10: number | null, p90: number | null, horizon = 56): string {
  if (p10 === null || p10 > horizon) return `not within ${Math.round(horizon / 7)} weeks`;
  if (p10 < 1 && p90 !== null && p90 < 2) return 'today or tomorrow';
  if (p90 === null || p90 > horizon) return `in ${days(p10)} or later`;
  if (p90 > 3 * p10) return p90 < 14
    ? `within ${Math.max(1, Math.floor(p10))} to ${Math.ceil(p90)} days; too early to say closer`
    : `within ${Math.max(1, Math.floor(p10 / 7))} to ${Math.ceil(p90 / 7)} weeks; too early to say closer`;
  const [from, to] = [Math.round(p10), Math.round(p90)];
  return from === to ? `in ${days(p10)}` : `in ${from} to ${to} days`;
}

const days = (n: number) => (Math.round(n) === 1 ? '1 day' : `${Math.round(n)} days`);
