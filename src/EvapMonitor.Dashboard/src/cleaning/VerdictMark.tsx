import type { Cleaning } from '../api/types';
import { verdictOf } from '../words/cleaning';

/** A cleaning as two strokes in 16 px, before and after; always stands beside its words. */
export function VerdictMark({ of }: { of: Cleaning }) {
  const verdict = verdictOf(of);
  if (verdict === null) return <svg class="strokes" width="16" height="16" aria-hidden="true" focusable="false" />;
  const share = of.result?.removed_share ?? null, left = share === null ? null : Math.min(13, Math.max(1.5, 13 * (1 - share)));
  return (
    <svg class="strokes" width="16" height="16" viewBox="0 0 16 16" aria-hidden="true" focusable="false">
      <path d="M4.5 15V2" class={verdict === 'awaiting hours' ? 'stroke-unknown' : 'stroke-before'} />
      {left === null ? <path d="M11.5 15V2" class="stroke-unknown" /> : <path d={`M11.5 15V${15 - left}`} class="stroke-after" />}
      {verdict === 'did not clean' && <><path d="M1 15 15 1" class="stroke-halo" /><path d="M1 15 15 1" class="stroke-failed" /></>}
    </svg>
  );
}
