import { Scroller } from '../parts/Scroller';
import { fixed, measured } from '../words/number';
import { fullMoment } from '../words/time';
import type { Columns } from './trend';
import type { Span } from './view';

const most = 150;

/** The chart's numbers as a table; long ones evenly thinned, and it says so. */
export function TrendTable({ columns: c, span, zone, what }: { columns: Columns; span: Span; zone: string; what: string }) {
  const inside = c.x.map((_, i) => i).filter(i => c.x[i]! * 1000 >= span.from && c.x[i]! * 1000 <= span.to);
  const every = Math.max(1, Math.ceil(inside.length / most));
  const rows = inside.filter((_, k) => k % every === 0).reverse();
  return (
    <Scroller label={`${what} as a table`}>
      <table class="trend-table">
        <caption>{what}, ± one standard uncertainty; youngest first{every > 1 && `; one of every ${fixed(every)} points (the CSV has all)`}</caption>
        <thead><tr><th scope="col">time</th><th scope="col">value</th><th scope="col">remark</th></tr></thead>
        <tbody>{rows.map(i => {
          const v = c.value[i] ?? c.idle[i] ?? null;
          const remark = v === null ? c.reason[i] : c.extrapolated[i] ? 'extrapolated' : c.unsteady[i] ? 'not steady' : (c.idle[i] ?? null) !== null ? 'not producing' : null;
          return <tr key={i}><th scope="row">{fullMoment(c.x[i]! * 1000, zone)}</th><td>{v === null ? 'none' : measured(v, c.u[i] ?? null)}</td><td>{remark}</td></tr>;
        })}</tbody>
      </table>
    </Scroller>
  );
}
