import { civil, instants, weekday, type Civil } from './zone';

const days = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
export const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const two = (n: number) => String(n).padStart(2, '0');

/** "14:32". */
export const clock = (c: Civil) => `${two(c.hour)}:${two(c.minute)}`;

/** "Tue 14:32" for the header. */
export function dayAndClock(instant: number, zone: string): string {
  const c = civil(instant, zone);
  return `${days[weekday(c)]} ${clock(c)}`;
}

/** "Sun 6 Dec", with the year when it is not the one of `now`. */
export function date(instant: number, zone: string, now: number): string {
  const c = civil(instant, zone);
  return `${days[weekday(c)]} ${c.day} ${months[c.month - 1]}${c.year === civil(now, zone).year ? '' : ` ${c.year}`}`;
}

/** "09:12" today, else "Sun 29 Nov 09:12". */
export function moment(instant: number, zone: string, now: number): string {
  const c = civil(instant, zone);
  const today = civil(now, zone);
  const same = c.year === today.year && c.month === today.month && c.day === today.day;
  return same ? clock(c) : `${date(instant, zone, now)} ${clock(c)}`;
}

/** "Sun 29 Nov 2026 09:12", never shortened. */
export function fullMoment(instant: number, zone: string): string {
  const c = civil(instant, zone);
  return `${days[weekday(c)]} ${c.day} ${months[c.month - 1]} ${c.year} ${clock(c)}`;
}

/** A text of the service with its UTC instants in the site's time. */
export function inSiteTime(text: string, zone: string, now: number): string {
  return text.replace(/\d{4}-\d\d-\d\dT\d\d:\d\d(:\d\d(\.\d+)?)?(Z|\+00:00)/g, instant => moment(Date.parse(instant), zone, now));
}

/** "2026-11-29T09:12", as an input of type datetime-local holds it. */
export function toInput(instant: number, zone: string): string {
  const c = civil(instant, zone);
  return `${c.year}-${two(c.month)}-${two(c.day)}T${clock(c)}`;
}

/** The instants that such an input may mean; null when it is not a time at all. */
export function fromInput(text: string, zone: string): number[] | null {
  const m = /^(\d{4})-(\d\d)-(\d\d)T(\d\d):(\d\d)/.exec(text);
  if (!m) return null;
  const [year, month, day, hour, minute] = m.slice(1).map(Number) as [number, number, number, number, number];
  return instants({ year, month, day, hour, minute, second: 0 }, zone);
}
