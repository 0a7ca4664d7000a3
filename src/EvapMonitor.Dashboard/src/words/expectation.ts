import type { CleanReference, Uncertain } from '../api/types';
import { fixed, measured, significant } from './number';
import { date } from './time';

/** Dates of the service in the type of the page. */
export const withDates = (text: string, zone: string, now: number) =>
  text.replace(/\b(\d{4}-\d\d-\d\d)\b(?!T)/g, day => date(Date.parse(`${day}T12:00:00Z`), zone, now));

/** The head of what a clean coefficient rests on: "level of 2 of the last 5 cleanings …, the last on Fri 13 Nov". */
export const restsOn = (source: string, zone: string, now: number) => withDates(source.split(';')[0]!.trim(), zone, now);

/** One condition that the clean coefficient may move with. `told`: its name in the service's own words. */
interface Condition { name: string; told: string; by: Uncertain; reference: string; effect(exponent: number): number; step: string }

const conditions = (r: CleanReference): Condition[] => [
  { name: 'solids leaving', told: 'solids', by: r.by_solids, reference: r.reference_solids === null ? '' : `${significant(r.reference_solids * 100, 3)} %`, effect: b => 1.1 ** b - 1, step: 'a tenth more solids' },
  { name: 'boiling temperature', told: 'boiling temperature', by: r.by_boiling_temperature, reference: r.reference_boiling_temperature_c === null ? '' : `${fixed(r.reference_boiling_temperature_c, 1)} °C`, effect: b => Math.exp(10 * b) - 1, step: '10 K more' },
  { name: 'heat flux', told: 'flux', by: r.by_heat_flux, reference: r.reference_heat_flux_kw_m2 === null ? '' : `${significant(r.reference_heat_flux_kw_m2, 3)} kW/m²`, effect: b => 1.1 ** b - 1, step: 'a tenth more flux' },
];

/** What the service remarks on an exponent, as that its condition hardly moved; null without a remark. */
const remark = (source: string, told: string) => new RegExp(`${told} [^,(]*\\(([^)]+)\\)`).exec(source)?.[1] ?? null;

/** Each condition as a row: its exponent with uncertainty, what that means, the value of the reference. */
export function exponentRows(r: CleanReference): { name: string; exponent: string; meaning: string; reference: string }[] {
  return conditions(r).map(c => {
    const { value, u } = c.by;
    if (value === null) return { name: c.name, exponent: 'not known', meaning: 'not followed', reference: c.reference };
    const said = remark(r.source, c.told);
    const change = c.effect(value) * 100, moves = Math.abs(change) >= 0.05;
    return {
      name: c.name, exponent: measured(value, u), reference: c.reference,
      meaning: moves ? `${c.step}: ${significant(Math.abs(change), 2)} % ${change > 0 ? 'higher' : 'lower'}${said === null ? '' : ` (${said})`}` : said === 'hardly moved' ? 'not learnt: it hardly moved' : said === null ? 'does not move it' : `taken as none: ${said}`,
    };
  });
}
