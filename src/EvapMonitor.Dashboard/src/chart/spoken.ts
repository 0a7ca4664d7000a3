import { count, significant } from '../words/number';
import { date } from '../words/time';
import { marksIn, type LaneMark } from './lane';
import { extent, type Columns } from './trend';
import type { Span } from './view';

/** A chart in words, for those who do not see it. */
export function spokenSummary(what: string, c: Columns, span: Span, limit: string | null, marks: readonly LaneMark[], zone: string, now: number): string {
  const found = extent(c, span.from / 1000, span.to / 1000);
  const when = `from ${date(span.from, zone, now)} to ${date(span.to, zone, now)}`;
  if (found === null) return `${what} ${when}: no value.`;
  const n = (v: number) => significant(v, 3);
  const inside = marksIn(marks, span.from, span.to).filter(m => m.form !== 'stop'), failed = inside.filter(m => m.failed).length;
  return `${what} ${when}: begins at ${n(found.first)}, ends at ${n(found.last)}, lowest ${n(found.lowest)}, highest ${n(found.highest)} ${c.unit}.` +
    `${limit ? ` Limit: ${limit}.` : ''}${inside.length > 0 ? ` ${count(inside.length, 'cleaning')}${failed > 0 ? `, of which ${failed} did not clean` : ''}.` : ''}`;
}
