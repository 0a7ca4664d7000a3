import type { Line } from '../api/types';

/** The service calls readings live under 15 minutes of age; two more for the way here. */
const liveFor = 17 * 60_000;

/** The line as it is to be read now: what was live when it was fetched is stale once it has grown old on the page, as after a lost connection. */
export function aged(line: Line, now: number): Line {
  const old = line.latest_reading_at !== null && now - Date.parse(line.latest_reading_at) > liveFor;
  return line.readings === 'live' && old ? { ...line, readings: 'stale' } : line;
}
