/** The bore: a tube seen end-on, its deposit drawn as rings whose thickness is linear in the fouling resistance. Lengths are px. */

/** What is known of the deposit; resistances in one unit, whichever. */
export interface Deposit {
  resistance: number | null;
  uncertainty: number | null;
  /** Resistance at the limit circle: the limit, or the stated scale where none is set. */
  limit: number;
  /** What the last cleaning left; null when not known. */
  residual: number | null;
  /** Resistance at the end of each period since the last cleaning, oldest first. */
  growth: readonly number[];
}

export interface Ring { outer: number; inner: number }
export interface Segment { x1: number; y1: number; x2: number; y2: number }

export interface BoreShape {
  /** Radius of the middle of the wall's stroke, and its width. */
  wall: number;
  wallWidth: number;
  /** Radius of the bare bore. */
  bore: number;
  limit: number;
  /** Share of the limit, may be negative; null when the resistance is not known. */
  share: number | null;
  /** Radius left clear by the deposit; null when not known. */
  clear: number | null;
  residual: Ring | null;
  /** Oldest first, so outermost first. */
  strata: Ring[];
  /** Hatch over the part beyond the limit. */
  hatch: Segment[];
  /** From the far to the near end of the present resistance's uncertainty, at 3 o'clock. */
  whisker: { from: number; to: number } | null;
  /** The resistance is smaller than its uncertainty. */
  cleanWithinUncertainty: boolean;
}

const depth = 0.4, most = 2, gap = 1, leastStratum = 3, detailed = 44;

/** Lays out a bore whose wall has the outer radius `radius`. */
export function boreShape(deposit: Deposit, radius: number): BoreShape {
  const wallWidth = radius >= detailed ? 3 : 2;
  const bore = radius - wallWidth;
  const thickness = (r: number) => depth * bore * Math.min(Math.max(r / deposit.limit, 0), most);
  const { resistance: r, uncertainty: u } = deposit;
  const shape: BoreShape = {
    wall: radius - wallWidth / 2, wallWidth, bore, limit: bore * (1 - depth),
    share: r === null ? null : r / deposit.limit, clear: null, residual: null, strata: [], hatch: [], whisker: null, cleanWithinUncertainty: false,
  };
  if (r === null) return shape;
  shape.cleanWithinUncertainty = u !== null && Math.abs(r) < u;
  const bare = r <= 0 || shape.cleanWithinUncertainty;
  shape.clear = bare ? bore : bore - thickness(r);
  if (u !== null && u > 0) shape.whisker = { from: bore - thickness(r + u), to: bore - thickness(r - u) };
  if (bare) return shape;

  const residual = Math.min(Math.max(deposit.residual ?? 0, 0), r);
  if (thickness(residual) >= 1) shape.residual = { outer: bore - (thickness(residual) >= leastStratum ? gap : 0), inner: bore - thickness(residual) };
  const start = shape.residual ? residual : 0;
  const ends = radius >= detailed ? boundaries(deposit.growth, start, r) : [r];
  shape.strata = strata(ends.map(thickness), thickness(start)).map(s => ({ outer: bore - s.outer, inner: bore - s.inner }));
  if (shape.clear < shape.limit - 0.5) shape.hatch = hatch(shape.limit, shape.clear);
  return shape;
}

/** Ends of the strata, rising, the last at the present resistance. A later, lower value takes away what grew before it: a decline removes the newest. */
export function boundaries(growth: readonly number[], start: number, now: number): number[] {
  const ends = [now];
  for (let i = growth.length - 1; i >= 0; i--) ends.unshift(Math.min(growth[i]!, ends[0]!));
  return ends.filter((end, i) => end > (i === 0 ? start : Math.max(start, ends[i - 1]!)));
}

/** Depths of the strata below the wall. Those under 3 px merge with the next newer, the last with the one before; 1 px of gap is taken out of each. */
function strata(ends: number[], start: number): { outer: number; inner: number }[] {
  const edges: number[] = [];
  let from = start;
  for (const end of ends) {
    if (end - from < leastStratum) continue;
    edges.push(end);
    from = end;
  }
  const last = ends.at(-1);
  if (last === undefined) return [];
  if (edges.length === 0) edges.push(last); else edges[edges.length - 1] = Math.max(last, edges.at(-1)!);
  return edges.map((inner, i) => {
    const outer = i === 0 ? start : edges[i - 1]!;
    return { outer: inner - outer >= leastStratum ? outer + gap : outer, inner };
  });
}

/** Ticks of the residual ring: radial lines every 15°. */
export function ticks(ring: Ring): Segment[] {
  return Array.from({ length: 24 }, (_, i) => {
    const a = (i * Math.PI) / 12, c = Math.cos(a), s = Math.sin(a);
    return { x1: ring.outer * c, y1: ring.outer * s, x2: ring.inner * c, y2: ring.inner * s };
  });
}

/** Lines at 45°, 5 px apart, inside the ring between two radii about the origin. */
export function hatch(outer: number, inner: number, spacing = 5): Segment[] {
  const lines: Segment[] = [];
  const across = Math.SQRT1_2;
  const add = (d: number, from: number, to: number) => lines.push({
    x1: (d + from) * across, y1: (d - from) * across, x2: (d + to) * across, y2: (d - to) * across,
  });
  const n = Math.floor(outer / spacing);
  for (let i = -n; i <= n; i++) {
    const d = i * spacing;
    const far = Math.sqrt(Math.max(0, outer * outer - d * d));
    if (Math.abs(d) >= inner) { if (far > 0.5) add(d, -far, far); continue; }
    const near = Math.sqrt(inner * inner - d * d);
    add(d, -far, -near);
    add(d, near, far);
  }
  return lines;
}

/** Path of an arc outside the wall, clockwise from 12 o'clock: hours since the last cleaning as a share of the hours allowed. */
export function arcPath(radius: number, share: number): string {
  const s = Math.min(Math.max(share, 0), 0.9999);
  const a = 2 * Math.PI * s;
  return `M0 ${-radius}A${radius} ${radius} 0 ${s > 0.5 ? 1 : 0} 1 ${round(radius * Math.sin(a))} ${round(-radius * Math.cos(a))}`;
}

const round = (n: number) => Math.round(n * 100) / 100;
