import type { MeasuredNow, Way } from '../api/types';
import { raw } from '../words/number';
import { prettyUnit } from '../words/quantity';

/** A reading in few words; null when there is none. An old one says so. */
export function readingText(m: MeasuredNow): string | null {
  if (m.value === null) return null;
  const value = `${raw(Number(m.value.toPrecision(3)))} ${prettyUnit(m.unit)}`.trim();
  return m.state === 'stale' ? `was ${value}` : m.state === 'bad' ? `bad: ${value}` : value;
}

/** The flow of a way, at most so wordy: as read, where the balance agrees or says nothing; else by balance, with a star and what was read. Null when nobody knows it. */
export function flowTexts({ flow, balance }: Way): string[] {
  const read = flow && readingText(flow);
  if (balance === null || (read && (balance.agrees !== false || flow.state === 'stale'))) return read ? [read] : [];
  const value = raw(Number(balance.value.toPrecision(3))), unit = prettyUnit(balance.unit);
  return [...(read ? [`read ${read}, ${value}*`] : []), `${value} ${unit}*`, `${value}*`];
}
