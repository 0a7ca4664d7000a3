import type { Column } from '../sheet/order';
import type { Fall, Lift } from './descent';

export type Fill = 'clean' | 'scale' | 'whole' | 'unsure' | 'unknown' | 'elevation' | 'loss' | 'lift';

/** A piece of the descent between two temperatures, in a column. */
export interface Bar { column: number; fill: Fill; from: number; to: number }

/** A level line from one column to another at a temperature; `end` when it leads to the outside. */
export interface Level { from: number; to: number; at: number; dotted: boolean }

/** Less line loss than this is not drawn, K: it is rounding. */
const leastLoss = 0.02;

/** The pieces of every column, from the top down. Parts that the numbers do not give are not drawn. */
export function barsOf(columns: Column[], falls: Map<string, Fall>, lifts: Map<string, Lift>, ways: { from: string; to: string; kind: string }[]): Bar[] {
  const all = [...falls.values()].flatMap(f => [f.heating, f.boiling, f.condensing]).filter(t => t !== null), hottest = Math.max(...all), coldest = Math.min(...all);
  // A chest without a temperature is no hotter than the vapour that heats it, and a boiling liquor no colder than the chests that it heats.
  const heatedBy = (id: string) => Math.max(...ways.filter(w => w.kind === 'vapour' && w.to === id).map(w => falls.get(w.from)?.condensing ?? -Infinity));
  const heats = (id: string) => Math.max(...ways.filter(w => w.kind === 'vapour' && w.from === id).map(w => falls.get(w.to)?.heating ?? -Infinity));
  const or = (t: number, other: number) => (Number.isFinite(t) ? t : other);
  return columns.flatMap((c, column): Bar[] => {
    const lift = lifts.get(c.id), f = falls.get(c.id);
    if (lift) return lift.from === null || lift.to === null ? [{ column, fill: 'unknown', from: hottest, to: coldest }] : [{ column, fill: 'lift', from: Math.max(lift.from, lift.to), to: Math.min(lift.from, lift.to) }];
    if (!f) return [];
    if (f.heating === null || f.boiling === null) return [{ column, fill: 'unknown', from: f.heating ?? or(heatedBy(c.id), hottest), to: f.boiling ?? or(heats(c.id), coldest) }];
    const bars: Bar[] = [];
    if (f.boiling < f.heating) {
      if (f.clean === null) bars.push({ column, fill: f.reason === null ? 'whole' : 'unsure', from: f.heating, to: f.boiling });
      else {
        // Better than clean, or not to be told from it: nothing is drawn as scale, and the table says why.
        const told = f.scale !== null && f.scale > (f.scaleU ?? 0), wall = told ? f.heating - f.clean : f.boiling;
        bars.push({ column, fill: 'clean', from: f.heating, to: wall });
        if (wall > f.boiling) bars.push({ column, fill: 'scale', from: wall, to: f.boiling });
      }
    }
    if (f.condensing !== null && f.condensing < f.boiling) bars.push({ column, fill: 'elevation', from: f.boiling, to: f.condensing });
    if (f.condensing !== null && f.loss !== null && f.loss > leastLoss) bars.push({ column, fill: 'loss', from: f.condensing, to: f.condensing - f.loss });
    return bars;
  });
}

/** The levels that join the columns: steam to its chests, vapour to the next, the last to the condenser, suction back to its machine. */
export function levelsOf(columns: Column[], ways: { from: string; to: string; kind: string }[], falls: Map<string, Fall>, lifts: Map<string, Lift>): Level[] {
  const at = new Map(columns.map((c, i) => [c.id, i])), last = columns.length - 1;
  return ways.flatMap((w): Level[] => {
    const from = falls.get(w.from), to = falls.get(w.to), join = (a: number, b: number, value: number | null | undefined, dotted = false): Level[] => (value === null || value === undefined ? [] : [{ from: a, to: b, at: value, dotted }]);
    if (w.from === 'steam' && to) return join(0, at.get(w.to)!, to.heating);
    if (w.kind !== 'vapour') return [];
    if (w.to === 'condenser' && from) return join(at.get(w.from)!, last, from.condensing);
    if (lifts.has(w.to) && from) return join(at.get(w.to)!, at.get(w.from)!, from.condensing, true);
    if (lifts.has(w.from) && to) return join(at.get(w.from)!, at.get(w.to)!, to.heating);
    return from && to ? join(at.get(w.from)!, at.get(w.to)!, to.heating) : [];
  });
}
