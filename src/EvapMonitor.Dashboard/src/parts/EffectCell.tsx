import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Effect } from '../api/types';
import { Bore } from '../bore/Bore';
import { depositOf } from '../bore/deposit';
import { cleanlinessWords, dueWords, unknownReason } from '../words/due';
import { significant } from '../words/number';
import { moment } from '../words/time';
import { DueLabel } from './DueLabel';

export interface EffectCellProps { effect: Effect; now: number; zone: string; stale: boolean; weeks: 1 | 4; radius: number; asOf: number | null }

/** An effect as a bore with its words; the whole of it leads to the effect's page. */
export function EffectCell({ effect, now, zone, stale, weeks, radius, asOf }: EffectCellProps) {
  const due = dueWords(effect, now, !stale);
  const found = depositOf(effect, weeks);
  const share = found === null || found.deposit.resistance === null ? null : found.deposit.resistance / found.deposit.limit;
  const unknown = effect.cleaning_since === null && (effect.due.state === 'unknown' || (effect.now?.fouling_resistance_m2k_w ?? null) === null);
  return (
    <Link class="effect" href={pages.effect(effect.line, effect.name)}>
      <span class="effect-name">{effect.name}</span>{' '}
      <Bore effect={effect} radius={radius} stale={stale} weeks={weeks} />
      <span class="effect-words">
        {stale && asOf !== null && <span class="effect-asof">as of {moment(asOf, zone, now)} </span>}
        {!unknown && effect.cleaning_since === null && <span>{cleanlinessWords(effect)} </span>}
        {!unknown && effect.cleaning_since === null && share !== null && share > 2 && <span>{significant(share, 2)} × limit </span>}
        <DueLabel due={due} />
        {unknown && ' '}{unknown && <span class="effect-reason">{unknownReason(effect)}</span>}
      </span>
    </Link>
  );
}
