import type { ComponentChildren } from 'preact';
import { fixed, measured } from '../words/number';
import type { Fall, Lift } from './descent';

/** A row of the table: its name and what stands in the column of an effect or a recompressor. */
export interface NumberRow { name: string; part?: boolean; of: (f: Fall) => ComponentChildren; machine?: (l: Lift) => ComponentChildren }

const none = <span class="quiet">not known</span>;
const one = (v: number | null) => (v === null ? none : fixed(v, 1));

/** The way down in numbers, in the order in which it is read, then what explains it. */
export const descentRows: NumberRow[] = [
  { name: 'heated at, °C', of: f => one(f.heating), machine: l => one(l.to) },
  { name: 'driving force, K', of: f => (f.drive === null ? none : <b>{measured(f.drive, f.driveU)}</b>) },
  { name: 'a clean wall needs', part: true, of: f => one(f.clean) },
  { name: 'scale takes', part: true, of: f => (f.scale === null ? none : f.scaleU === null ? fixed(f.scale, 1) : measured(f.scale, f.scaleU)) },
  { name: 'boils at, °C', of: f => one(f.boiling) },
  { name: 'elevation, K', of: f => one(f.elevation) },
  { name: 'condenses at, °C', of: f => one(f.condensing), machine: l => one(l.from) },
  { name: 'line loss, K', of: f => (f.loss === null ? <span class="quiet">–</span> : f.lossStated ? <span class="quiet">({fixed(f.loss, 1)})</span> : fixed(f.loss, 1)) },
  { name: 'lift, K', of: () => '', machine: l => (l.lift === null ? none : <b>{fixed(l.lift, 1)}</b>) },
];

/** Which bodies an effect has now, where it may have several. */
export const bodiesRow: NumberRow = { name: 'bodies in service', of: f => bodiesNow(f.bodies) };

function bodiesNow(bodies: Fall['bodies']): string {
  return [...bodies.filter(b => b.serving === true).map(b => b.name), ...bodies.filter(b => b.serving === null).map(b => `${b.name}?`)].join(', ');
}

/** The rows that a line of these effects and machines has. */
export function rowsFor(falls: Map<string, Fall>, lifts: Map<string, Lift>): NumberRow[] {
  return [...descentRows.filter(r => r.name !== 'lift, K' || lifts.size > 0), ...wallRows, ...([...falls.values()].some(f => f.bodies.length > 0) ? [bodiesRow] : [])];
}

/** What lies behind the kelvins. */
export const wallRows: NumberRow[] = [
  { name: 'duty, MW', of: f => (f.effect.now?.duty_kw == null ? none : measured(f.effect.now.duty_kw / 1000, f.effect.now.duty_u === null ? null : f.effect.now.duty_u / 1000)) },
  { name: 'coefficient, W/(m²·K)', of: f => (f.effect.now?.coefficient_w_m2k == null ? none : <b>{measured(f.effect.now.coefficient_w_m2k, f.effect.now.coefficient_u)}</b>) },
  { name: 'the same if clean', of: f => (f.effect.clean_coefficient_w_m2k === null ? none : Math.round(f.effect.clean_coefficient_w_m2k)) },
  { name: 'fouling, m²·K/MW', of: f => (f.effect.now?.fouling_resistance_m2k_w == null ? none : measured(f.effect.now.fouling_resistance_m2k_w * 1e6, f.effect.now.fouling_resistance_u === null ? null : f.effect.now.fouling_resistance_u * 1e6)) },
];
