import type { Place, Way } from '../api/types';
import { endKey, levelOf, planOf, type Plan } from './ends';
import { lanesOf, type Run } from './lanes';
import type { Metrics } from './metrics';
import { columnsOf, type Column, type Graph } from './order';
import { neededFor, portsOf } from './ports';
import { rowsOf, type Put } from './smalls';
import { textWidth } from './text';

export interface Point { x: number; y: number }
export interface Rect { x: number; y: number; w: number; h: number }
export interface Node { place: Place; rect: Rect }
export interface Route { way: Way; points: Point[] }
/** A track of the drawing with its name, for the gutter. */
export interface Track { name: string; at: number }

export interface Sheet { width: number; height: number; metrics: Metrics; columns: Column[]; nodes: Node[]; routes: Route[]; tracks: Track[] }


/** Lays a line out: every place a box, every way a chain of level and plumb stretches that touches no box but its own. */
export function layout(graph: Graph, wished: Metrics): Sheet {
  const columns = columnsOf(graph), plan = planOf(graph, columns), metrics = roomy(wished, plan);
  const startOf = (c: number) => metrics.gutter + c * metrics.column + (metrics.column - metrics.box) / 2;
  const ports = { upper: new Map<string, number>(), lower: new Map<string, number>() };
  columns.forEach((_, c) => {
    for (const edge of ['upper', 'lower'] as const) {
      const { from, size } = edgeOf(edge, c, columns.length, startOf(c), metrics);
      for (const [key, at] of portsOf(plan[edge][c]!, from, size, metrics)) ports[edge].set(key, at);
    }
  });
  const endOf = (c: number) => startOf(c) + metrics.box + (metrics.column - metrics.box) / 2 - 3;
  // Nothing passes over the columns but the ways of these boxes; under them condensate does.
  const above = rowsOf(plan.above, ports.upper, () => metrics.gutter + columns.length * metrics.column - 2, metrics), below = rowsOf(plan.below, ports.lower, endOf, metrics);
  const flash = flashOf(graph, plan, ports.lower, startOf, metrics);

  const { ways } = graph, clear = metrics.turned ? 15 : 18;
  const runsOf = (level: 'vapour' | 'liquor', at: Map<string, number>): Run[] => ways.flatMap((w, key) => (levelOf(w) === level && at.has(endKey(key, 'to')) && at.has(endKey(key, 'from'))
    ? [{ key, from: at.get(endKey(key, 'from'))!, to: at.get(endKey(key, 'to'))! }] : []));
  const vapour = lanesOf(runsOf('vapour', ports.upper)), liquor = lanesOf(runsOf('liquor', ports.lower));

  const step = metrics.small.across + 8;
  const topOfBoxes = 2 + above.rows * step + (vapour.count > 0 ? clear + (vapour.count - 1) * metrics.lane + 12 : above.rows > 0 ? 14 : 0);
  const bottomOfBoxes = topOfBoxes + metrics.across;
  const liquorAt = (lane: number) => bottomOfBoxes + clear + lane * metrics.lane;
  const tanksAt = liquorAt(Math.max(0, liquor.count - 1)) + 14;
  const condensateAt = (below.rows > 0 ? tanksAt + below.rows * step : tanksAt - 4) + (flash.into.count > 0 ? 10 : 0);
  const vesselsAt = condensateAt + (flash.into.count > 0 ? (flash.into.count - 1) * metrics.lane + clear : 0);
  const outAt = flash.vessels.length > 0 ? vesselsAt + 30 + 14 : condensateAt;
  const headerAt = outAt + flash.on.count * metrics.lane + (metrics.turned ? 6 : 30);

  const nodes: [Place, number, number, number, number][] = [];
  const edges = new Map<string, { top: number; bottom: number }>();
  const box = (place: Place, from: number, to: number, top: number, bottom: number) => { nodes.push([place, from, to, top, bottom]); edges.set(place.id, { top, bottom }); };
  for (const place of graph.places) {
    const c = plan.column.get(place.id);
    if (c === undefined || !ways.some(w => w.from === place.id || w.to === place.id)) continue;
    const from = startOf(c), to = from + metrics.box, half = halfOf(metrics);
    if (place.kind === 'effect') box(place, from, to, topOfBoxes, bottomOfBoxes);
    else if (place.id === 'steam' || place.id === 'condenser' || place.kind.endsWith('recompressor')) {
      if (metrics.turned && !place.kind.endsWith('recompressor')) box(place, from, from + half, topOfBoxes, bottomOfBoxes);
      else box(place, from, to, topOfBoxes, metrics.turned ? bottomOfBoxes : topOfBoxes + half);
    } else if (place.kind === 'feed' || place.kind === 'product') {
      if (metrics.turned) box(place, to - half, to, topOfBoxes, bottomOfBoxes);
      else box(place, from, to, bottomOfBoxes - half, bottomOfBoxes);
    }
  }
  const beyond = (put: Put[], top: (row: number) => number) => put.forEach(p => box(p.small.place, p.from, p.to, top(p.row), top(p.row) + metrics.small.across));
  beyond(above.put, row => 2 + (above.rows - 1 - row) * step);
  beyond(below.put, row => tanksAt + row * step);
  for (const v of flash.vessels) box(v.place, v.from, v.to, vesselsAt, vesselsAt + 30);

  const routes: [Way, [number, number][]][] = [];
  const joins: number[] = [];
  ways.forEach((way, i) => {
    const level = levelOf(way), start = edges.get(way.from), end = edges.get(way.to);
    if (level === 'vapour' || level === 'liquor') {
      const at = ports[level === 'vapour' ? 'upper' : 'lower'], a = at.get(endKey(i, 'from')), b = at.get(endKey(i, 'to'));
      if (a === undefined || start === undefined || end === undefined) return;
      // Small boxes stand beyond the lanes and are met on the side that faces them.
      const beyondLanes = (id: string) => (level === 'vapour' ? plan.above : plan.below).some(s => s.place.id === id);
      const edge = (id: string, e: { top: number; bottom: number }) => ((level === 'vapour') === beyondLanes(id) ? e.bottom : e.top);
      const near = edge(way.from, start), far = edge(way.to, end);
      const lane = level === 'vapour' ? topOfBoxes - clear - (vapour.lane.get(i) ?? 0) * metrics.lane : liquorAt(liquor.lane.get(i) ?? 0);
      routes.push([way, b === undefined ? [[a, near], [a, far]] : [[a, near], [a, lane], [b, lane], [b, far]]]);
    } else if (level === 'flash') {
      routes.push([way, [[ports.lower.get(endKey(i, 'to'))!, vesselsAt], [ports.lower.get(endKey(i, 'to'))!, bottomOfBoxes]]]);
    } else {
      const a = flash.from.get(i) ?? ports.lower.get(endKey(i, 'from'))!, fromVessel = way.from.startsWith('flash/');
      const near = fromVessel ? vesselsAt + 30 : bottomOfBoxes, b = flash.to.get(i);
      if (b === undefined) { routes.push([way, [[a, near], [a, headerAt]]]); joins.push(a); return; }
      const lane = fromVessel ? outAt + flash.on.lane.get(i)! * metrics.lane : condensateAt + flash.into.lane.get(i)! * metrics.lane;
      routes.push([way, [[a, near], [a, lane], [b, lane], [b, fromVessel ? vesselsAt + 30 : vesselsAt]]]);
    }
  });

  const end = startOf(columns.length - 1), header = graph.places.find(p => p.id === 'condensate');
  if (header && joins.length > 0) box(header, Math.min(...joins) - 6, metrics.turned ? end + metrics.box : end, headerAt, headerAt + 3);
  const height = headerAt + (metrics.turned ? 6 : 14), width = metrics.gutter + columns.length * metrics.column;
  const point = ([along, across]: [number, number]): Point => (metrics.turned ? { x: across, y: along } : { x: along, y: across });
  const tracks: Track[] = [
    { name: 'steam, vapour', at: topOfBoxes - clear }, { name: 'liquor', at: liquorAt(0) }, { name: 'condensate', at: headerAt },
    ...(plan.above.some(s => s.place.kind !== 'motive steam') ? [{ name: 'users of bleeds', at: 2 + metrics.small.across / 2 }] : []),
  ];
  return {
    metrics, columns, tracks, width: metrics.turned ? height : width, height: metrics.turned ? width + 24 : height,
    nodes: nodes.map(([place, from, to, top, bottom]) => ({ place, rect: metrics.turned ? { x: top, y: from, w: bottom - top, h: to - from } : { x: from, y: top, w: to - from, h: bottom - top } })),
    routes: routes.map(([way, points]) => ({ way, points: points.map(point) })),
  };
}

