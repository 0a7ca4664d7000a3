import type { Source, Sources } from '../api/types';
import { duration } from './duration';
import { bytes, count, fixed } from './number';
import { moment } from './time';

const kinds: Record<string, string> = { mqtt: 'a broker that is read', broker: "the service's own broker", http: 'readings posted to the service' };

/** What kind of source it is, in words. */
export const kindWords = (source: Source) => kinds[source.kind] ?? source.kind;

/** Whether someone must look after the source: a broker that is not connected. */
export const isCut = (source: Source) => source.kind !== 'http' && source.connected_since === null;

/** Whether it is connected and when it last spoke. Posted readings hold no connection. */
export function sourceWords(source: Source, zone: string, now: number): { bold: string; rest: string } {
  const last = source.last_message_at === null ? 'No message has come since the service started.'
    : now - Date.parse(source.last_message_at) < 10_000 ? 'Last message just now.' : `Last message ${duration(now - Date.parse(source.last_message_at))} ago.`;
  if (source.kind === 'http') return { bold: '', rest: last };
  if (source.connected_since === null) return { bold: source.kind === 'broker' ? 'It does not listen' : 'Not connected', rest: `. ${last}` };
  const since = moment(Date.parse(source.connected_since), zone, now);
  return { bold: '', rest: `${source.kind === 'broker' ? 'Listening' : 'Connected'} since ${since}. ${last}` };
}

/** What came of its messages since the service started; what did not happen is not named. */
export function countsWords(source: Source): string[] {
  const rows: [number, string][] = [
    [source.malformed, 'malformed'],
    [source.out_of_time, 'out of time (too far ahead, or before the history)'],
    [source.unknown, 'of signals that no plant file names'],
    [source.instant_unknown, 'retained without a time, left out'],
    [source.shed, 'dropped because the intake was full'],
  ];
  return [
    `${count(source.accepted, 'reading')} accepted`,
    ...rows.filter(([n]) => n > 0).map(([n, what]) => `${fixed(n)} ${what}`),
    ...(source.refused > 0 ? [`told to come again later ${times(source.refused)}`] : []),
    ...(source.reconnects > 0 ? [`connected anew ${times(source.reconnects)}`] : []),
  ];
}

const times = (n: number) => (n === 1 ? 'once' : `${fixed(n)} times`);

/** What is on disk and has not reached the database. */
export function spoolWords({ bytes: size }: Sources['spool']): string {
  return size === 0 ? 'Nothing waits for the database.' : `${bytes(size)} of readings wait on disk for the database.`;
}
