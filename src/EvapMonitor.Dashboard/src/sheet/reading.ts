import type { MeasuredNow } from '../api/types';
import { raw } from '../words/number';
import { prettyUnit } from '../words/quantity';

/** A reading in few words; null when there is none. An old one says so. */
export function readingText(m: MeasuredNow): string | null {
  if (m.value === null) return null;
  const value = `${raw(Number(m.value.toPrecision(3)))} ${prettyUnit(m.unit)}`.trim();
  return m.state === 'stale' ? `was ${value}` : m.state === 'bad' ? `bad: ${value}` : value;
}
