import type { Cleaning, KnownBy, Stop } from '../api/types';
import { laneWords, verdictOf } from '../words/cleaning';

/** A mark in the lane on top of a chart. Instants in ms; `end` null while it goes on. */
export interface LaneMark {
  start: number;
  end: number | null;
  /** How it is known gives the form; a stop is not a cleaning. */
  form: Exclude<KnownBy, 'rejected'> | 'stop';
  /** It did not clean. */
  failed: boolean;
  long: string;
  short: string;
}

/** The marks of an effect: its cleanings as they are known, and the stops of its surface. What somebody rejected is none. */
export function laneMarks(cleanings: readonly Cleaning[], stops: readonly Stop[]): LaneMark[] {
  const at = (time: string | null) => (time === null ? null : Date.parse(time));
  return [
    ...stops.map(s => ({ start: Date.parse(s.start), end: at(s.end), form: 'stop' as const, failed: false, long: 'stop', short: '' })),
    ...cleanings.filter(c => c.known_by !== 'rejected').map(c => ({
      start: Date.parse(c.start), end: at(c.end), form: c.known_by as Exclude<KnownBy, 'rejected'>, failed: verdictOf(c) === 'did not clean', ...laneWords(c),
    })),
  ].sort((a, b) => a.start - b.start);
}

/** The marks that a span shows. */
export const marksIn = (marks: readonly LaneMark[], from: number, to: number): LaneMark[] => marks.filter(m => m.start < to && (m.end ?? to) > from);

/** A mark on the page: where it begins and how wide its words are, px. */
export interface LanePlace { at: number; long: number; short: number; weight: number }

/** Which marks have room for words, and where these begin: failed cleanings first, then the newest; long words, else short ones, else none. */
export function laneLabels(places: readonly LanePlace[], left: number, right: number, gap: number): { index: number; at: number; words: 'long' | 'short' }[] {
  const taken: { from: number; to: number }[] = [], labels: { index: number; at: number; words: 'long' | 'short' }[] = [];
  const order = places.map((_, i) => i).sort((a, b) => places[b]!.weight - places[a]!.weight || places[b]!.at - places[a]!.at);
  for (const index of order) {
    const place = places[index]!;
    for (const words of ['long', 'short'] as const) {
      const width = place[words];
      if (width <= 0 || width > right - left) continue;
      const at = Math.min(Math.max(place.at, left), right - width);
      if (taken.some(t => at < t.to + gap && at + width + gap > t.from)) continue;
      taken.push({ from: at, to: at + width });
      labels.push({ index, at, words });
      break;
    }
  }
  return labels;
}
