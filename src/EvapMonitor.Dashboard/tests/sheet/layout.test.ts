import { describe, expect, test } from 'vitest';
import { between, flowOf, labelsOf, labelText, overlap, stretches } from '../../src/sheet/labels';
import { layout, type Point, type Rect, type Sheet } from '../../src/sheet/layout';
import { acrossThePage, downThePage, type Metrics } from '../../src/sheet/metrics';
import { columnsOf } from '../../src/sheet/order';
import { sheet, sheets } from './plants';

const pages: [string, (columns: number) => Metrics][] = [['a desk', n => acrossThePage(n, 1232)], ['a narrow window', n => acrossThePage(n, 660)], ['a phone', () => downThePage()]];
const cases = sheets.flatMap(([name, graph]) => pages.map(([page, metrics]) => ({ name, page, drawn: layout(graph, metrics(columnsOf(graph).length)), graph })));

const shrunk = (r: Rect, by: number): Rect => ({ x: r.x + by, y: r.y + by, w: r.w - 2 * by, h: r.h - 2 * by });
const ends = (s: Sheet, id: string) => s.nodes.find(n => n.place.id === id)!.rect;
const touches = (p: Point, r: Rect) => p.x >= r.x - 0.01 && p.x <= r.x + r.w + 0.01 && p.y >= r.y - 0.01 && p.y <= r.y + r.h + 0.01;

describe.each(cases)('$name on $page', ({ drawn, graph }) => {
  test('draws every place and every way', () => {
    expect(drawn.nodes.map(n => n.place.id).sort()).toEqual(graph.places.map(p => p.id).sort());
    expect(drawn.routes.length).toBe(graph.ways.length);
  });

  test('boxes stand apart, within the drawing', () => {
    drawn.nodes.forEach((a, i) => {
      expect(a.rect.x >= 0 && a.rect.y >= 0 && a.rect.x + a.rect.w <= drawn.width && a.rect.y + a.rect.h <= drawn.height, `${a.place.id} in the drawing`).toBe(true);
      for (const b of drawn.nodes.slice(i + 1)) expect(overlap(a.rect, b.rect), `${a.place.id} on ${b.place.id}`).toBe(false);
    });
  });

  test('ways run level or plumb from box to box and through none', () => {
    for (const r of drawn.routes) {
      for (const [a, b] of stretches(r.points)) expect(a.x === b.x || a.y === b.y, `${r.way.from} to ${r.way.to}`).toBe(true);
      expect(touches(r.points[0]!, ends(drawn, r.way.from)), `${r.way.from} to ${r.way.to} begins at its box`).toBe(true);
      expect(touches(r.points.at(-1)!, ends(drawn, r.way.to)), `${r.way.from} to ${r.way.to} ends at its box`).toBe(true);
      for (const n of drawn.nodes) for (const [a, b] of stretches(r.points)) expect(overlap(between(a, b), shrunk(n.rect, 0.5)), `${r.way.from} to ${r.way.to} through ${n.place.id}`).toBe(false);
    }
  });

  test('no two ways share a stretch', () => {
    const all = drawn.routes.flatMap((r, i) => stretches(r.points).map(([a, b]) => ({ i, a, b, name: `${r.way.from} to ${r.way.to}` })));
    for (const p of all) for (const q of all) {
      if (p.i >= q.i) continue;
      const level = p.a.y === p.b.y && q.a.y === q.b.y, plumb = p.a.x === p.b.x && q.a.x === q.b.x;
      if (!level && !plumb) continue;
      const near = level ? Math.abs(p.a.y - q.a.y) < 5 : Math.abs(p.a.x - q.a.x) < 5;
      const r = between(p.a, p.b), s = between(q.a, q.b);
      const along = level ? r.x < s.x + s.w && s.x < r.x + r.w : r.y < s.y + s.h && s.y < r.y + r.h;
      expect(near && along, `${p.name} on ${q.name}`).toBe(false);
    }
  });

  test('labels cover nothing', () => {
    const labels = labelsOf(drawn);
    labels.forEach((l, i) => {
      for (const n of drawn.nodes) expect(overlap(l.rect, n.rect), `${l.text} on ${n.place.id}`).toBe(false);
      for (const other of labels.slice(i + 1)) expect(overlap(l.rect, other.rect), `${l.text} on ${other.text}`).toBe(false);
      for (const r of drawn.routes) if (r.way !== l.way) for (const [a, b] of stretches(r.points)) expect(overlap(l.rect, between(a, b)), `${l.text} on ${r.way.from} to ${r.way.to}`).toBe(false);
    });
  });

  test('every measured flow stands on its way or in the box at its end, but for a phone, where it stands in the table', () => {
    const placed = labelsOf(drawn).filter(l => l.measured && l.way.flow !== null).length, inBoxes = drawn.nodes.filter(n => flowOf(drawn, n.place)).length;
    if (!drawn.metrics.turned) expect(placed + inBoxes).toBe(drawn.routes.filter(r => labelText(r.way).measured).length);
    else expect(placed).toBe(0);
  });
});

test('a phone of 320 px needs little shrinking for any of the examples', () => {
  for (const { name, page, drawn } of cases) if (page === 'a phone' && name !== 'nine-effects') expect(drawn.width, name).toBeLessThanOrEqual(320);
});

test.each([
  ['forward-four-effects', 'source W1 W2 W3 W4 sink'],
  ['backward-three-effects', 'source E1 E2 E3 sink'],
  ['thermal-recompression', 'source J1 F1 F2 F3 FINISHER sink'],
  ['mechanical-recompression', 'source FAN E1 sink'],
  ['nine-effects', 'source CONCENTRATOR-A CONCENTRATOR-B E3 E4 FAN E5 E6 E7 E8 E9 sink'],
])('columns of %s follow the steam', (name, columns) => {
  expect(columnsOf(sheet(name)).map(c => c.name || c.id).join(' ')).toBe(columns);
});

test('the feed stands where the liquor begins', () => {
  const side = (name: string) => { const s = layout(sheet(name), acrossThePage(6, 1200)); return ends(s, 'feed').x < ends(s, 'product').x ? 'left' : 'right'; };
  expect(['forward-four-effects', 'backward-three-effects', 'mixed-seven-effects', 'own-liquor', 'one-effect'].map(side)).toEqual(['left', 'right', 'right', 'left', 'left']);
});

test('a stated share stands on its way', () => {
  const graph = sheet('own-liquor'), s = layout({ ...graph, ways: graph.ways.map(w => ({ ...w, balance: null })) }, acrossThePage(4, 1200));
  expect(labelsOf(s).map(l => l.text)).toContain('L 60 %');
});
