import type { Place, Way } from '../api/types';

/** What the drawing needs of a line. */
export interface Graph { places: Place[]; ways: Way[] }

/** A column of the page: what stands in it. The drawing, the descent and the table share them. */
export interface Column { id: string; kind: 'source' | 'effect' | 'recompressor' | 'sink'; name: string }

const isRecompressor = (kind: string) => kind.endsWith('recompressor');

/** The columns: the main, the effects in the order of the steam with each recompressor before the first chest that it heats, the condenser. */
export function columnsOf({ places, ways }: Graph): Column[] {
  const effects = places.filter(p => p.kind === 'effect').map(p => p.id);
  const machines = places.filter(p => isRecompressor(p.kind));
  const order = steamOrder(effects, machines.map(m => m.id), ways);
  const middle: Column[] = [];
  const placed = new Set<string>();
  for (const id of order) {
    for (const m of machines) {
      if (placed.has(m.id) || !ways.some(w => w.from === m.id && w.to === id)) continue;
      placed.add(m.id);
      middle.push({ id: m.id, kind: 'recompressor', name: m.name });
    }
    middle.push({ id, kind: 'effect', name: places.find(p => p.id === id)!.name });
  }
  return [{ id: 'source', kind: 'source', name: '' }, ...middle, { id: 'sink', kind: 'sink', name: '' }];
}

/** Trains that no vapour joins come one after the other, as the plant file names them; within one, by how often the steam was used before. */
function steamOrder(effects: string[], machines: string[], ways: Way[]): string[] {
  const heats = ways.filter(w => w.kind === 'vapour' && effects.includes(w.from) && effects.includes(w.to));
  const level = new Map(effects.map(e => [e, 0]));
  for (let round = 0; round < effects.length; round++) {
    for (const w of heats) level.set(w.to, Math.max(level.get(w.to)!, Math.min(effects.length, level.get(w.from)! + 1)));
  }
  const train = new Map([...effects, ...machines].map(id => [id, id]));
  const root = (id: string): string => (train.get(id) === id ? id : root(train.get(id)!));
  for (const w of ways) if (w.kind === 'vapour' && train.has(w.from) && train.has(w.to)) train.set(root(w.to), root(w.from));
  const first = new Map<string, number>();
  effects.forEach((e, i) => { if (!first.has(root(e))) first.set(root(e), i); });
  return effects.map((e, i) => ({ e, i })).sort((a, b) => first.get(root(a.e))! - first.get(root(b.e))! || level.get(a.e)! - level.get(b.e)! || a.i - b.i).map(x => x.e);
}
