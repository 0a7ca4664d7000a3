import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Cleaning } from '../api/types';
import { Scroller } from '../parts/Scroller';
import { percent, resistance, resistanceUnit } from '../words/resistance';
import { StrokesFigure } from './StrokesFigure';
import { surfaceRecords } from './surfaces';

/** What the latest cleanings of each surface brought. */
export function SurfacesPart({ all }: { all: readonly Cleaning[] }) {
  const records = surfaceRecords(all);
  if (records.length === 0) return null;
  return (
    <section aria-labelledby="brought">
      <h2 id="brought">What the last ten brought, by surface</h2>
      <Scroller label="Table of surfaces">
        <table class="surfaces stacked">
          <caption>Each pair of strokes is a cleaning, oldest first: the resistance before, and what was left of it, on the scale of the surface. Dashed: not known. Struck through: did not clean. Dotted line: the least that was left.
            Resistances in {resistanceUnit}, ± one standard uncertainty.</caption>
          <thead><tr><th scope="col">line</th><th scope="col">surface</th><th scope="col">before and after</th><th scope="col">removed last</th><th scope="col">removed, median</th><th scope="col">left last</th><th scope="col">least left</th></tr></thead>
          <tbody>{records.map(r => {
            const share = r.cleanings.at(-1)!.result!.removed_share;
            return <tr key={`${r.line} ${r.surface}`}>
              <td data-name="line">{r.line}</td>
              <th scope="row"><Link href={pages.effect(r.line, r.effect)}>{r.surface}</Link>{r.surface !== r.effect && <span class="quiet"> (last in {r.effect})</span>}</th>
              <td><StrokesFigure of={r} /></td>
              <td class="number" data-name="removed last">{share === null ? 'not known' : percent(share)}</td>
              <td class="number" data-name="removed, median">{r.median === null ? 'not known' : percent(r.median)}</td>
              <td class="number" data-name="left last">{r.left === null ? 'not known' : resistance(r.left)}</td>
              <td class="number" data-name="least left">{r.best === null ? 'not known' : resistance({ value: r.best, u: r.left?.u ?? null })?.split(' ± ')[0]}</td>
            </tr>;
          })}</tbody>
        </table>
      </Scroller>
    </section>
  );
}
