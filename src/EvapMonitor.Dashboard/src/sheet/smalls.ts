import type { Small } from './ends';
import type { Metrics } from './metrics';
import { textWidth } from './text';

/** A small box along the columns, and how many rows beyond the lanes it stands. */
export interface Put { small: Small; from: number; to: number; row: number }

const before = 8;

/**
 * Rows of the small boxes of all columns. A box begins just before its first end and goes on to the right, at most to `endOf` its column, so that
 * the ends of the boxes to its left pass it; these take the next row that they can have without standing in the way of others.
 */
export function rowsOf(smalls: Small[], ports: Map<string, number>, endOf: (column: number) => number, metrics: Metrics): { put: Put[]; rows: number } {
  const put: Put[] = [];
  const spans = smalls.map(small => {
    const at = small.keys.map(k => ports.get(k)!), low = Math.min(...at), high = Math.max(...at);
    if (metrics.small.along !== null) return { small, from: low - metrics.small.along / 2, to: high + metrics.small.along / 2 };
    const wanted = Math.max(high - low + 2 * before, 44, textWidth(small.place.name, metrics.font) + 14, small.flow === '' ? 0 : textWidth(small.flow, metrics.font) + 10);
    return { small, from: low - before, to: Math.max(Math.min(low - before + wanted, endOf(small.column)), high + before) };
  }).sort((a, b) => b.from - a.from);
  for (const { small, from, to } of spans) {
    let row = 0;
    while (put.some(p => (p.row === row && from < p.to + 4 && to > p.from - 4) || (p.row > row && p.small.keys.some(k => ports.get(k)! > from - 4 && ports.get(k)! < to + 4)))) row++;
    put.push({ small, from, to, row });
  }
  return { put, rows: Math.max(0, ...put.map(p => p.row + 1)) };
}
