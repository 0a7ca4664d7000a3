import type uPlot from 'uplot';
import { laneLabels, marksIn, type LaneMark } from './lane';
import type { ChartModel } from './model';

/** Height of the lane above the plot, of its bars, and of the gap under them; px of the page. */
export const laneHeight = 34;
const bar = 8, lift = 4, least = 8;

/** Draws cleanings and stops: a bar in the lane whose form says how it is known, a line down the plot where a cleaning began and ended. */
export function drawLane(u: uPlot, m: ChartModel, font: string, px: number): void {
  const { ctx, bbox } = u;
  const places = marksIn(m.marks, m.span.from, m.span.to).map(mark => {
    const x0 = Math.round(u.valToPos(mark.start / 1000, 'x', true)), x1 = Math.round(u.valToPos((mark.end ?? m.span.to) / 1000, 'x', true));
    return { mark, x0, x1, width: Math.max(least * px, x1 - x0) };
  });
  for (const p of places) if (p.mark.form !== 'stop') edges(u, m, p.mark, p.x0, p.x1, px);
  if (!m.lane) return;
  const top = bbox.top - (bar + lift) * px;
  for (const p of places) {
    const x = p.x1 - p.x0 >= p.width ? p.x0 : p.x1 - p.width;
    block(ctx, m, p.mark, x, top, p.width, px);
  }
  ctx.font = font;
  ctx.textBaseline = 'middle';
  ctx.textAlign = 'left';
  const wide = (words: string) => (words === '' ? 0 : ctx.measureText(words).width);
  const labels = laneLabels(places.map(p => ({ at: p.x0, long: p.mark.form === 'stop' ? 0 : wide(p.mark.long), short: wide(p.mark.short), weight: p.mark.failed ? 1 : 0 })),
    bbox.left, bbox.left + bbox.width, 10 * px);
  for (const { index, at, words } of labels) {
    const { mark } = places[index]!;
    ctx.fillStyle = mark.failed ? m.palette.ink : m.palette.soft;
    ctx.fillText(mark[words], at, bbox.top - 22 * px);
  }
}

/** Thin lines down the plot; those of what nobody logged are broken. */
function edges(u: uPlot, m: ChartModel, mark: LaneMark, x0: number, x1: number, px: number): void {
  const { ctx, bbox } = u;
  ctx.beginPath();
  for (const x of x1 - x0 > 3 * px ? [x0, x1] : [x1]) { ctx.moveTo(x, bbox.top); ctx.lineTo(x, bbox.top + bbox.height); }
  ctx.lineWidth = px;
  ctx.strokeStyle = m.palette.faint;
  ctx.setLineDash(mark.form === 'recognised' ? [3 * px, 3 * px] : []);
  ctx.stroke();
  ctx.setLineDash([]);
}

/** The bar: filled when logged, two rails when a signal told it, an outline when recognised, a thin line for a stop; struck through when it did not clean. */
function block(ctx: CanvasRenderingContext2D, m: ChartModel, mark: LaneMark, x: number, y: number, width: number, px: number): void {
  const height = bar * px;
  ctx.fillStyle = ctx.strokeStyle = m.palette.soft;
  switch (mark.form) {
    case 'logged': ctx.fillRect(x, y, width, height); break;
    case 'signal': ctx.fillRect(x, y, width, 2.5 * px); ctx.fillRect(x, y + height - 2.5 * px, width, 2.5 * px); break;
    case 'recognised': ctx.lineWidth = 1.5 * px; ctx.strokeRect(x + 0.75 * px, y + 0.75 * px, width - 1.5 * px, height - 1.5 * px); break;
    case 'stop': ctx.fillStyle = m.palette.faint; ctx.fillRect(x, y + height - 1.5 * px, width, 1.5 * px); break;
  }
  if (!mark.failed) return;
  // A halo keeps the stroke apart from a filled bar.
  for (const [colour, thick] of [[m.palette.card, 5], [m.palette.ink, 2]] as const) {
    ctx.strokeStyle = colour;
    ctx.lineWidth = thick * px;
    ctx.beginPath();
    ctx.moveTo(x - 2 * px, y + height + 2 * px);
    ctx.lineTo(x + width + 2 * px, y - 2 * px);
    ctx.stroke();
  }
}
