import type { Effect } from '../api/types';

/** What the drawing stands for, once per page. */
export function Legend({ effects, weeks, dense }: { effects: Effect[]; weeks: 1 | 4; dense: boolean }) {
  return (
    <p class="legend">
      Ring thickness stands for fouling resistance; not to scale, not a flow restriction. One stratum is {weeks === 1 ? 'one week' : 'four weeks'}. Dashed circle: the
      limit. The bar at three o'clock: ± one standard uncertainty.
      {dense && ' In the rows: the ring in five steps, a quarter of the limit each, filled at the limit; the bar from clean to twice the limit, the limit in its middle; the share of the clean coefficient.'}
      {effects.some(e => e.limits.hours_since_cleaning !== null) && ' Arc outside: hours since the cleaning, full at the limit.'}
      {effects.some(e => (e.limits.resistance_m2k_w ?? 0) <= 0) && ' Dotted circle, where no limit is set: half the clean coefficient.'}
    </p>
  );
}
