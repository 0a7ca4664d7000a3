import type { Line } from '../api/types';
import { asks } from '../words/site';

/** Which of many lines are shown. */
export type Choice = 'all' | 'asking' | 'silent';

/** The choice that the address bar names. */
export function readChoice(search: string): { show: Choice; named: string } {
  const q = new URLSearchParams(search), show = q.get('show');
  return { show: show === 'asking' || show === 'silent' ? show : 'all', named: q.get('named') ?? '' };
}

/** The same for the address bar; nothing where nothing is chosen. */
export function writeChoice({ show, named }: { show: Choice; named: string }): string {
  const q = new URLSearchParams();
  if (show !== 'all') q.set('show', show);
  if (named !== '') q.set('named', named);
  return q.size === 0 ? '' : `?${q}`;
}

const silent = (line: Line) => line.readings !== 'live';

/** The chosen lines, in the order they came. */
export function chosen(lines: readonly Line[], { show, named }: { show: Choice; named: string }): Line[] {
  const text = named.trim().toLowerCase();
  return lines.filter(l => l.name.toLowerCase().includes(text) && (show === 'all' || (show === 'asking' ? asks(l) : silent(l))));
}

/** The choices with how many lines each shows. */
export function choices(lines: readonly Line[]): [Choice, string][] {
  return [['all', `every line (${lines.length})`], ['asking', `lines that ask (${lines.filter(asks).length})`], ['silent', `silent lines (${lines.filter(silent).length})`]];
}
