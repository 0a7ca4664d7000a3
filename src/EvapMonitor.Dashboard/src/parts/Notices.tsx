import { useEffect, useRef } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Notice } from '../api/types';
import { Mark } from '../bore/Mark';
import { calmNow } from '../site/clock';
import { notices, zone } from '../site/state';
import { mustAct, noticeLine } from '../words/notice';
import { announce } from './Announcer';

/** Says aloud, once, that a notice came or is over; its words may change without being read out again. */
export function NoticeVoice() {
  const known = useRef(new Map<string, Notice>());
  const all = notices.value;
  useEffect(() => {
    for (const n of all) if (!known.current.has(n.key)) announce(n.sentence, mustAct(n));
    const over = [...known.current.values()].filter(n => !all.some(m => m.key === n.key));
    if (over.length > 0) announce(`No longer so: ${over.map(n => n.sentence).join(' ')}`);
    known.current = new Map(all.map(n => [n.key, n]));
  }, [all]);
  return null;
}

/** The notices in one line, for pages that are about something else; it leads to Today. */
export function NoticeLine() {
  const all = notices.value;
  if (all.length === 0) return null;
  const act = all.some(mustAct);
  return (
    <aside class={act ? 'notice notice-act' : 'notice'} aria-label="Notices">
      <p>{act && <Mark kind="now" />}<Link href={pages.today}>{noticeLine(all, zone.value, calmNow.value)}</Link></p>
    </aside>
  );
}
