import type { WayKind } from '../api/types';
import { labelsOf } from './labels';
import type { Point, Route, Sheet } from './layout';

/** The ways with their arrows and labels. Where two cross, the later one passes over a gap in the other. */
export function Ways({ sheet }: { sheet: Sheet }) {
  return (
    <g>
      {sheet.routes.map(r => <Way key={`${r.way.from} ${r.way.to} ${r.way.kind}`} route={r} />)}
      {sheet.routes.map(r => <path d={arrow(r.points)} class="sheet-arrow" />)}
      {labelsOf(sheet).map(l => <g>
        <rect x={l.rect.x} y={l.rect.y} width={l.rect.w} height={l.rect.h} class="sheet-ground" />
        <text x={l.rect.x + l.rect.w / 2} y={l.rect.y + 12.5} class={l.measured ? 'sheet-flow' : 'sheet-letter'}>{l.text}</text>
      </g>)}
    </g>
  );
}

function Way({ route: { way, points } }: { route: Route }) {
  const d = points.map((p, i) => `${i === 0 ? 'M' : 'L'}${p.x} ${p.y}`).join('');
  return <><path d={d} class="sheet-gap" /><Stroke d={d} kind={way.kind} /></>;
}

/** A way in the line of its kind; that of liquor is double. */
export function Stroke({ d, kind }: { d: string; kind: WayKind }) {
  return <><path d={d} class={`way way-${kind}`} />{kind === 'liquor' && <path d={d} class="way-core" />}</>;
}

/** A head at the end of the last stretch. */
export function arrow(points: Point[]): string {
  const [a, b] = points.slice(-2) as [Point, Point];
  const x = Math.sign(b.x - a.x), y = Math.sign(b.y - a.y), back = 8, half = 4;
  return `M${b.x} ${b.y}L${b.x - x * back - y * half} ${b.y - y * back - x * half}L${b.x - x * back + y * half} ${b.y - y * back + x * half}Z`;
}
