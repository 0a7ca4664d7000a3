import type uPlot from 'uplot';
import { fixed } from '../words/number';
import { bodyOf, splits, stepDecimals, valueAxis } from './axis';
import { drawOver } from './draw';
import { laneHeight } from './draw-lane';
import type { ChartModel } from './model';
import { timeTicks } from './ticks';
import { extent } from './trend';

/** What the chart tells the page. */
export interface ChartEvents {
  cursor(index: number | null): void;
  selected(from: number, to: number): void;
  drawn(axisStart: string, outside: number): void;
}

const axisFont = '13px "Atkinson Hyperlegible Next Variable", system-ui, sans-serif';
export const gutter = (narrow: boolean) => (narrow ? 84 : 140);

/** uPlot's options for a model; the model may change afterwards, what is drawn follows it. */
export function chartOptions(m: ChartModel, width: number, height: number, events: ChartEvents): uPlot.Options {
  const ticksNow = (u: uPlot) => timeTicks(m.span.from, m.span.to, m.zone, Math.max(3, Math.floor((u.width - 60 - gutter(m.narrow)) / 66)));
  return {
    width, height,
    padding: [m.lane ? laneHeight : 10, gutter(m.narrow), 0, 0],
    legend: { show: false },
    cursor: {
      y: false,
      drag: { x: true, y: false, setScale: false, dist: 6 },
      // Only the value's own series shows where the cursor stands, not the edges of the band.
      points: { size: (_, i) => (i < 3 ? 0 : 8), width: (_, i) => (i < 3 ? 0 : 1.5), stroke: () => m.palette.ink, fill: () => m.palette.card },
    },
    scales: {
      x: { time: false, range: () => [m.span.from / 1000, m.span.to / 1000] },
      y: { range: () => { layAxis(m); return [m.axis.from, m.axis.to]; } },
    },
    axes: [
      {
        font: axisFont, size: m.times ? 44 : 8, gap: 6, stroke: () => m.palette.soft, grid: { show: false },
        ticks: { stroke: () => m.palette.faint, width: 1, size: 5 },
        splits: u => ticksNow(u).map(t => t.at / 1000),
        values: u => ticksNow(u).map(t => (m.times ? t.label : '')),
      },
      {
        font: axisFont, size: (_, values) => Math.max(60, 18 + 7.5 * Math.max(0, ...(values ?? []).map(v => v.length))), gap: 6, stroke: () => m.palette.soft,
        grid: { stroke: () => m.palette.hair, width: 1 }, ticks: { show: false },
        splits: () => splits(m.axis),
        values: () => splits(m.axis).map(v => fixed(v, stepDecimals(m.axis.step))),
      },
    ],
    series: [
      {},
      // The band comes first, so that the line lies on it.
      { stroke: () => m.palette.water, width: 0.7, points: { show: false }, gaps },
      { stroke: () => m.palette.water, width: 0.7, points: { show: false }, gaps },
      { stroke: () => m.palette.water, width: 2, points: { show: false }, gaps },
      dots(() => m.palette.water, 4),
      dots(() => m.palette.faint, 3),
    ],
    bands: [{ series: [1, 2], fill: () => m.palette.wash }],
    hooks: {
      draw: [u => { drawOver(u, m); events.drawn(m.axis.from === 0 ? '' : fixed(m.axis.from, stepDecimals(m.axis.step)), m.outside); }],
      setCursor: [u => events.cursor(u.cursor.idx ?? null)],
      setSelect: [u => {
        if (u.select.width < 6) return;
        const from = u.posToVal(u.select.left, 'x') * 1000, to = u.posToVal(u.select.left + u.select.width, 'x') * 1000;
        u.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false);
        events.selected(from, to);
      }],
    },
  };
}

/** Gaps are cut out of a line that is drawn across them; a pixel more on both sides, else a steep one leaves its edges standing. */
const gaps: uPlot.Series.GapsRefiner = (_, __, ___, ____, found) => found.map(([from, to]) => [from - devicePixelRatio, to + devicePixelRatio]);

function dots(colour: () => string, size: number): uPlot.Series {
  return { paths: () => null, points: { show: true, size, width: 0, stroke: colour, fill: colour } };
}

/** Columns in the order of the series. */
export function chartData(m: ChartModel): uPlot.AlignedData {
  const c = m.columns;
  return [c.x, c.upper, c.lower, c.value, c.alone, c.idle];
}

/** Lays the value axis over everything drawn in the span. */
function layAxis(m: ChartModel): void {
  const [from, to] = [m.span.from / 1000, m.span.to / 1000];
  const seen: number[] = [];
  const c = m.columns;
  c.x.forEach((x, i) => {
    if (x < from || x > to) return;
    for (const v of [c.lower[i], c.upper[i], c.value[i], c.idle[i]]) if (v !== null && v !== undefined) seen.push(v);
  });
  const body = bodyOf(seen);
  m.outside = body === null ? 0 : seen.filter(v => v < body.lowest || v > body.highest).length;
  const marks = [...(body ? [body.lowest, body.highest] : []), ...(m.limit ? [m.limit.value] : []), ...(m.zero && body ? [0] : [])];
  const clean = m.clean && extent(m.clean, from, to);
  if (clean) marks.push(clean.lowest, clean.highest);
  if (marks.length === 0) { m.axis = { from: 0, to: 1, step: 0.5 }; return; }
  const [lowest, highest] = [Math.min(...marks), Math.max(...marks)];
  // A limit at the very edge would be taken for the axis itself.
  const room = m.limit ? 0.04 * (highest - lowest) : 0;
  m.axis = valueAxis(m.limit?.value === lowest ? lowest - room : lowest, m.limit?.value === highest ? highest + room : highest, m.most);
}
