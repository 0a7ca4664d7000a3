import type uPlot from 'uplot';
import { drawLane, laneHeight } from './draw-lane';
import { place } from './gutter';
import type { ChartModel } from './model';
import type { Columns } from './trend';

const font = (px: number, weight = 400) => `${weight} ${px * devicePixelRatio}px "Atkinson Hyperlegible Next Variable", system-ui, sans-serif`;

/** Draws what uPlot does not know: cleanings, clean expectation, limit, hollow points, labels. Canvas pixels throughout. */
export function drawOver(u: uPlot, m: ChartModel): void {
  const { ctx, bbox } = u;
  const px = devicePixelRatio;
  ctx.save();
  ctx.save();
  ctx.beginPath();
  ctx.rect(bbox.left, bbox.top - (m.lane ? laneHeight * px : 0), bbox.width, bbox.height + (m.lane ? laneHeight * px : 0));
  ctx.clip();
  drawLane(u, m, font(13), px);
  if (m.zero) base(u, m, px);
  if (m.clean) dashed(u, m.clean, m.palette.soft, px);
  if (m.limit) level(u, m.limit.value, m.palette.soon, px);
  hollow(u, m, px);
  ctx.restore();
  labels(u, m, px);
  ctx.restore();
}

function dashed(u: uPlot, c: Columns, colour: string, px: number): void {
  const { ctx } = u;
  ctx.beginPath();
  let joined = false;
  c.x.forEach((x, i) => {
    const v = c.value[i] ?? null;
    if (v === null) { joined = false; return; }
    const [cx, cy] = [u.valToPos(x, 'x', true), u.valToPos(v, 'y', true)];
    if (joined) ctx.lineTo(cx, cy); else ctx.moveTo(cx, cy);
    joined = true;
  });
  ctx.setLineDash([6 * px, 4 * px]);
  ctx.lineWidth = 1.3 * px;
  ctx.strokeStyle = colour;
  ctx.stroke();
  ctx.setLineDash([]);
}

function level(u: uPlot, value: number, colour: string, px: number): void {
  const { ctx, bbox } = u;
  const y = u.valToPos(value, 'y', true);
  ctx.fillStyle = colour;
  ctx.fillRect(bbox.left, y - 0.75 * px, bbox.width, 1.5 * px);
}

/** Nothing on the surface: dashed like the clean expectation, which it is. */
function base(u: uPlot, m: ChartModel, px: number): void {
  const { ctx, bbox } = u, y = Math.round(u.valToPos(0, 'y', true));
  ctx.beginPath();
  ctx.moveTo(bbox.left, y);
  ctx.lineTo(bbox.left + bbox.width, y);
  ctx.setLineDash([6 * px, 4 * px]);
  ctx.lineWidth = 1.3 * px;
  ctx.strokeStyle = m.palette.soft;
  ctx.stroke();
  ctx.setLineDash([]);
}

/** Points that are extrapolated or not steady are hollow, thinned so that each can be seen as one. */
function hollow(u: uPlot, m: ChartModel, px: number): void {
  const { ctx } = u;
  let last = -Infinity;
  ctx.lineWidth = 1.2 * px;
  ctx.strokeStyle = m.palette.water;
  ctx.fillStyle = m.palette.card;
  m.columns.extrapolated.forEach((extrapolated, i) => {
    const is = extrapolated || m.columns.unsteady[i];
    const v = m.columns.value[i] ?? m.columns.idle[i] ?? null;
    if (!is || v === null) return;
    const x = u.valToPos(m.columns.x[i]!, 'x', true);
    if (x - last < 9 * px) return;
    last = x;
    ctx.beginPath();
    ctx.arc(x, u.valToPos(v, 'y', true), 3 * px, 0, 2 * Math.PI);
    ctx.fill();
    ctx.stroke();
  });
}

function labels(u: uPlot, m: ChartModel, px: number): void {
  const { ctx, bbox } = u;
  const wanted: { value: number; words: string; colour: string }[] = [];
  const cleanLast = m.clean && lastIn(m.clean, m.span.from / 1000, m.span.to / 1000);
  if (cleanLast) wanted.push({ value: cleanLast.value, words: m.narrow ? 'if clean' : `if clean ${Math.round(cleanLast.value)}`, colour: m.palette.soft });
  if (m.zero) wanted.push({ value: 0, words: 'clean', colour: m.palette.soft });
  if (m.latest) wanted.push({ value: m.latest.value, words: m.latest.label, colour: m.palette.ink });
  if (m.limit) wanted.push({ value: m.limit.value, words: m.limit.label, colour: m.palette.ink });
  const heights = wanted.map(w => u.valToPos(w.value, 'y', true));
  const placed = place(heights, 18 * px, bbox.top + 6 * px, bbox.top + bbox.height - 6 * px);
  const right = bbox.left + bbox.width;
  ctx.font = font(m.narrow ? 13 : 14);
  ctx.textBaseline = 'middle';
  ctx.textAlign = 'left';
  wanted.forEach((w, i) => {
    ctx.strokeStyle = m.palette.faint;
    ctx.lineWidth = px;
    ctx.beginPath();
    ctx.moveTo(right + px, heights[i]!);
    ctx.lineTo(right + 8 * px, placed[i]!);
    ctx.stroke();
    ctx.fillStyle = w.colour;
    ctx.fillText(w.words, right + 11 * px, placed[i]! + px);
  });
}

function lastIn(c: Columns, from: number, to: number): { value: number } | null {
  for (let i = c.x.length - 1; i >= 0; i--) {
    const v = c.value[i] ?? null;
    if (v !== null && c.x[i]! >= from && c.x[i]! <= to) return { value: v };
  }
  return null;
}
