import type { Effect, ReadingsState } from '../api/types';
import { limitName, unknownReason } from './due';
import { duration } from './duration';
import type { Piece } from './line';
import { rounded } from './number';
import { prettyUnit } from './quantity';
import { moment } from './time';

/** The state of an effect in at most two sentences, one clause bold. */
export function effectWords(effect: Effect, readings: ReadingsState, latest: number | null, now: number, zone: string): Piece[] {
  const stale: Piece[] = readings === 'live' || latest === null ? []
    : [{ text: `No reading of this line has come for ${duration(now - latest)}`, bold: true }, { text: `, since ${moment(latest, zone, now)}. `, bold: false }];
  const say = (bold: string, plain: string): Piece[] => (stale.length > 0
    ? [...stale, { text: bold + plain, bold: false }] : [{ text: bold, bold: true }, { text: plain, bold: false }]);
  if (effect.cleaning_since !== null) {
    return say(`${effect.name} is being cleaned`, `, since ${moment(Date.parse(effect.cleaning_since), zone, now)}.`);
  }
  const sentence = effect.due.sentence;
  switch (effect.due.state) {
    case 'due': {
      const colon = sentence?.indexOf(':') ?? -1;
      if (sentence === null) return say(`${effect.name} is due for a cleaning`, `: ${limitName(effect.due.limit)}.`);
      return colon < 0 ? say(sentence, '') : say(sentence.slice(0, colon), sentence.slice(colon));
    }
    case 'unknown': return say(`${effect.name} cannot be judged`, `: ${unknownReason(effect)}.`);
    case 'no limit': return say('No limit is set', ` for ${effect.name}, so it cannot be due.`);
    // On readings that are not live nothing calm is said.
    case 'not due': return stale.length > 0 ? stale : [{ text: sentence ?? `${effect.name} is not due for a cleaning.`, bold: false }];
  }
}

/** A limit's value beside its bound, to the decimals that tell them apart. */
export function against(value: number | null, bound: number | null, unit: string): { value: string; bound: string; unit: string } {
  const [factor, shown] = unit === '' || unit === '1' ? [100, '%'] : unit === 'm2.K/W' ? [1000, 'm²·K/kW'] : [1, prettyUnit(unit)];
  const known = bound ?? value ?? 0;
  const enough = known === 0 ? 0 : Math.max(0, 1 - Math.floor(Math.log10(Math.abs(known * factor))));
  const show = (v: number | null, decimals: number) => (v === null ? 'not known' : rounded(v * factor, decimals));
  const decimals = [enough, enough + 1, enough + 2].find(d => value === bound || show(value, d) !== show(bound, d)) ?? enough + 2;
  return { value: show(value, decimals), bound: show(bound, decimals), unit: shown };
}
