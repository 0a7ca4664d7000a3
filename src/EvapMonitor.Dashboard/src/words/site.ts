import type { Line } from '../api/types';
import type { Piece } from './line';
import { count } from './number';

/** A line asks for something when an effect is due or cannot be judged. A silent line is counted apart. */
export const asks = (line: Line) => line.readings === 'live' && line.effects.some(e => e.cleaning_since === null && (e.due.state === 'due' || e.due.state === 'unknown'));

/** The state of many lines in one sentence; silent ones never count as calm. */
export function siteWords(lines: readonly Line[]): Piece[] {
  const asking = lines.filter(asks).length, silent = lines.filter(l => l.readings !== 'live').length;
  const head = asking === 0 ? `None of ${count(lines.length - silent, 'line')} with live readings asks for anything`
    : `${asking} of ${count(lines.length, 'line')} ${asking === 1 ? 'asks' : 'ask'} for something`;
  return [{ text: head, bold: asking > 0 }, { text: silent === 0 ? '.' : `; ${silent} ${silent === 1 ? 'is' : 'are'} silent.`, bold: false }];
}
