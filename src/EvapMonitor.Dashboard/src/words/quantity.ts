import type { Quantity } from '../api/types';
import { measured } from './number';

/** How a quantity is named and shown. `from` is the unit that the interface answers in; another unit is shown as it comes. */
export interface QuantityWords { name: string; unit: string; from: string; factor: number }

export const quantityWords: Record<Quantity, QuantityWords> = {
  coefficient: { name: 'apparent coefficient', unit: 'W/(m²·K)', from: 'W/(m2.K)', factor: 1 },
  clean_coefficient: { name: 'coefficient if clean', unit: 'W/(m²·K)', from: 'W/(m2.K)', factor: 1 },
  cleanliness: { name: 'cleanliness', unit: '%', from: '1', factor: 100 },
  fouling_resistance: { name: 'fouling resistance', unit: 'm²·K/kW', from: 'm2.K/W', factor: 1000 },
  coefficient_at_reference: { name: 'coefficient at the reference conditions', unit: 'W/(m²·K)', from: 'W/(m2.K)', factor: 1 },
  driving_force: { name: 'driving force', unit: 'K', from: 'K', factor: 1 },
  head_corrected_driving_force: { name: 'driving force at half the liquor’s height', unit: 'K', from: 'K', factor: 1 },
  duty: { name: 'duty', unit: 'kW', from: 'kW', factor: 1 },
  heating_temperature: { name: 'heating temperature', unit: '°C', from: 'degC', factor: 1 },
  boiling_temperature: { name: 'boiling temperature', unit: '°C', from: 'degC', factor: 1 },
  elevation: { name: 'boiling-point elevation', unit: 'K', from: 'K', factor: 1 },
  heat_flux: { name: 'heat flux', unit: 'kW/m²', from: 'kW/m2', factor: 1 },
  solids: { name: 'solids leaving', unit: '%', from: '%', factor: 1 },
  feed_flow: { name: 'feed flow of the line', unit: 't/h', from: 'kg/s', factor: 3.6 },
};

const same = (a: string, b: string) => a.replace(/[·.*() ]/g, '').replace('²', '2').toLowerCase() === b.replace(/[·.*() ]/g, '').replace('²', '2').toLowerCase();

/** Factor and unit for a series that says its own unit: shares and resistances are converted, anything unforeseen is shown as it came. */
export function shownAs(quantity: Quantity, unit: string): { factor: number; unit: string } {
  const words = quantityWords[quantity];
  const known = same(unit, words.from) || (quantity === 'cleanliness' && unit === '') || (words.unit === '°C' && /^°?c$/i.test(unit));
  return known ? { factor: words.factor, unit: words.unit } : { factor: 1, unit };
}

/** A unit as the interface writes it, in the type of the page. */
export function prettyUnit(unit: string): string {
  return unit.replace(/m2\b/g, 'm²').replace(/m3\b/g, 'm³').replace(/\.(?=[A-Za-z])/g, '·').replace(/^degC$/, '°C');
}

/** "730 ± 17 W/(m²·K)" of a quantity in the interface's own unit. */
export function withUnit(quantity: Quantity, value: number, u: number | null): string {
  const { factor, unit } = quantityWords[quantity];
  return `${measured(value * factor, u === null ? null : u * factor)} ${unit}`;
}
