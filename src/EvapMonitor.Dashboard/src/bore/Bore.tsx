import type { Effect } from '../api/types';
import { depositOf, hoursShare } from './deposit';
import { arcPath, boreShape, ticks, type BoreShape, type Ring } from './geometry';

/** How a bore is drawn: `known` as computed; `unknown` dashed with a question mark; `cleaning` in outline. */
export type BoreState = 'known' | 'unknown' | 'cleaning';

export function boreState(effect: Effect): BoreState {
  if (effect.cleaning_since !== null) return 'cleaning';
  return (effect.now?.fouling_resistance_m2k_w ?? null) === null ? 'unknown' : 'known';
}

/** The picture of an effect's deposit. Hidden from screen readers: the words beside it say the same. */
export function Bore({ effect, radius, stale, weeks }: { effect: Effect; radius: number; stale: boolean; weeks: 1 | 4 }) {
  const found = depositOf(effect, weeks);
  const state = found === null ? 'unknown' : boreState(effect);
  const deposit = found?.deposit ?? { resistance: null, uncertainty: null, limit: 1, residual: null, growth: [] };
  const shape = boreShape(state === 'unknown' ? { ...deposit, resistance: null } : deposit, radius);
  const hours = hoursShare(effect);
  const half = radius + 8;
  return (
    <svg class="bore" width={2 * half} height={2 * half} viewBox={`${-half} ${-half} ${2 * half} ${2 * half}`} aria-hidden="true" focusable="false">
      {hours !== null && <HoursArc radius={radius + 5} share={hours} />}
      <Wall shape={shape} state={state} stale={stale} />
      {state === 'known' && <Rings shape={shape} />}
      {state === 'cleaning' && shape.clear !== null && shape.clear < shape.bore - 1 && <circle r={shape.clear} class="bore-outline" />}
      {state === 'unknown' && <text class="bore-question" y={radius > 30 ? 10 : 6}>?</text>}
      {state !== 'unknown' && <LimitCircle radius={shape.limit} set={found?.scale === 'limit'} />}
      {state === 'known' && shape.whisker && <Whisker {...shape.whisker} tall={radius >= 44} />}
    </svg>
  );
}

function Wall({ shape, state, stale }: { shape: BoreShape; state: BoreState; stale: boolean }) {
  const around = 2 * Math.PI * shape.wall;
  const missing = around / 9;
  const dash = state === 'unknown' ? '6 5' : stale ? `${around - missing} ${missing}` : undefined;
  return (
    <>
      <circle r={shape.wall} class="bore-card" />
      <circle r={shape.wall} class={state === 'cleaning' ? 'bore-outline' : 'bore-wall'} stroke-width={state === 'cleaning' ? 1.5 : shape.wallWidth}
        stroke-dasharray={dash} transform={stale && state !== 'unknown' ? 'rotate(-50)' : undefined} />
    </>
  );
}

function Rings({ shape }: { shape: BoreShape }) {
  return (
    <>
      {shape.residual && <>
        <RingOf ring={shape.residual} class="bore-residual" />
        {ticks(shape.residual).map(s => <line {...s} class="bore-cut" />)}
      </>}
      {shape.strata.map(s => <RingOf ring={s} class="bore-stratum" />)}
      {shape.hatch.map(s => <line {...s} class="bore-hatch" />)}
    </>
  );
}

function RingOf({ ring, class: name }: { ring: Ring; class: string }) {
  return <circle r={(ring.outer + ring.inner) / 2} class={name} stroke-width={Math.max(0.5, ring.outer - ring.inner)} />;
}

function LimitCircle({ radius, set }: { radius: number; set: boolean }) {
  return (
    <>
      <circle r={radius} class="bore-halo" stroke-width="3.5" />
      <circle r={radius} class="bore-limit" stroke-width="1.5" stroke-dasharray={set ? '4 3' : '1.5 3'} />
    </>
  );
}

function Whisker({ from, to, tall }: { from: number; to: number; tall: boolean }) {
  if (to - from < 1.5) return null;
  // Caps closer than this would run into a blob.
  const cap = to - from < 6 ? 0 : tall ? 3 : 2;
  const path = `M${from} 0H${to}${cap > 0 ? `M${from} ${-cap}V${cap}M${to} ${-cap}V${cap}` : ''}`;
  return (
    <>
      <path d={path} class="bore-halo" stroke-width="3.5" />
      <path d={path} class="bore-whisker" />
    </>
  );
}

function HoursArc({ radius, share }: { radius: number; share: number }) {
  return (
    <>
      <path d={arcPath(radius, share)} class="bore-hours" />
      <line x1="0" x2="0" y1={-radius - 3} y2={-radius + 2} class="bore-hours" />
    </>
  );
}
