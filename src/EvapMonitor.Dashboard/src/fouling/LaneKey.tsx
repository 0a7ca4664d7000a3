import type { ComponentChildren } from 'preact';
import { marksIn, type LaneMark } from '../chart/lane';
import type { Span } from '../chart/view';

/** What the bars above the chart mean; only those that the span holds. */
export function LaneKey({ marks, span }: { marks: readonly LaneMark[]; span: Span }) {
  const shown = marksIn(marks, span.from, span.to), has = (form: LaneMark['form']) => shown.some(m => m.form === form);
  if (shown.length === 0) return null;
  return (
    <ul class="lane-key" aria-label="Bars above the chart">
      {has('logged') && <li><Sign><rect x="1" y="3" width="14" height="8" class="lane-fill" /></Sign>cleaning, logged</li>}
      {has('signal') && <li><Sign><path d="M1 4.25h14M1 9.75h14" class="lane-rails" /></Sign>told by a signal</li>}
      {has('recognised') && <li><Sign><rect x="1.75" y="3.75" width="12.5" height="6.5" class="lane-outline" /></Sign>recognised, nobody logged it</li>}
      {shown.some(m => m.failed) && <li><Sign><rect x="1" y="3" width="14" height="8" class="lane-fill" /><path d="M0 13 16 1" class="lane-halo" /><path d="M0 13 16 1" class="lane-strike" /></Sign>did not clean</li>}
      {has('stop') && <li><Sign><path d="M1 10.25h14" class="lane-stop" /></Sign>stop, the surface as before</li>}
    </ul>
  );
}

function Sign({ children }: { children: ComponentChildren }) {
  return <svg width="16" height="14" viewBox="0 0 16 14" aria-hidden="true" focusable="false">{children}</svg>;
}
