import type { Quantity } from './types';

const base = '/api/v1';
const part = encodeURIComponent;

/** Addresses of the REST interface. Names come from outside, so every one is percent-encoded here and nowhere else. */
export const addresses = {
  site: `${base}/site`,
  lines: `${base}/lines`,
  signals: `${base}/signals`,
  sources: `${base}/sources`,
  plant: `${base}/plant`,
  revisions: `${base}/plant/revisions`,
  revision: (id: number) => `${base}/plant/revisions/${id}`,
  differences: (id: number, from: number) => `${base}/plant/revisions/${id}/differences?from=${from}`,
  /** `from`: the instant, ms; null corrects the revision in force now. */
  acceptPlant: (from: number | null) => `${base}/plant/revisions${from === null ? '' : `?in_force_from=${part(new Date(from).toISOString())}`}`,
  recomputations: `${base}/recomputations`,
  turnRecomputation: (id: number, what: 'cancel' | 'resume') => `${base}/recomputations/${id}/${what}`,
  imports: `${base}/imports`,
  events: `${base}/events`,
  /** The events missed since one are sent first. */
  eventsAfter: (id: string) => `${base}/events?last_event_id=${part(id)}`,
  flowSheet: (line: string) => `${base}/lines/${part(line)}/flow-sheet`,
  balance: (line: string) => `${base}/lines/${part(line)}/balance`,
  corrections: (signal: string, from: number, to: number, points: number) =>
    `${base}/signals/${part(signal)}/corrections?from=${part(new Date(from).toISOString())}&to=${part(new Date(to).toISOString())}&points=${points}`,
  effect: (line: string, effect: string) => `${base}/lines/${part(line)}/effects/${part(effect)}`,
  trend: (line: string, effect: string, quantity: Quantity, from: number, to: number, points: number) =>
    `${addresses.effect(line, effect)}/trend?quantity=${quantity}&from=${part(new Date(from).toISOString())}` +
    `&to=${part(new Date(to).toISOString())}&points=${points}`,
  campaigns: (line: string, effect: string) => `${addresses.effect(line, effect)}/campaigns`,
  cleanings: (line?: string, effect?: string) => {
    const filter = [line && `line=${part(line)}`, effect && `effect=${part(effect)}`].filter(Boolean).join('&');
    return `${base}/cleanings${filter && `?${filter}`}`;
  },
  cleaning: (id: string) => `${base}/cleanings/${part(id)}`,
  instrumentLog: (signal?: string) => `${base}/instrument-log${signal === undefined ? '' : `?signal=${part(signal)}`}`,
  instrumentEvent: (id: string) => `${base}/instrument-log/${part(id)}`,
  upload: (name: string) => `${base}/imports?name=${part(name)}`,
  cancelImport: (id: string) => `${base}/imports/${part(id)}/cancel`,
};

/** Addresses of the pages. */
export const pages = {
  today: '/',
  wall: '/?wall',
  lines: '/lines',
  cleanings: '/cleanings',
  instruments: '/instruments',
  plant: '/plant',
  line: (line: string) => `/lines/${part(line)}`,
  effect: (line: string, effect: string) => `/lines/${part(line)}/effects/${part(effect)}`,
};
