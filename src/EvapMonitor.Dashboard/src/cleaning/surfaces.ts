import type { Cleaning } from '../api/types';

/** How many cleanings of a surface are looked back on. */
const last = 10;

/** What the latest cleanings of a surface brought, oldest first. Resistances in m²·K/W. */
export interface SurfaceRecord {
  line: string;
  effect: string;
  surface: string;
  cleanings: Cleaning[];
  /** Median share removed, of those whose share is known. */
  median: number | null;
  /** Least resistance left by any of them, and by the last that is known. */
  best: number | null;
  left: { value: number; u: number | null } | null;
}

/** Surfaces with the results of their latest cleanings, in the order of line and surface. */
export function surfaceRecords(all: readonly Cleaning[]): SurfaceRecord[] {
  const groups = new Map<string, Cleaning[]>();
  for (const c of all) {
    if (c.known_by === 'rejected' || c.end === null || c.result === null) continue;
    const key = `${c.line}\n${c.result.surface}`;
    groups.set(key, [...groups.get(key) ?? [], c]);
  }
  return [...groups.values()].map(group => {
    const cleanings = group.sort((a, b) => Date.parse(a.start) - Date.parse(b.start)).slice(-last), newest = cleanings.at(-1)!;
    const shares = cleanings.map(c => c.result!.removed_share).filter((s): s is number => s !== null);
    const lefts = cleanings.map(c => c.result!.left_m2k_w).filter((l): l is { value: number; u: number | null } => l.value !== null);
    return {
      line: newest.line, effect: newest.effect, surface: newest.result!.surface, cleanings,
      median: median(shares), best: lefts.length === 0 ? null : Math.min(...lefts.map(l => l.value)), left: lefts.at(-1) ?? null,
    };
  }).sort((a, b) => a.line.localeCompare(b.line) || a.surface.localeCompare(b.surface));
}

/** The middle value; null for none. */
export function median(values: readonly number[]): number | null {
  const sorted = [...values].sort((a, b) => a - b), middle = sorted.length >> 1;
  if (sorted.length === 0) return null;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** A cleaning as two strokes: resistance before, and after. Heights in px; null: not known. */
export interface Strokes { x: number; before: number | null; after: number | null; failed: boolean }

/** Lays pairs of strokes side by side on one resistance scale; the highest reaches the top. `best`: height of the least resistance left. */
export function strokes(record: SurfaceRecord, height: number, apart: number): { pairs: Strokes[]; best: number | null; width: number } {
  const ends = record.cleanings.map(({ result }) => {
    const before = result!.before_m2k_w.value, removed = result!.removed_m2k_w.value;
    return { before, after: before === null || removed === null ? null : before - removed, failed: result!.verdict === 'did not clean' };
  });
  const most = Math.max(...ends.flatMap(e => [e.before ?? 0, e.after ?? 0]), 0);
  const tall = (r: number) => (most === 0 ? 0 : Math.max(0, (r / most) * height));
  return {
    pairs: ends.map((e, i) => ({ x: (i + 0.5) * apart, before: e.before === null ? null : tall(e.before), after: e.after === null ? null : tall(e.after), failed: e.failed })),
    best: record.best === null || most === 0 ? null : tall(record.best), width: Math.max(1, ends.length) * apart,
  };
}
