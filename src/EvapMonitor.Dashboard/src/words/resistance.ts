import type { Uncertain } from '../api/types';
import { measured } from './number';

/** The unit in which fouling resistances are shown: in m²·K/W they would be all zeros. */
export const resistanceUnit = 'm²·K/kW';

/** "0.395 ± 0.006" of a resistance in m²·K/W, without its unit; null when it is not known. */
export function resistance({ value, u }: Uncertain): string | null {
  return value === null ? null : measured(value * 1000, u === null ? null : u * 1000);
}

/** Whether a number with its uncertainty can be told from nothing: more than its standard uncertainty above it. */
export const told = ({ value, u }: Uncertain): boolean => value !== null && value > (u ?? 0);

/** A share as a whole percentage; over 100 % stays so: the surface came out better than the level that was learnt. */
export const percent = (share: number): string => `${Math.round(share * 100)} %`.replace('-', '\u2212');
