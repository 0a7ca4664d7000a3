import type { MeasuredNow, Place, Way } from '../api/types';
import type { Point, Rect, Sheet } from './layout';
import { flowTexts } from './reading';
import { textWidth } from './text';

export interface Label { text: string; rect: Rect; way: Way; measured: boolean }

export const letters: Record<Way['kind'], string> = { steam: 'S', vapour: 'V', bleed: 'B', motive: 'M', liquor: 'L', condensate: 'C' };

/** What stands on a way, the best first: its measured flow; its flow by balance; the letter of its kind, with its stated share of the source. */
export function labelText(way: Way): { texts: string[]; measured: boolean } {
  const flows = flowTexts(way), letter = way.share === null ? letters[way.kind] : `${letters[way.kind]} ${Math.round(way.share * 100)} %`;
  return { texts: [...flows, letter], measured: way.flow !== null && flows.length > 0 };
}

const lineHeight = 16, step = 7;

/** The flow that a box of its own shows: that of the only way to or from it. */
export function flowOf(sheet: Sheet, place: Place): MeasuredNow | null {
  return onlyWay(sheet, place)?.flow ?? null;
}

export function onlyWay(sheet: Sheet, place: Place): Way | null {
  if (place.kind === 'effect' || place.kind === 'condensate' || place.kind === 'flash vessel') return null;
  const ways = sheet.routes.filter(r => r.way.from === place.id || r.way.to === place.id);
  return ways.length === 1 ? ways[0]!.way : null;
}

/** Labels on their ways where they cover nothing: flows first. A flow without a place is left to the table, a letter is left out. */
export function labelsOf(sheet: Sheet): Label[] {
  const done: Label[] = [];
  const inBoxes = new Set(sheet.nodes.map(n => flowOf(sheet, n.place)).filter(f => f !== null));
  const wanted = sheet.routes.map((route, at) => {
    const own = labelText(route.way);
    return { route, at, ...(sheet.metrics.turned || (route.way.flow !== null && inBoxes.has(route.way.flow)) ? { texts: [letters[route.way.kind]], measured: false } : own) };
  }).sort((a, b) => Number(b.measured) - Number(a.measured) || b.texts.length - a.texts.length);
  for (const { route, at, texts } of wanted) for (const text of texts) {
    const w = textWidth(text, sheet.metrics.font) + 6;
    const free = candidates(route.points, w, route.way.kind === 'condensate').find(rect => inside(rect, sheet) && !sheet.nodes.some(n => overlap(rect, n.rect, 2)) && !done.some(l => overlap(rect, l.rect, 2))
      && !sheet.routes.some((other, i) => i !== at && stretches(other.points).some(([a, b]) => overlap(rect, between(a, b), 2))));
    if (!free) continue;
    done.push({ text, measured: text !== texts.at(-1), way: route.way, rect: free });
    break;
  }
  return done;
}

export const stretches = (points: Point[]): [Point, Point][] => points.slice(1).map((p, i) => [points[i]!, p]);

export const between = (a: Point, b: Point): Rect => ({ x: Math.min(a.x, b.x), y: Math.min(a.y, b.y), w: Math.abs(a.x - b.x), h: Math.abs(a.y - b.y) });

export const overlap = (a: Rect, b: Rect, gap = 0) => a.x < b.x + b.w + gap && b.x < a.x + a.w + gap && a.y < b.y + b.h + gap && b.y < a.y + a.h + gap;

const inside = (r: Rect, sheet: Sheet) => r.x >= 0 && r.y >= 0 && r.x + r.w <= sheet.width && r.y + r.h <= sheet.height;

/** Places for a label: on the longest level stretch from its middle outwards, then on plumb ones, then beside them. `late`: near the end, so that labels of neighbours stand in a row. */
function candidates(points: Point[], w: number, late: boolean): Rect[] {
  const all = stretches(points), level = all.filter(([a, b]) => a.y === b.y).sort((p, q) => Math.abs(q[0].x - q[1].x) - Math.abs(p[0].x - p[1].x)), plumb = all.filter(([a, b]) => a.x === b.x);
  const on = (x: number, y: number): Rect => ({ x: x - w / 2, y: y - lineHeight / 2, w, h: lineHeight });
  const spread = (from: number, to: number, keep: number): number[] => {
    const low = Math.min(from, to) + keep, high = Math.max(from, to) - keep, mid = (low + high) / 2, found: number[] = [];
    for (let d = 0; mid + d <= high; d += step) found.push(mid + d, mid - d);
    return late ? found.sort((a, b) => (to > from ? b - a : a - b)) : found;
  };
  const onLevel = level.flatMap(([a, b]) => spread(a.x, b.x, w / 2 + 6).map(x => on(x, a.y)));
  const onPlumb = plumb.flatMap(([a, b]) => spread(a.y, b.y, lineHeight / 2 + 6).map(y => on(a.x, y)));
  const beside = plumb.flatMap(([a, b]) => spread(a.y, b.y, lineHeight / 2).flatMap(y => [on(a.x + w / 2 + 4, y), on(a.x - w / 2 - 4, y)]));
  const over = level.flatMap(([a, b]) => spread(a.x, b.x, -w / 3).map(x => on(x, a.y)));
  return [...onLevel, ...onPlumb, ...over, ...beside];
}
