import type { Notice } from '../api/types';
import { duration } from './duration';
import { moment } from './time';

/** Notices under which readings are being lost or shut out now, so that someone must act; every other one is to be known. */
const acting = ['spool-full', 'spool-failed', 'spool-unreadable', 'own-broker', 'disk-full'];

export const mustAct = (notice: Notice) => acting.includes(notice.key);

const ended = (text: string) => (/[.!?]$/.test(text) ? text : `${text}.`);

/** The service's sentences, then since when; `head` is the clause that a hurried reader needs. */
export function noticeWords(notice: Notice, zone: string, now: number): { head: string; rest: string; since: string } {
  const at = Date.parse(notice.since), text = ended(notice.sentence);
  // Up to the first colon or stop that a space follows: an address holds colons and stops of its own.
  const head = /^.*?(?=:\s|[.!?](?:\s|$))/s.exec(text)?.[0] ?? text;
  return { head, rest: text.slice(head.length), since: `Since ${moment(at, zone, now)}, for ${duration(now - at)}.` };
}

/** Those that ask for an act first, the longest standing first among equals. */
export function orderedNotices(notices: readonly Notice[]): Notice[] {
  return [...notices].sort((a, b) => Number(mustAct(b)) - Number(mustAct(a)) || a.since.localeCompare(b.since));
}

/** One line for the pages that are about something else: the first notice, and how many more stand. */
export function noticeLine(notices: readonly Notice[], zone: string, now: number): string {
  const [first, ...more] = orderedNotices(notices);
  if (first === undefined) return '';
  const { head, rest, since } = noticeWords(first, zone, now);
  return `${head}${rest} ${since}${more.length > 0 ? ` ${more.length} more ${more.length === 1 ? 'notice stands' : 'notices stand'} on Today.` : ''}`;
}
