import { useLocation } from 'wouter-preact';
import { pages } from '../api/addresses';
import { effectText } from './effect-text';
import { onlyWay } from './labels';
import type { Node, Rect, Sheet } from './layout';
import { flowTexts, readingText } from './reading';
import { fitted, twoLines } from './text';

/** The boxes of the drawing. Kinds differ by their lines, not by colour. */
export function Boxes({ sheet, stale }: { sheet: Sheet; stale: boolean }) {
  return <g>{sheet.nodes.map(n => <Box key={n.place.id} node={n} sheet={sheet} stale={stale} />)}</g>;
}

function Box({ node, sheet, stale }: { node: Node; sheet: Sheet; stale: boolean }) {
  const { place, rect: r } = node;
  switch (place.kind) {
    case 'effect': return <EffectBox node={node} stale={stale} />;
    case 'condensate': return <Header rect={r} turned={sheet.metrics.turned} />;
    default: {
      // The shortest of the ways to say a flow; else the first reading here.
      const way = onlyWay(sheet, place), flow = way?.flow ? flowTexts(way).at(-1) ?? null : null;
      const first = flow !== null || place.kind === 'heater' ? null : place.measured.find(m => m.value !== null) ?? null;
      const own = place.kind === 'flash vessel' ? ['flash'] : r.h < 34 ? [fitted(place.name, r.w - 8, 13)] : twoLines(place.name, r.w - 8, 13);
      const reading = r.h >= 34 && (own.length === 1 || r.h >= 50) ? flow ?? (first && readingText(first)) : null;
      const lines = reading === null ? own : [...own, fitted(reading, r.w - 6, 13)];
      const top = r.y + r.h / 2 - (lines.length - 1) * 8 + 4.5;
      return (
        <g>
          <rect x={r.x + 0.5} y={r.y + 0.5} width={r.w - 1} height={r.h - 1} rx={place.kind === 'tank' ? 8 : 0} class="sheet-small" />
          <Sign kind={place.kind} rect={r} />
          {lines.map((line, i) => <text x={r.x + r.w / 2} y={top + i * 16} class={i >= own.length ? 'sheet-number' : 'sheet-name'}>{line}</text>)}
        </g>
      );
    }
  }
}

/** A heater has a wall, a tank its level, a flash vessel its surface, a recompressor arrows up. */
function Sign({ kind, rect: r }: { kind: string; rect: Rect }) {
  switch (kind) {
    case 'heater': return <line x1={r.x + 1.5} x2={r.x + 1.5} y1={r.y} y2={r.y + r.h} class="sheet-wall" />;
    case 'tank': return <line x1={r.x + 3} x2={r.x + r.w - 3} y1={r.y + r.h - 3} y2={r.y + r.h - 3} class="sheet-wall" />;
    case 'flash vessel': return <line x1={r.x + 4} x2={r.x + r.w - 4} y1={r.y + r.h - 5} y2={r.y + r.h - 5} class="sheet-surface" />;
    case 'thermal recompressor': case 'mechanical recompressor': {
      const at = [r.x + 5, r.x + r.w - 13];
      return <>{at.map(x => <path d={`M${x} ${r.y + r.h - 5}l4 -4l4 4m-8 -5l4 -4l4 4`} class="sheet-chevron" />)}</>;
    }
    default: return null;
  }
}

function EffectBox({ node: { place, rect: r }, stale }: { node: Node; stale: boolean }) {
  const [, go] = useLocation();
  const effect = place.effect, text = effect && effectText(effect), mid = r.x + r.w / 2, wall = Math.round(r.y + r.h * 0.47);
  return (
    // The table beneath has the same links for the keyboard.
    <g class="sheet-effect" onClick={effect ? () => go(pages.effect(effect.line, effect.name)) : undefined}>
      <rect x={r.x + 0.75} y={r.y + 0.75} width={r.w - 1.5} height={r.h - 1.5} class={stale || (text && !text.known) ? 'sheet-box sheet-unsure' : 'sheet-box'} />
      <line x1={r.x} x2={r.x + r.w} y1={wall} y2={wall} class="sheet-wall" />
      <text x={mid} y={wall - 26} class="sheet-title">{fitted(place.name, r.w - 10, 14)}</text>
      {text && <>
        <text x={mid} y={wall - 8} class="sheet-number">{text.heating}</text>
        <text x={mid} y={wall + 18} class="sheet-number">{text.boiling}</text>
        <text x={mid} y={wall + 36} class={text.known ? 'sheet-coefficient' : 'sheet-number'}>{fitted(text.coefficient, r.w - 4, 13)}</text>
      </>}
    </g>
  );
}

/** The line that gathers the condensate. */
function Header({ rect: r, turned }: { rect: Rect; turned: boolean }) {
  const y = r.y + r.h / 2, x = r.x + r.w / 2;
  return turned
    ? <><path d={`M${x} ${r.y}V${r.y + r.h}`} class="way-condensate way" /><path d={`M${x - 5} ${r.y + r.h - 4}l5 8l5 -8z`} class="sheet-arrow" /><text x={x + 4} y={r.y + r.h + 18} class="sheet-end">condensate</text></>
    : <><path d={`M${r.x} ${y}H${r.x + r.w}`} class="way-condensate way" /><path d={`M${r.x + r.w - 4} ${y - 5}l8 5l-8 5z`} class="sheet-arrow" /><text x={r.x + r.w + 10} y={y + 4.5} class="sheet-start">condensate</text></>;
}
