import { computed, effect, signal } from '@preact/signals';
import { addresses } from '../api/addresses';
import { Resource } from '../api/resource';
import type { Import, Line, Recomputation, Site } from '../api/types';
import { connect, connection } from '../live/connection';
import { throttle } from '../live/throttle';
import { learnTime } from './clock';
import { observeWaiting } from './waiting';

/** What every page shares: the site, its lines, its imports, kept fresh by the stream of events. */
export const site = new Resource<Site>(addresses.site);
export const lines = new Resource<{ lines: Line[] }>(addresses.lines);
export const imports = new Resource<{ imports: Import[] }>(addresses.imports);
/** Fetched by the page that shows them; kept fresh from then on. */
export const recomputations = new Resource<{ recomputations: Recomputation[] }>(addresses.recomputations);

/** Civil time of the site; UTC until the site is known. */
export const zone = computed(() => usableZone(site.state.value.value?.time_zone));

/** Grows when results of the line changed; at most every two seconds. */
export const resultsChanged = signal<Readonly<Record<string, number>>>({});
/** Grows when cleanings were logged or taken back. */
export const cleaningsChanged = signal(0);
/** Grows when something was logged of an instrument, or taken back. */
export const instrumentsChanged = signal(0);
/** Grows when a plant file was accepted. */
export const plantChanged = signal(0);
/** Grows when events were missed for good: everything shown is to be fetched anew. */
export const eventsMissed = signal(0);

/** What the operator should know as long as it lasts. A service from before there were notices sends none. */
export const notices = computed(() => site.state.value.value?.notices ?? []);

function usableZone(name: string | undefined): string {
  if (!name) return 'UTC';
  try { new Intl.DateTimeFormat('en', { timeZone: name }); return name; } catch { return 'UTC'; }
}

const changedLines = new Set<string>();
const publish = throttle(() => {
  const grown = { ...resultsChanged.peek() };
  for (const line of changedLines) grown[line] = (grown[line] ?? 0) + 1;
  changedLines.clear();
  resultsChanged.value = grown;
  void lines.load();
}, 2000);

function mergeImport(one: Import): void {
  const known = imports.state.peek().value?.imports ?? [];
  const at = known.findIndex(i => i.id === one.id);
  imports.put({ imports: at < 0 ? [one, ...known] : known.map(i => (i.id === one.id ? one : i)) });
}

function mergeRecomputation(one: Recomputation): void {
  const known = recomputations.state.peek().value?.recomputations;
  if (!known) return;
  recomputations.put({ recomputations: known.some(r => r.id === one.id) ? known.map(r => (r.id === one.id ? one : r)) : [one, ...known] });
}

/** Loads what every page shares and keeps it fresh. */
export function startState(): () => void {
  const all = () => void Promise.all([site.load(), lines.load(), imports.load()]);
  const everything = () => {
    all();
    for (const line of lines.state.peek().value?.lines ?? []) changedLines.add(line.name);
    publish();
    cleaningsChanged.value++;
    instrumentsChanged.value++;
    eventsMissed.value++;
  };
  all();
  const forget = effect(() => {
    const known = site.state.value.value;
    if (known) { learnTime(known.now); observeWaiting(known.days_waiting, Date.parse(known.now)); }
  });
  // Ages and running hours move without any event.
  const regular = setInterval(() => { if (connection.peek().state === 'open' && !document.hidden) void lines.load(); }, 60_000);
  const close = connect({ first: addresses.events, after: addresses.eventsAfter }, {
    site: data => site.put(data as Site),
    windows: data => { changedLines.add((data as { line: string }).line); publish(); },
    // Campaigns, clean expectations and what cleanings brought are results of the line too.
    surfaces: data => { changedLines.add((data as { line: string }).line); publish(); },
    import: data => mergeImport(data as Import),
    instruments: () => { instrumentsChanged.value++; },
    recomputation: data => mergeRecomputation(data as Recomputation),
    plant: () => { plantChanged.value++; void lines.load(); },
    cleanings: () => { cleaningsChanged.value++; void lines.load(); },
  }, everything);
  return () => { forget(); clearInterval(regular); close(); };
}
