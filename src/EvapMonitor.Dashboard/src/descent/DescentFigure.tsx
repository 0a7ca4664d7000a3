import type { FlowSheet } from '../api/types';
import type { Metrics } from '../sheet/metrics';
import type { Column } from '../sheet/order';
import { fitted } from '../sheet/text';
import { barsOf, levelsOf, type Bar, type Fill } from './bars';
import type { Fall, Lift } from './descent';
import { scaleOf, type Scale } from './scale';

const fills: { fill: Fill; name: string }[] = [
  { fill: 'clean', name: 'needed by a clean wall' }, { fill: 'scale', name: 'taken by scale' }, { fill: 'whole', name: 'driving force, clean value not known' }, { fill: 'unsure', name: 'driving force without a coefficient' },
  { fill: 'elevation', name: 'elevation' }, { fill: 'loss', name: 'line loss' }, { fill: 'lift', name: 'lifted by recompression' }, { fill: 'unknown', name: 'not known' },
];

const top = 26, bottom = 10, depth = 250, rowName = 20, row = 46, least = 1.5;

export interface DescentProps { of: FlowSheet; columns: Column[]; metrics: Metrics; falls: Map<string, Fall>; lifts: Map<string, Lift>; width: number }

/** Where the kelvins go: in the columns of the drawing above it, or on a phone a row each. All its numbers stand in the table. */
export function DescentFigure({ of, columns, metrics, falls, lifts, width }: DescentProps) {
  const all = [...falls.values()].flatMap(f => [f.heating, f.boiling, f.condensing, f.condensing === null || f.loss === null ? null : f.condensing - f.loss]);
  const scale = scaleOf(all);
  if (scale === null) return <figure class="descent"><figcaption><h2>Where the kelvins go</h2></figcaption><p class="quiet">No temperature of this line is known yet; the reasons stand below.</p></figure>;
  const bars = barsOf(columns, falls, lifts, of.ways);
  return (
    <figure class="descent">
      <figcaption>
        <h2>Where the kelvins go</h2>
        <ul class="sheet-key">{fills.filter(f => bars.some(b => b.fill === f.fill)).map(f => <li key={f.fill}>
          <svg width="22" height="16" aria-hidden="true" focusable="false"><Piece fill={f.fill} x={0.5} y={1} w={21} h={14} /></svg>{f.name}
        </li>)}</ul>
      </figcaption>
      <Patterns />
      {metrics.turned ? <Rows {...{ of, columns, falls, lifts, width, scale, bars }} /> : <Columns {...{ of, columns, metrics, falls, lifts, width, scale, bars }} />}
    </figure>
  );
}

type Drawn = Omit<DescentProps, 'metrics'> & { scale: Scale; bars: Bar[] };

function Columns({ of, columns, metrics, falls, lifts, width, scale, bars }: Drawn & { metrics: Metrics }) {
  const y = (t: number) => top + (scale.high - t) / (scale.high - scale.low) * depth;
  const barWidth = Math.min(metrics.box - 20, 88), left = (c: number) => metrics.gutter + (c + 0.5) * metrics.column - barWidth / 2, last = columns.length - 1;
  const levels = levelsOf(columns, of.ways, falls, lifts);
  const ends = levels.filter(l => l.from === 0 || l.to === last);
  return (
    <svg viewBox={`0 0 ${width} ${top + depth + bottom}`} width={width} height={top + depth + bottom} role="img" aria-label={`Where the kelvins go in ${of.line}, from the steam to the condenser. The table below has every number.`} focusable="false">
      <text x="0" y="12" class="sheet-axis">°C</text>
      {scale.ticks.map(t => <g><line x1={44} x2={width} y1={y(t)} y2={y(t)} class="descent-grid" /><text x="36" y={y(t) + 4.5} class="sheet-axis sheet-end">{t}</text></g>)}
      {levels.map(l => <line x1={l.from === 0 ? left(0) : left(l.from) + (l.dotted ? 0 : barWidth)} x2={l.to === last ? left(last) + barWidth : left(l.to) + (l.dotted ? barWidth : 0)} y1={y(l.at)} y2={y(l.at)} class={l.dotted ? 'descent-level descent-dotted' : 'descent-level'} />)}
      {bars.map(b => <Piece fill={b.fill} x={left(b.column)} y={y(b.from)} w={barWidth} h={Math.max(least, y(b.to) - y(b.from))} />)}
      {columns.map((c, i) => {
        const above = bars.find(b => b.column === i);
        return above && <text x={left(i)} y={y(above.from) - 7} class="descent-name">{fitted(c.name, metrics.column - 4, 14)}</text>;
      })}
      {ends.some(l => l.from === 0) && <text x={left(0)} y={y(Math.max(...ends.filter(l => l.from === 0).map(l => l.at))) - 7} class="sheet-start">steam</text>}
      {ends.some(l => l.to === last) && <text x={left(last)} y={y(Math.max(...ends.filter(l => l.to === last).map(l => l.at))) - 7} class="sheet-start">condenser</text>}
    </svg>
  );
}

