const narrowSpace = '\u202f';
const minus = '\u2212';

/** A number with a fixed count of decimals, thousands set apart by a narrow space, a true minus sign. */
export function fixed(value: number, decimals = 0): string {
  const text = Math.abs(value).toFixed(Math.max(0, decimals));
  const [whole, part] = text.split('.') as [string, string | undefined];
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, narrowSpace) : whole;
  const sign = value < 0 && Number(text) !== 0 ? minus : '';
  return sign + grouped + (part ? `.${part}` : '');
}

/** Place of the last digit worth showing for a standard uncertainty: one figure, two when it starts with 1. Returned as decimals, negative for tens. */
export function decimalsFor(uncertainty: number): number {
  if (!(uncertainty > 0) || !Number.isFinite(uncertainty)) return 0;
  const exponent = Math.floor(Math.log10(uncertainty));
  const leading = uncertainty / 10 ** exponent;
  return (leading < 1.95 ? 1 : 0) - exponent;
}

/** Rounds to `decimals`, which may be negative. */
export function rounded(value: number, decimals: number): string {
  const step = 10 ** -decimals;
  return decimals >= 0 ? fixed(value, decimals) : fixed(Math.round(value / step) * step);
}

/** "730 ± 17": value and uncertainty rounded to the uncertainty. Without one: three significant figures. */
export function measured(value: number, uncertainty: number | null): string {
  if (uncertainty === null || !(uncertainty > 0)) return significant(value, 3);
  const decimals = decimalsFor(uncertainty);
  return `${rounded(value, decimals)} ± ${rounded(uncertainty, decimals)}`;
}

/** A number to so many significant figures, never in powers of ten. */
export function significant(value: number, figures: number): string {
  // Rounding may carry into another place: 9.99 to two figures is 10, not 10.0.
  const carried = Math.abs(Number(value.toPrecision(figures)));
  return carried === 0 ? '0' : rounded(value, figures - 1 - Math.floor(Math.log10(carried)));
}

/** A raw value as it came, to six figures, without zeros behind it. */
export function raw(value: number): string {
  const text = String(Number(value.toPrecision(6)));
  return text.includes('e') ? text.replace('-', minus) : fixed(Number(text), text.split('.')[1]?.length ?? 0);
}

/** A whole count of things: "1 line", "7 lines". */
export function count(n: number, one: string, many = `${one}s`): string {
  return `${fixed(n)} ${n === 1 ? one : many}`;
}

/** "840 B", "1.8 MB". */
export function bytes(n: number): string {
  if (n < 1000) return `${n} B`;
  const units = ['kB', 'MB', 'GB', 'TB'];
  let i = -1, v = n;
  while (v >= 999.5 && i < units.length - 1) { v /= 1000; i++; }
  return `${significant(v, 2)} ${units[i]}`;
}
