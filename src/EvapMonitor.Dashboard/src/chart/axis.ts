/** The value axis: a range on round numbers and the round numbers in it. */
export interface Axis { from: number; to: number; step: number }

/** A round step, 1, 2 or 5 times a power of ten, that divides a length into at most so many. */
export function roundStep(length: number, most: number): number {
  const raw = length / most;
  const power = 10 ** Math.floor(Math.log10(raw));
  const factor = [1, 2, 5, 10].find(f => f * power >= raw * 0.999999) ?? 10;
  return factor * power;
}

/** Lays an axis over values. It starts at zero where that costs little of the picture; where it does not, the page says so. */
export function valueAxis(lowest: number, highest: number, most = 5): Axis {
  if (!(highest > lowest)) {
    const margin = Math.abs(highest) * 0.05 || 1;
    [lowest, highest] = [lowest - margin, highest + margin];
  }
  if (lowest > 0 && lowest < 0.35 * highest) lowest = 0;
  const step = roundStep(highest - lowest, most);
  const from = Math.floor(lowest / step + 1e-9) * step, to = Math.ceil(highest / step - 1e-9) * step;
  return { from: lowest >= 0 ? Math.max(0, from) : from, to, step };
}

/** The range that an axis should hold: all values, but for the few that lie further from the middle 98 % than twice its width; those would flatten the rest. Null for none. */
export function bodyOf(values: readonly number[]): { lowest: number; highest: number } | null {
  if (values.length === 0) return null;
  const sorted = Float64Array.from(values).sort();
  const at = (share: number) => sorted[Math.round(share * (sorted.length - 1))]!;
  const low = at(0.01), high = at(0.99), reach = 2 * (high - low);
  if (reach === 0) return { lowest: sorted[0]!, highest: sorted.at(-1)! };
  const inside = sorted.filter(v => v >= low - reach && v <= high + reach);
  return { lowest: inside[0]!, highest: inside.at(-1)! };
}

/** The round numbers of an axis. */
export function splits({ from, to, step }: Axis): number[] {
  return Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step);
}

/** Decimals that tell the steps of an axis apart. */
export const stepDecimals = (step: number) => Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
