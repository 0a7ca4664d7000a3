/** A temperature scale that holds all the values, with round ticks; null when there is none. */
export interface Scale { high: number; low: number; ticks: number[] }

export function scaleOf(values: (number | null)[]): Scale | null {
  const known = values.filter((v): v is number => v !== null && Number.isFinite(v));
  if (known.length === 0) return null;
  const most = Math.max(...known), least = Math.min(...known), span = Math.max(most - least, 1);
  const step = [0.5, 1, 2, 5, 10, 20, 50, 100].find(s => span / s <= 7) ?? 200;
  const low = least - 0.04 * span, high = most + 0.03 * span;
  const ticks: number[] = [];
  for (let i = Math.ceil(low / step); i * step <= high; i++) ticks.push(i * step);
  return { high, low, ticks };
}
