import { pages } from '../api/addresses';
import type { Cleaning, Line, Notice } from '../api/types';
import { onePerEffect } from './cleaning';
import { lineWords, type Piece } from './line';
import { mustAct, noticeWords, orderedNotices } from './notice';
import { asks } from './site';
import { date } from './time';

/** At most so many sentences stand before the rows. */
export const mostFirst = 5;

/** So many names fit in one line of a wall. */
const mostNames = 8;

/** A sentence that comes before the rows. `line`: whose it is, null for the whole site. `act`: someone must act. `answer`: the page where it is answered. */
export interface First { key: string; line: string | null; act: boolean; pieces: Piece[]; answer?: string }

/** What the reader should know first: notices, then lines with a due effect, the longest due first, then lines that went silent, the
 * longest silent first, then lines with an effect that cannot be judged, then recognised cleanings that wait for an answer, the newest of each
 * effect. A line has one entry beside those. `left`: entries beyond `most`. */
export function firstSentences(
  notices: readonly Notice[], lines: readonly Line[], asked: readonly Cleaning[], now: number, zone: string, most = mostFirst): { first: First[]; left: number } {
  const ofLine = (line: Line, act: boolean): First => ({ key: `line ${line.name}`, line: line.name, act, pieces: lineWords(line, now, zone) });
  const asking = lines.filter(asks);
  const due = asking.filter(l => dueSince(l) !== null).sort((a, b) => dueSince(a)!.localeCompare(dueSince(b)!));
  const silent = lines.filter(l => l.readings === 'stale').sort((a, b) => (a.latest_reading_at ?? '').localeCompare(b.latest_reading_at ?? ''));
  const all: First[] = [
    ...orderedNotices(notices).map(n => {
      const { head, rest, since } = noticeWords(n, zone, now);
      return { key: `notice ${n.key}`, line: null, act: mustAct(n), pieces: [{ text: head, bold: true }, { text: `${rest} ${since}`, bold: false }] };
    }),
    ...due.map(l => ofLine(l, true)),
    ...silent.map(l => ofLine(l, false)),
    ...asking.filter(l => dueSince(l) === null).map(l => ofLine(l, false)),
    ...onePerEffect(asked).map(c => ({
      key: `asked ${c.line} ${c.effect}`, line: c.line, act: false, answer: pages.cleanings,
      pieces: [{ text: `${c.effect} came back better on ${date(Date.parse(c.end ?? c.start), zone, now)} without an entry`, bold: true }, { text: ': was it cleaned?', bold: false }],
    })),
  ];
  return { first: all.slice(0, most), left: Math.max(0, all.length - most) };
}

/** Since when the longest due effect of a line is due; null when none is. One that does not say since when comes last. */
function dueSince(line: Line): string | null {
  const since = line.effects.filter(e => e.due.state === 'due' && e.cleaning_since === null).map(e => e.due.since ?? '~');
  return since.length === 0 ? null : since.reduce((a, b) => (a < b ? a : b));
}

/** For a wall, which cannot be scrolled: what someone must act upon before what is to be known, as many in full as have room, and the
 * others by name. */
export function wallFirst(all: readonly First[], room: number): { full: First[]; also: string } {
  const sorted = [...all.filter(f => f.act), ...all.filter(f => !f.act)];
  if (sorted.length <= room) return { full: sorted, also: '' };
  const full = sorted.slice(0, room - 1), rest = sorted.slice(room - 1).map(f => f.line ?? 'the site'), more = rest.length - mostNames;
  return { full, also: `Also ${rest.slice(0, mostNames).join(', ')}${more > 0 ? ` and ${more} more` : ''}` };
}
