import { useSignal } from '@preact/signals';
import { useEffect } from 'preact/hooks';
import { announce } from '../parts/Announcer';
import { calmNow } from '../site/clock';
import { date } from '../words/time';
import { cursorAt } from './cursor';
import { keyAct } from './keys';
import type { ChartModel } from './model';
import { savePng } from './save';
import { spokenSummary } from './spoken';
import { watchTouch } from './touch';
import { reasonsIn, extent } from './trend';
import { TrendTable } from './TrendTable';
import { usePlot } from './use-plot';
import { valueWords } from './ValueRow';
import { zoomed, type Span } from './view';

export interface TrendChartProps {
  title: string;
  name: string;
  model: Omit<ChartModel, 'palette' | 'axis' | 'outside'>;
  height: number;
  /** A panel among others: heading, values and buttons in one row. */
  small: boolean;
  busy: boolean;
  /** A new span; `settled` false while fingers or keys still move it. */
  show(span: Span, settled: boolean): void;
  reset(): void;
  csv(): void;
}

const noPalette = { card: '', ink: '', soft: '', faint: '', hair: '', water: '', wash: '', soon: '', now: '' };

/** A series with its band, limit, cleanings and labels; by mouse, finger and key. */
export function TrendChart({ title, name, model: given, height, small, busy, show, reset, csv }: TrendChartProps) {
  const table = useSignal(false), axisStart = useSignal(''), outside = useSignal(0), index = useSignal<number | null>(null);
  const { host, plot, model } = usePlot({ ...given, palette: noPalette, axis: { from: 0, to: 1, step: 1 }, outside: 0 }, height, {
    cursor: i => {
      index.value = i;
      const x = i === null ? null : model.columns.x[i] ?? null;
      if (cursorAt.peek() !== x) cursorAt.value = x;
    },
    selected: (from, to) => show({ from, to }, true),
    drawn: (start, left) => { axisStart.value = start; outside.value = left; },
  });

  const shared = cursorAt.value;
  useEffect(() => {
    const u = plot.current;
    if (!u || (index.peek() !== null && model.columns.x[index.peek()!] === shared)) return;
    u.setCursor(shared === null ? { left: -10, top: -10 } : { left: u.valToPos(shared, 'x'), top: 10 }, false);
    index.value = shared === null ? null : u.valToIdx(shared);
  }, [shared]);

  useEffect(() => watchTouch(plot.current!.over, {
    cursor: x => plot.current?.setCursor({ left: x, top: 10 }),
    pinch: (factor, x, dx) => {
      const u = plot.current!, span = model.span;
      const about = u.posToVal(x, 'x') * 1000, by = (dx / u.over.clientWidth) * (span.to - span.from);
      const next = zoomed(span, factor, about);
      show({ from: next.from + by, to: next.to + by }, false);
    },
    pinched: () => show(model.span, true),
  }), [plot.current]);

  const { columns, span, zone } = given;
  const middle = () => (cursorAt.peek() ?? (span.from + span.to) / 2000) * 1000;
  const press = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const act = keyAct(event.key, event.shiftKey);
    if (act === null) return;
    event.preventDefault();
    if ('zoom' in act) show(zoomed(span, act.zoom, middle()), false);
    else if ('reset' in act) reset();
    else if ('table' in act) table.value = !table.peek();
    else stepCursor('move' in act ? act.move : act.edge);
  };
  const stepCursor = (by: number | 'first' | 'last') => {
    const inside = columns.x.map((_, i) => i).filter(i => columns.x[i]! * 1000 >= span.from && columns.x[i]! * 1000 <= span.to);
    if (inside.length === 0) return;
    const [first, last] = [inside[0]!, inside.at(-1)!];
    const from = index.peek();
    const to = by === 'first' ? first : by === 'last' ? last : from === null || from < first || from > last ? last : Math.min(last, Math.max(first, from + by));
    plot.current?.setCursor({ left: plot.current.valToPos(columns.x[to]!, 'x'), top: 10 });
    const words = valueWords(columns, given.clean, to, zone);
    if (words) announce(`${words.when}: ${words.value}${words.more && `, ${words.more}`}`);
  };

  const at = valueWords(columns, given.clean, index.value, zone);
  const empty = extent(columns, span.from / 1000, span.to / 1000) === null;
  const why = empty ? reasonsIn(columns, span.from / 1000, span.to / 1000).slice(0, 2) : [];
  const foot = empty ? '' : [
    axisStart.value !== '' && `axis starts at ${axisStart.value}`,
    outside.value > 0 && `${outside.value} far-off ${outside.value === 1 ? 'point lies' : 'points lie'} outside it; the table and the CSV have them`,
  ].filter(Boolean).join('; ');
  const values = at ? <><span class="values-when">{at.when}</span> <b>{at.value}</b> <span class="quiet">{at.more}</span></> : ' ';
  const buttons = <>
    <button type="button" aria-expanded={table.value} onClick={() => { table.value = !table.peek(); }}>Table<span class="unseen"> of {title}</span></button>
    <button type="button" onClick={csv}>CSV<span class="unseen"> of {title}</span></button>
    <button type="button" onClick={() => savePng(plot.current!.ctx.canvas, title, foot, model.palette, name)}>PNG<span class="unseen"> of {title}</span></button>
  </>;
  return (
    <figure class={small ? 'chart chart-small' : 'chart'} aria-label={title}>
      {small
        ? <div class="chart-head"><figcaption>{title}</figcaption><p class="values">{values}</p><span class="axis-start">{foot}</span><span class="chart-buttons">{buttons}</span></div>
        : <><figcaption>{title}</figcaption><p class="values">{values}</p></>}
      <div class="plot" ref={host} tabIndex={0} role="img" onKeyDown={press} aria-busy={busy}
        aria-label={`${spokenSummary(title, columns, span, given.limit?.label ?? null, given.marks, zone, calmNow.peek())} Arrow keys move the cursor, plus and minus zoom, 0 resets, T opens the table.`} />
      {empty && <p class="plot-empty">{busy ? 'The values are on the way.' : <>No value from {date(span.from, zone, calmNow.peek())} to {date(span.to, zone, calmNow.peek())}
        {why.length > 0 ? `: ${why.join('; ')}` : '; show an earlier time, or see under Plant what was imported'}.</>}</p>}
      {!small && <div class="chart-foot"><span class="axis-start">{foot}</span>{buttons}</div>}
      {table.value && <TrendTable columns={columns} span={span} zone={zone} what={title} />}
    </figure>
  );
}
