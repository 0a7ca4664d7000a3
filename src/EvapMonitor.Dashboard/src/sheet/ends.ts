import type { Place, Way } from '../api/types';
import type { Column, Graph } from './order';
import { flowTexts } from './reading';
import type { End } from './ports';

/** Which run of the drawing a way belongs to: over the boxes, under them as liquor, or under that as condensate. */
export type Level = 'vapour' | 'liquor' | 'condensate' | 'flash';

/** What stands where: the column of each place, and the ends of the ways at each column's upper and lower edge. */
export interface Plan {
  columns: Column[];
  /** Number of the column by place. */
  column: Map<string, number>;
  /** By column: ends at the upper edge, at the lower edge. */
  upper: End[][];
  lower: End[][];
  /** Small boxes over and under the columns, with the keys of their ends. */
  above: Small[];
  below: Small[];
  /** True when the feed stands on the right, as where the liquor runs against the steam. */
  feedRight: boolean;
}

/** A heater, user, motive steam or tank: a box of its own beyond the lanes; `flow` is what it shows of its only way. */
export interface Small { place: Place; column: number; keys: string[]; flow: string }

export const endKey = (way: number, end: 'from' | 'to') => `${way} ${end}`;

/** The level of a way. Vapour of flashing condensate rises from below. */
export function levelOf(way: Way): Level {
  if (way.from.startsWith('flash/')) return way.kind === 'condensate' ? 'condensate' : 'flash';
  return way.kind === 'liquor' || way.kind === 'condensate' ? way.kind : 'vapour';
}

/** Puts every place into a column and sorts the ends of the ways there. */
export function planOf(graph: Graph, columns: Column[]): Plan {
  const { places, ways } = graph, last = columns.length - 1;
  const column = new Map<string, number>(columns.map((c, i) => [c.id, i]));
  column.set('steam', 0).set('condenser', last);
  const feedRight = mean(ways.filter(w => w.from === 'feed').map(w => column.get(w.to))) > mean(ways.filter(w => w.to === 'product').map(w => column.get(w.from)));
  column.set('feed', feedRight ? last : 0).set('product', feedRight ? 0 : last);
  for (const p of places) {
    if (p.kind === 'tank') column.set(p.id, column.get(ways.find(w => w.to === p.id)?.from ?? 'feed') ?? 0);
    if (p.kind === 'heater' || p.kind === 'user') column.set(p.id, column.get(ways.find(w => w.to === p.id)?.from ?? '') ?? last);
    if (p.kind === 'motive steam') column.set(p.id, column.get(ways.find(w => w.from === p.id)?.to ?? '') ?? 0);
    if (p.kind === 'flash vessel') column.set(p.id, column.get(p.id.replace('flash/', 'effect/')) ?? last);
  }
  const plan: Plan = { columns, column, upper: columns.map(() => []), lower: columns.map(() => []), above: [], below: [], feedRight };
  const small = (kinds: string[]) => places.filter(p => kinds.includes(p.kind) && ways.some(w => w.from === p.id || w.to === p.id)).map((place): Small => ({ place, column: column.get(place.id)!, keys: [], flow: readingOf(ways.filter(w => w.from === place.id || w.to === place.id)) }));
  plan.above = small(['heater', 'user', 'motive steam']);
  plan.below = small(['tank']);
  ways.forEach((way, i) => addEnds(plan, way, i));
  return plan;
}

function addEnds(plan: Plan, way: Way, i: number): void {
  const level = levelOf(way), from = plan.column.get(way.from), to = plan.column.get(way.to);
  if (level === 'condensate' || level === 'flash') {
    // Of a vessel only the vapour reaches the boxes above; it rises beside their condensate.
    if (level === 'flash') plan.lower[to!]!.push({ key: endKey(i, 'to'), side: 'first', at: 1 });
    else if (way.from.startsWith('effect/')) plan.lower[from!]!.push({ key: endKey(i, 'from'), side: 'first', at: 0 });
    return;
  }
  if (from === undefined || to === undefined) return;
  const edge = level === 'vapour' ? plan.upper : plan.lower, smalls = level === 'vapour' ? plan.above : plan.below;
  const holder = (id: string) => smalls.findIndex(s => s.place.id === id);
  const put = (here: number, there: number, id: string, key: string) => {
    const held = holder(id);
    if (held >= 0) { smalls[held]!.keys.push(key); edge[here]!.push({ key, side: 'middle', at: held * 100 + there }); }
    else edge[here]!.push({ key, side: there < here ? 'left' : 'right', at: there });
  };
  if (from === to) {
    // Straight on: one position serves both ends.
    const held = Math.max(holder(way.from), holder(way.to)), key = endKey(i, 'from');
    if (held >= 0) smalls[held]!.keys.push(key);
    edge[from]!.push({ key, side: 'middle', at: held * 100 + from });
    return;
  }
  put(from, to, way.from, endKey(i, 'from'));
  put(to, from, way.to, endKey(i, 'to'));
}

const readingOf = (ways: Way[]) => (ways.length === 1 && ways[0]!.flow ? flowTexts(ways[0]!).at(-1) ?? '' : '');

const mean = (numbers: (number | undefined)[]) => {
  const known = numbers.filter(n => n !== undefined);
  return known.length === 0 ? 0 : known.reduce((a, b) => a + b, 0) / known.length;
};
