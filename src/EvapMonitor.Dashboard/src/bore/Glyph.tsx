import type { Effect } from '../api/types';
import { boreState } from './Bore';
import { limitShare, stepOf } from './steps';

/** Inner radius of the deposit ring for each step; at the limit only a slot stays open. */
const clear = [6, 4.6, 3.4, 2.2, 0];

/** A bore of 14 px in five steps, for dense rows; stands beside its number. */
export function Glyph({ effect }: { effect: Effect }) {
  const share = limitShare(effect), state = share === null && effect.cleaning_since === null ? 'unknown' : boreState(effect);
  const inner = share === null ? 6 : clear[stepOf(share)]!;
  return (
    <svg class="glyph" width="14" height="14" viewBox="-7 -7 14 14" aria-hidden="true" focusable="false">
      {state === 'known' && inner < 6 && <circle r={(6 + inner) / 2} class="glyph-ring" stroke-width={6 - inner} />}
      {state === 'known' && inner === 0 && <line x1="-3.2" x2="3.2" y1="0" y2="0" class="glyph-slot" />}
      {state === 'cleaning' && <circle r="3" class="glyph-wall" />}
      <circle r="6.25" class="glyph-wall" stroke-dasharray={state === 'unknown' ? '2.6 2.3' : undefined} />
    </svg>
  );
}
