import { percent } from '../words/resistance';
import { strokes, type SurfaceRecord } from './surfaces';

const height = 44, apart = 22, top = 6;

/** The latest cleanings of a surface: for each a stroke as tall as the resistance before, and one as tall as what was left. */
export function StrokesFigure({ of }: { of: SurfaceRecord }) {
  const { pairs, best, width } = strokes(of, height, apart), base = top + height;
  const shares = of.cleanings.map(c => (c.result!.removed_share === null ? 'not known' : percent(c.result!.removed_share)));
  return (
    <svg class="strokes" width={width} height={base + 6} viewBox={`0 0 ${width} ${base + 6}`} role="img" aria-label={`Removed, oldest first: ${shares.join(', ')}`}>
      {pairs.map(p => <>
        {p.before === null ? <path d={`M${p.x - 4} ${base}v-10`} class="stroke-unknown" /> : <path d={`M${p.x - 4} ${base}V${base - p.before}`} class="stroke-before" />}
        {p.after === null ? <path d={`M${p.x + 4} ${base}v-10`} class="stroke-unknown" /> : <path d={`M${p.x + 4} ${base}V${base - Math.max(1.5, p.after)}`} class="stroke-after" />}
        {p.failed && <><path d={`M${p.x - 9} ${base + 3}L${p.x + 9} ${top}`} class="stroke-halo" /><path d={`M${p.x - 9} ${base + 3}L${p.x + 9} ${top}`} class="stroke-failed" /></>}
      </>)}
      {best !== null && best > 2 && <path d={`M0 ${base - best}H${width}`} class="stroke-best" />}
      <path d={`M0 ${base + 0.5}H${width}`} class="stroke-base" />
    </svg>
  );
}