/** The same turned: hot on the left, cold on the right, a row for each effect. */
function Rows({ of, columns, falls, lifts, width, scale, bars }: Drawn) {
  const x = (t: number) => 4 + (scale.high - t) / (scale.high - scale.low) * (width - 8);
  const shown = columns.map((c, i) => ({ c, i })).filter(({ c }) => falls.has(c.id) || lifts.has(c.id)), height = 20 + shown.length * row;
  const ticks = scale.ticks.filter((_, i) => scale.ticks.length < 6 || i % 2 === 0);
  return (
    <svg viewBox={`0 0 ${width} ${height}`} width={width} height={height} role="img" aria-label={`Where the kelvins go in ${of.line}, an effect a row, hot on the left. The tables below have every number.`} focusable="false">
      {ticks.map(t => <g><line x1={x(t)} x2={x(t)} y1={16} y2={height} class="descent-grid" /><text x={x(t)} y="12" class={`sheet-axis ${x(t) > width - 20 ? 'sheet-end' : x(t) < 20 ? 'sheet-start' : 'sheet-mid'}`}>{t}{x(t) > width - 40 ? ' °C' : ''}</text></g>)}
      {shown.map(({ c, i }, at) => {
        const own = bars.filter(b => b.column === i), y = 20 + at * row + rowName, name = fitted(c.name, width / 2, 14), start = own[0] ? x(own[0].from) : 4;
        return <g>
          <text x={start > width * 0.6 ? width - 4 : start} y={y - 4} class={start > width * 0.6 ? 'descent-name sheet-end' : 'descent-name'}>{name}</text>
          {own.map(b => <Piece fill={b.fill} x={x(b.from)} y={y} w={Math.max(least, x(b.to) - x(b.from))} h={18} across />)}
        </g>;
      })}
    </svg>
  );
}

function Piece({ fill, x, y, w, h, across = false }: { fill: Fill; x: number; y: number; w: number; h: number; across?: boolean }) {
  // A gap in the colour of the page keeps neighbours apart.
  const [gw, gh] = across ? [Math.max(1, w - 1.5), h] : [w, Math.max(1, h - 1.5)];
  const edge = { x: x + 0.5, y: y + 0.5, width: Math.max(0.5, gw - 1), height: Math.max(0.5, gh - 1) };
  switch (fill) {
    case 'clean': return <rect x={x} y={y} width={gw} height={gh} class="piece-clean" />;
    case 'scale': return <><rect x={x} y={y} width={gw} height={gh} class="piece-scale" /><rect x={x} y={y} width={gw} height={gh} fill="url(#dots)" /></>;
    case 'elevation': return <><rect {...edge} class="piece-elevation" /><rect x={x} y={y} width={gw} height={gh} fill="url(#hatch)" /></>;
    case 'whole': return <rect {...edge} class="piece-whole" />;
    case 'lift': return <><rect {...edge} class="piece-lift" /><rect x={x} y={y} width={gw} height={gh} fill={across ? 'url(#chevrons-left)' : 'url(#chevrons)'} /></>;
    case 'unsure': case 'unknown': return <><rect {...edge} class="piece-unsure" />{w > 14 && h > 14 && <text x={x + w / 2} y={y + h / 2 + 5} class="sheet-mid">?</text>}</>;
    case 'loss': return <rect {...edge} class="piece-loss" />;
  }
}

function Patterns() {
  return (
    <svg width="0" height="0" class="patterns" aria-hidden="true" focusable="false"><defs>
      <pattern id="dots" width="8" height="6" patternUnits="userSpaceOnUse"><circle cx="2" cy="2" r="1" class="pattern-dot" /><circle cx="6" cy="5" r="1" class="pattern-dot" /></pattern>
      <pattern id="hatch" width="6" height="6" patternUnits="userSpaceOnUse"><path d="M-1 1l2 -2M0 6l6 -6M5 7l2 -2" class="pattern-line" /></pattern>
      <pattern id="chevrons" width="14" height="10" patternUnits="userSpaceOnUse"><path d="M3 8l4 -4l4 4" class="pattern-line" /></pattern>
      <pattern id="chevrons-left" width="10" height="14" patternUnits="userSpaceOnUse"><path d="M8 3l-4 4l4 4" class="pattern-line" /></pattern>
    </defs></svg>
  );
}