/** Where the ends of a column may lie. Down the page, the first and the last row hold two boxes one after the other: steam or condenser, feed or product. */
function edgeOf(edge: 'upper' | 'lower', column: number, columns: number, start: number, metrics: Metrics): { from: number; size: number } {
  if (!metrics.turned || (column > 0 && column < columns - 1)) return { from: start, size: metrics.box };
  const half = halfOf(metrics);
  return { from: edge === 'upper' ? start : start + metrics.box - half, size: half };
}

const halfOf = (metrics: Metrics) => (metrics.turned ? metrics.box : metrics.across) / 2 - 4;

/** Down the page a row is as high as its busiest box needs; across it, small boxes as their words need. */
function roomy(metrics: Metrics, plan: Plan): Metrics {
  if (!metrics.turned) {
    const words = [...plan.above, ...plan.below].some(s => plan.below.includes(s) && textWidth(s.place.name, metrics.font) > metrics.column - 60);
    return words ? { ...metrics, small: { ...metrics.small, across: metrics.small.across + 16 } } : metrics;
  }
  const last = plan.columns.length - 1;
  const needed = Math.max(...[plan.upper, plan.lower].flatMap(edge => edge.map((ends, c) => (c === 0 || c === last ? 2 * neededFor(ends, metrics) + 48 : neededFor(ends, metrics) + 44))));
  return needed <= metrics.box ? metrics : { ...metrics, box: needed, column: needed + 12 };
}

