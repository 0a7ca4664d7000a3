import type { Metrics } from './metrics';

/** Where a way ends at the edge of a box: which way it is, and by which side of the column it goes on. `at` orders the ends of one side. */
export interface End { key: string; side: 'first' | 'left' | 'middle' | 'right'; at: number }

const margin = 10;

/** Positions of the ends along the edge of a box that begins at `start`: to the left first, then what leads straight on, from the right what goes right. */
export function portsOf(ends: End[], start: number, size: number, metrics: Metrics): Map<string, number> {
  const by = (side: End['side']) => ends.filter(e => e.side === side).sort((a, b) => a.at - b.at);
  const left = [...by('first'), ...by('left')], middle = by('middle'), right = by('right');
  const needed = neededFor(ends, metrics), room = size - 2 * margin;
  const squeeze = needed > room && needed > 0 ? room / needed : 1;
  const found = new Map<string, number>();
  let at = start + margin;
  left.forEach(e => { found.set(e.key, at); at += metrics.port * squeeze; });
  if (left.length > 0 && middle.length > 0) at += (metrics.apart - metrics.port) / 2 * squeeze;
  if (left.length === 0 && metrics.turned) at += Math.max(0, metrics.small.along! / 2 - margin + 2);
  middle.forEach(e => { found.set(e.key, at); at += metrics.apart * squeeze; });
  let back = start + size - margin;
  [...right].reverse().forEach(e => { found.set(e.key, back); back -= metrics.port * squeeze; });
  return found;
}

/** The length that the ends want between the first and the last. */
export function neededFor(ends: End[], metrics: Metrics): number {
  const middle = ends.filter(e => e.side === 'middle').length;
  return Math.max(0, (ends.length - middle) * metrics.port + middle * metrics.apart - metrics.port);
}
