import type { Balance, BalanceVariable, Fit } from '../api/types';
import { decimalsFor, fixed, rounded, significant } from './number';
import { prettyUnit } from './quantity';
import { moment } from './time';

/** What the balance says of a signal, with since when. */
export function fitWords(fit: Fit | null, zone: string, now: number): string {
  if (fit === null) return 'no balance';
  return `${fit.words}${fit.since === null ? '' : `, since ${moment(Date.parse(fit.since), zone, now)}`}`;
}

/** True when somebody should look at the instrument. */
export const misfit = (fit: Fit | null) => fit !== null && (fit.state === 'does not fit' || fit.state === 'left out');

/** The variables of a balance by place, in the order of the line; `measured`: only those with an instrument, or only the others. */
export function byPlace(of: Balance, measured: boolean): { place: string; variables: BalanceVariable[] }[] {
  const groups = new Map<string, BalanceVariable[]>();
  for (const v of of.variables) if ((v.signals.length > 0) === measured) groups.set(v.place, [...groups.get(v.place) ?? [], v]);
  return [...groups].map(([place, variables]) => ({ place, variables }));
}

/** A row in numbers: each rounded to the uncertainty of the reconciled value, so that they can be held against each other. */
export function rowNumbers(v: BalanceVariable): { measured: string; reconciled: string; correction: string } {
  const decimals = v.standard !== null && v.standard > 0 ? decimalsFor(v.standard) : null;
  const shown = (n: number | null) => (n === null ? '–' : decimals === null ? significant(n, 4) : rounded(n, decimals));
  const reconciled = v.reconciled === null ? 'cannot be told' : `${shown(v.reconciled)}${decimals === null ? '' : ` ± ${rounded(v.standard!, decimals)}`}`;
  const sign = v.correction !== null && v.correction > 0 ? '+' : '';
  const size = v.correction_in_standards === null ? '' : ` (${fixed(Math.abs(v.correction_in_standards), 1)})`;
  return { measured: shown(v.measured), reconciled, correction: v.correction === null ? '–' : `${sign}${shown(v.correction)}${size}` };
}

/** What is to be said of a row: what is against its instruments, else how its value is known. */
export const stateWords = (v: BalanceVariable) => v.suspicion ?? (v.signals.length > 0 && v.class === 'follows from others' ? (v.measured === null ? 'no reading; follows from others' : 'nothing checks it') : v.class);

export const unitWords = (unit: string) => prettyUnit(unit);
