import type { Cleaning } from '../api/types';
import { significant } from '../words/number';
import { date } from '../words/time';
import { extent, type Columns } from './trend';
import type { Span } from './view';

/** A chart in words, for those who do not see it. */
export function spokenSummary(what: string, c: Columns, span: Span, limit: string | null, cleanings: readonly Cleaning[], zone: string, now: number): string {
  const found = extent(c, span.from / 1000, span.to / 1000);
  const when = `from ${date(span.from, zone, now)} to ${date(span.to, zone, now)}`;
  if (found === null) return `${what} ${when}: no value.`;
  const n = (v: number) => significant(v, 3);
  const inside = cleanings.filter(k => Date.parse(k.start) < span.to && (k.end === null || Date.parse(k.end) > span.from)).length;
  return `${what} ${when}: begins at ${n(found.first)}, ends at ${n(found.last)}, lowest ${n(found.lowest)}, highest ${n(found.highest)} ${c.unit}.` +
    `${limit ? ` Limit: ${limit}.` : ''}${inside > 0 ? ` ${inside} ${inside === 1 ? 'cleaning' : 'cleanings'}.` : ''}`;
}
