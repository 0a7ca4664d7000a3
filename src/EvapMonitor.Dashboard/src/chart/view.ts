import { quantities, type Quantity } from '../api/types';

/** Quantities that stand on an effect's page anyway, one under the other. */
export const standing: readonly Quantity[] = ['coefficient', 'fouling_resistance', 'solids', 'boiling_temperature', 'heat_flux', 'driving_force'];

/** What the address bar holds of an effect's page. `to` null: until now, and on as time goes. Instants in ms. `quantity`: one more than those that stand there anyway. */
export interface View { from: number | null; to: number | null; quantity: Quantity | null }

/** A span of time shown, ms. */
export interface Span { from: number; to: number }

const hour = 3_600_000, day = 24 * hour;
export const defaultSpan = 35 * day;
const least = hour, most = 20 * 366 * day;
/** What is shown until now ends at a whole five minutes, so that it is asked for anew no oftener. */
const step = 5 * 60_000;

/** Reads an address; whatever is wrong in it counts as absent. */
export function readView(search: string): View {
  const q = new URLSearchParams(search);
  const instant = (name: string) => { const t = Date.parse(q.get(name) ?? ''); return Number.isFinite(t) ? t : null; };
  const [from, to] = [instant('from'), instant('to')];
  const quantity = quantities.find(k => k === q.get('quantity') && !standing.includes(k)) ?? null;
  return from !== null && to !== null && to <= from ? { from: null, to: null, quantity } : { from, to, quantity };
}

/** Writes an address. */
export function writeView(view: View): string {
  const q = new URLSearchParams();
  const text = (t: number) => new Date(Math.round(t / 1000) * 1000).toISOString().replace('.000', '');
  if (view.from !== null) q.set('from', text(view.from));
  if (view.to !== null) q.set('to', text(view.to));
  if (view.quantity !== null) q.set('quantity', view.quantity);
  const written = q.toString().replaceAll('%3A', ':');
  return written && `?${written}`;
}

/** The span that a view shows at an instant. */
export function spanOf(view: View, now: number): Span {
  const end = Math.ceil(now / step) * step;
  const to = view.to ?? Math.max(end, (view.from ?? 0) + least);
  return { from: view.from ?? to - defaultSpan, to };
}

/** Zooms about an instant; `factor` under 1 shows less. Bounded to between an hour and twenty years. */
export function zoomed(span: Span, factor: number, about: number): Span {
  const length = Math.min(most, Math.max(least, (span.to - span.from) * factor));
  const share = (about - span.from) / (span.to - span.from);
  const from = about - share * length;
  return { from, to: from + length };
}

/** Moves by a share of the length; positive is later. */
export function moved(span: Span, share: number): Span {
  const by = (span.to - span.from) * share;
  return { from: span.from + by, to: span.to + by };
}

/** The view that shows a span; one that reaches the present keeps following it. */
export function viewOf(span: Span, quantity: Quantity | null, now: number): View {
  return { from: span.from, to: span.to >= now ? null : span.to, quantity };
}
