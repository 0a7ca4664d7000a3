import type { Effect, Line } from '../api/types';
import { unknownReason } from './due';
import { duration } from './duration';
import { moment } from './time';

/** A piece of a sentence; one piece of a line's words is bold. */
export interface Piece { text: string; bold: boolean }

const plain = (text: string): Piece => ({ text, bold: false });
const bold = (text: string): Piece => ({ text, bold: true });

/** What a line's reader should know first: at most two sentences, one clause bold. No calm words on readings that are not live. */
export function lineWords(line: Line, now: number, zone: string): Piece[] {
  if (line.readings === 'none' || line.latest_reading_at === null) {
    return [bold('No reading of this line has come yet.'), plain(' The Plant page shows how to bring in its history.')];
  }
  if (line.readings === 'stale') {
    const at = Date.parse(line.latest_reading_at);
    const due = line.effects.filter(e => e.due.state === 'due').map(e => e.name);
    const then = due.length > 0 ? `By then ${list(due)} ${due.length === 1 ? 'was' : 'were'} due.` : 'What is drawn here is as of then.';
    return [bold(`No reading has come for ${duration(now - at)}`), plain(`, since ${moment(at, zone, now)}. ${then}`)];
  }
  const due = line.effects.filter(e => e.due.state === 'due' && e.cleaning_since === null);
  const unknown = line.effects.filter(e => e.due.state === 'unknown' && e.cleaning_since === null);
  if (due.length > 0) {
    const first = longestDue(due);
    return [...headline(first), plain(second(due.filter(e => e !== first), unknown))];
  }
  if (unknown.length > 0) {
    const [one] = unknown as [Effect];
    const rest = line.effects.length - unknown.length;
    const others = rest === 0 ? 'No effect of this line can be judged.' : 'No cleaning is due at the others.';
    return [bold(`${list(unknown.map(e => e.name))} cannot be judged`), plain(`: ${ending(unknownReason(one))} ${others}`)];
  }
  if (line.effects.every(e => e.due.state === 'no limit')) return [bold('No limit is set'), plain(', so nothing here can be due. Limits are set in the plant file.')];
  const cleaning = line.effects.filter(e => e.cleaning_since !== null).map(e => e.name);
  if (cleaning.length > 0) return [bold(`${list(cleaning)} ${cleaning.length === 1 ? 'is' : 'are'} being cleaned`), plain('. No cleaning is due at the others.')];
  if (line.state === 'idle') return [bold('The line does not produce'), plain(' at present. No cleaning is due.')];
  return [plain('No cleaning is due.')];
}

function longestDue(due: Effect[]): Effect {
  return due.reduce((a, b) => ((b.due.since ?? '~') < (a.due.since ?? '~') ? b : a));
}

/** The service's sentence, bold up to its colon. */
function headline(effect: Effect): Piece[] {
  const sentence = ending(effect.due.sentence ?? `${effect.name} is due for a cleaning`);
  const colon = sentence.indexOf(':');
  return colon < 0 ? [bold(sentence)] : [bold(sentence.slice(0, colon)), plain(sentence.slice(colon))];
}

function second(alsoDue: Effect[], unknown: Effect[]): string {
  const due = alsoDue.map(e => e.name), no = unknown.map(e => e.name);
  if (due.length > 0 && no.length > 0) return ` ${list(due)} ${due.length === 1 ? 'is' : 'are'} due too; ${list(no)} cannot be judged.`;
  if (due.length > 0) return ` ${list(due)} ${due.length === 1 ? 'is' : 'are'} due too.`;
  if (no.length > 0) return ` ${list(no)} cannot be judged: ${ending(unknownReason(unknown[0]!))}`;
  return '';
}

const ending = (text: string) => (/[.!?]$/.test(text) ? text : `${text}.`);

/** "N1", "N1 and N2", "N1, N2 and N3"; more than four become a count of the rest. */
export function list(names: string[]): string {
  if (names.length > 4) return `${names.slice(0, 3).join(', ')} and ${names.length - 3} more`;
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}
