import type { Campaign, Effect, Uncertain } from '../api/types';
import type { Piece } from './line';
import { significant, measured } from './number';
import { percent, resistance, resistanceUnit, told } from './resistance';
import { date } from './time';

const plain = (text: string): Piece => ({ text, bold: false });
const bold = (text: string): Piece => ({ text, bold: true });

/** Runs shorter than this are told by the day, longer ones by the week; h of production. */
const dayRuns = 168;

/** The growth of a campaign: per day of production for short runs, per week for long ones. Null when it is not known. `grows`: false when it falls, null when neither can be told. */
export function rateOf({ rate_m2k_w_per_day: { value, u }, production_hours: hours }: Campaign): { words: string; value: number; per: 'day' | 'week'; grows: boolean | null } | null {
  if (value === null) return null;
  const [per, days] = hours <= dayRuns ? ['day' as const, 1] : ['week' as const, 7];
  const words = `${measured(value * days * 1000, u === null ? null : u * days * 1000)} ${resistanceUnit} a ${per}`;
  return { words, value: value * days, per, grows: Math.abs(value) < 2 * (u ?? 0) ? null : value > 0 };
}

/** What the cleaning before the present campaign left: the ring at the wall and the sentence both come from here. Null when it is not known. */
export function residualOf(effect: Effect): (Uncertain & { value: number; told: boolean }) | null {
  const left = effect.campaign?.initial_resistance_m2k_w;
  return left === undefined || left.value === null ? null : { value: left.value, u: left.u, told: told(left) };
}

/** What a campaign began with, for "since …". */
export function begunWords(campaign: Campaign, zone: string, now: number): string {
  const day = date(Date.parse(campaign.start), zone, now);
  switch (campaign.started_by) {
    case 'first data': return `the first data, ${day}`;
    case 'recognised': return `the recovery of ${day}, which nobody logged`;
    case 'signal': return `the cleaning of ${day}, told by its signal`;
    case 'logged': return `the cleaning of ${day}`;
  }
}

/** How fast it fouls, or whether it fouls at all; two sentences at most, one clause bold. `fresh`: its readings are live and it has a coefficient; else it is told of the past. */
export function foulingWords(effect: Effect, fresh: boolean, zone: string, now: number): Piece[] {
  const { campaign, name } = effect;
  if (campaign === null) return [plain(`How fast ${name} fouls is not known yet: it has no campaign with results.`)];
  const rate = rateOf(campaign), since = begunWords(campaign, zone, now), left = residualOf(effect);
  const began = left === null ? '' : left.told ? ` It began with ${resistance(left)} left.` : ` It began with ${resistance(left)}, not to be told from clean.`;
  if (rate === null) return [bold('How fast it fouls cannot be told yet'), plain(`, ${Math.round(campaign.production_hours)} h of production since ${since}.${began}`)];
  if (rate.grows === null) return [bold(`No fouling of ${name} ${fresh ? 'can' : 'could'} be told`), plain(`: its resistance ${fresh ? 'changes' : 'changed'} by ${rate.words} of production, since ${since}.${began}`)];
  if (!rate.grows) return [bold(`The resistance of ${name} ${fresh ? 'falls' : 'fell'}`), plain(`, by ${rate.words.replace('\u2212', '')} of production, since ${since}.${began}`)];
  const limit = effect.limits.resistance_m2k_w, share = limit !== null && limit > 0 ? `, ${significant((rate.value / limit) * 100, 2)} % of its limit` : '';
  return [bold(`${name} ${fresh ? 'fouls' : 'fouled'} by ${rate.words} of production`), plain(`${share}, since ${since}.${began}`)];
}

/** That the last cleaning did not clean, with its numbers; null when it did, that is not known, or it was of a body that does not serve now. */
export function failedWords({ last_cleaning: last, surface }: Pick<Effect, 'last_cleaning' | 'surface'>, zone: string, now: number): Piece[] | null {
  if (last?.result?.verdict !== 'did not clean' || (surface !== null && last.result.surface !== surface)) return null;
  const { before_m2k_w: before, removed_m2k_w: removed, removed_share: share } = last.result;
  const [was, gone] = [resistance(before), resistance(removed)];
  const numbers = was === null || gone === null ? '.' : `: it removed ${gone} of ${was} ${resistanceUnit}${share === null ? '' : ` (${percent(share)})`}.`;
  return [bold(`The cleaning of ${date(Date.parse(last.start), zone, now)} did not clean`), plain(numbers)];
}
