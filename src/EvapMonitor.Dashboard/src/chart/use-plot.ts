import { useEffect, useLayoutEffect, useRef } from 'preact/hooks';
import uPlot from 'uplot';
import type { ChartModel } from './model';
import { chartData, chartOptions, type ChartEvents } from './options';
import { onPaper, readPalette, watchPalette } from './palette';

/** On paper charts are lower, so that an effect has room on one page. */
const paperShare = 0.8;

/** Keeps a plot in an element: made once, resized with it, redrawn when the model or the colours change. */
export function usePlot(model: ChartModel, height: number, events: ChartEvents) {
  const host = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot | null>(null);
  // One model and one set of events live as long as the plot; each render pours its own into them.
  const live = useRef({ model, events }).current;
  Object.assign(live.model, model, { palette: live.model.palette, axis: live.model.axis, outside: live.model.outside });
  live.events = events;

  useLayoutEffect(() => {
    const element = host.current!;
    live.model.palette = readPalette(element);
    const made = plot.current = new uPlot(chartOptions(live.model, Math.max(200, element.clientWidth), height, {
      cursor: i => live.events.cursor(i), selected: (a, b) => live.events.selected(a, b), drawn: (start, outside) => live.events.drawn(start, outside),
    }), chartData(live.model), element);
    let width = element.clientWidth;
    const fit = () => made.setSize({ width: Math.max(200, width), height: onPaper() ? Math.round(height * paperShare) : height });
    const resize = new ResizeObserver(() => {
      if (element.clientWidth === width || element.clientWidth === 0) return;
      width = element.clientWidth;
      fit();
    });
    resize.observe(element);
    const stop = watchPalette(() => { live.model.palette = readPalette(element); fit(); made.redraw(false, true); });
    // Text drawn before the typeface arrives has the wrong widths.
    void document.fonts?.ready.then(() => { if (plot.current === made) made.redraw(false, true); });
    return () => { stop(); resize.disconnect(); made.destroy(); plot.current = null; };
  }, [height, model.narrow, model.times]);

  useEffect(() => { plot.current?.setData(chartData(live.model), true); },
    [model.columns, model.clean, model.marks, model.limit?.value, model.limit?.label, model.latest?.label, model.span.from, model.span.to, model.zone]);

  return { host, plot, model: live.model };
}
