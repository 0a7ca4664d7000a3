/** Civil time of the site. Instants are milliseconds since 1970 in UTC; a civil time is what the clock on the wall shows. */
export interface Civil { year: number; month: number; day: number; hour: number; minute: number; second: number }

const formats = new Map<string, Intl.DateTimeFormat>();

function format(zone: string): Intl.DateTimeFormat {
  let found = formats.get(zone);
  if (!found) {
    found = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone, hourCycle: 'h23', year: 'numeric', month: '2-digit', day: '2-digit', hour: '2-digit', minute: '2-digit', second: '2-digit',
    });
    formats.set(zone, found);
  }
  return found;
}

/** What the clock shows at an instant. */
export function civil(instant: number, zone: string): Civil {
  const at: Record<string, number> = {};
  for (const part of format(zone).formatToParts(instant)) at[part.type] = Number(part.value);
  return { year: at.year!, month: at.month!, day: at.day!, hour: at.hour!, minute: at.minute!, second: at.second! };
}

const asUtc = (c: Civil) => Date.UTC(c.year, c.month - 1, c.day, c.hour, c.minute, c.second);

/** Offset of the zone from UTC at an instant, ms; positive east. */
export function offset(instant: number, zone: string): number {
  return asUtc(civil(instant, zone)) - Math.floor(instant / 1000) * 1000;
}

/** The instants at which the clock shows this time, in order: none in the hour that a clock change skips, two in the hour that it repeats. */
export function instants(at: Civil, zone: string): number[] {
  const guess = asUtc(at);
  const offsets = new Set([offset(guess - 86_400_000, zone), offset(guess + 86_400_000, zone)]);
  return [...offsets].map(o => guess - o).filter(t => offset(t, zone) === guess - t).sort((a, b) => a - b);
}

/** The first instant at or after the time that the clock shows: a skipped time becomes the end of the skip. */
export function firstInstant(at: Civil, zone: string): number {
  const found = instants(at, zone)[0];
  if (found !== undefined) return found;
  const guess = asUtc(at);
  return guess - offset(guess - 86_400_000, zone);
}

/** The civil time a number of days later, at the same time of day; also carries months and hours out of range. */
export function shifted(at: Civil, change: Partial<Civil>): Civil {
  const d = new Date(Date.UTC(
    at.year + (change.year ?? 0), at.month - 1 + (change.month ?? 0), at.day + (change.day ?? 0),
    at.hour + (change.hour ?? 0), at.minute + (change.minute ?? 0), at.second));
  return {
    year: d.getUTCFullYear(), month: d.getUTCMonth() + 1, day: d.getUTCDate(), hour: d.getUTCHours(), minute: d.getUTCMinutes(), second: d.getUTCSeconds(),
  };
}

/** Day of the week, Monday 0. */
export function weekday(at: Civil): number {
  return (new Date(Date.UTC(at.year, at.month - 1, at.day)).getUTCDay() + 6) % 7;
}

/** Short name of the zone's time at an instant, as the platform knows it, such as CET. */
export function zoneName(instant: number, zone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone: zone, timeZoneName: 'short' }).formatToParts(instant);
  return parts.find(p => p.type === 'timeZoneName')?.value ?? zone;
}