/** The vessels in which condensate flashes: boxes, and where their ways begin and end along the columns. */
function flashOf({ places, ways }: Graph, plan: Plan, lower: Map<string, number>, startOf: (c: number) => number, metrics: Metrics) {
  const from = new Map<number, number>(), to = new Map<number, number>();
  const vessels = places.filter(p => p.kind === 'flash vessel').map(place => {
    const c = plan.column.get(place.id)!, rises = ways.findIndex(w => w.from === place.id && w.kind !== 'condensate');
    const left = lower.get(endKey(rises, 'to')) ?? startOf(c) + 20;
    let into = left + 12, on = left + 2;
    ways.forEach((w, i) => {
      if (w.to !== place.id) return;
      if (w.from.startsWith('flash/')) { to.set(i, on); on += 12; } else { to.set(i, into); into += 12; }
    });
    const out = ways.findIndex(w => w.from === place.id && w.kind === 'condensate');
    from.set(out, Math.max(on, startOf(c) + metrics.box - 10));
    return { place, from: left - 8, to: Math.max(into, on + 12, startOf(c) + metrics.box) };
  });
  const runs = (fromVessel: boolean): Run[] => ways.flatMap((w, key) => (to.has(key) && w.from.startsWith('flash/') === fromVessel ? [{ key, from: from.get(key) ?? lower.get(endKey(key, 'from'))!, to: to.get(key)! }] : []));
  return { vessels, from, to, into: lanesOf(runs(false)), on: lanesOf(runs(true)) };
}
