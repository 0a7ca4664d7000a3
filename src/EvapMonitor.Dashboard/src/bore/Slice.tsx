import type { Effect } from '../api/types';
import { depositOf } from './deposit';

const width = 64, height = 14;

/** A slice through the deposit for dense rows: 0 to 2 × the limit, the limit's tick in the middle. */
export function Slice({ effect }: { effect: Effect }) {
  const found = depositOf(effect, 1);
  const r = found?.deposit.resistance ?? null;
  if (found === null || r === null) {
    return <svg class="slice" width={width} height={height} aria-hidden="true" focusable="false">
      <rect x="0.5" y="0.5" width={width - 1} height={height - 1} class="slice-unknown" />
    </svg>;
  }
  const share = Math.min(Math.max(r / found.deposit.limit, 0), 2);
  return (
    <svg class="slice" width={width} height={height} aria-hidden="true" focusable="false">
      <rect x="0.5" y="0.5" width={width - 1} height={height - 1} class="slice-frame" />
      <rect x="1" y="1" width={(width - 2) * (share / 2)} height={height - 2} class="slice-fill" />
      <line x1={width / 2} x2={width / 2} y1="0" y2={height} class="slice-halo" />
      <line x1={width / 2} x2={width / 2} y1="0" y2={height} class={found.scale === 'limit' ? 'slice-limit' : 'slice-limit slice-dotted'} />
    </svg>
  );
}
