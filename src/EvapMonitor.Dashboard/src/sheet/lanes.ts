/** A run along the columns, to be put into a lane where it touches no other. */
export interface Run { key: number; from: number; to: number }

const apart = 6;

/** The lane of each run, 0 nearest to the boxes: short runs stay near, so that long ones cross little. */
export function lanesOf(runs: Run[]): { lane: Map<number, number>; count: number } {
  const taken: [number, number][][] = [], lane = new Map<number, number>();
  const spans = runs.map(r => ({ key: r.key, low: Math.min(r.from, r.to), high: Math.max(r.from, r.to) })).sort((a, b) => (a.high - a.low) - (b.high - b.low) || a.low - b.low || a.key - b.key);
  for (const { key, low, high } of spans) {
    let at = 0;
    while (taken[at]?.some(([from, to]) => low < to + apart && high > from - apart)) at++;
    (taken[at] ??= []).push([low, high]);
    lane.set(key, at);
  }
  return { lane, count: taken.length };
}
