import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Metrics } from '../sheet/metrics';
import type { Column } from '../sheet/order';
import type { Fall, Lift } from './descent';
import { descentRows, wallRows, type NumberRow } from './numbers';

export interface TableProps { line: string; columns: Column[]; falls: Map<string, Fall>; lifts: Map<string, Lift>; asOf: string }

/** Every number of the drawing and the descent, in the same columns. */
export function ColumnsTable({ line, columns, falls, lifts, asOf, metrics, width }: TableProps & { metrics: Metrics; width: number }) {
  const share = (px: number) => `${(px / width) * 100}%`;
  const rows = [...descentRows.filter(r => r.name !== 'lift, K' || lifts.size > 0), ...wallRows];
  return (
    <table class="descent-table" style={{ width: `${width}px` }}>
      <caption class="unseen">The descent of {line} in numbers, {asOf}; ± one standard uncertainty</caption>
      <colgroup><col style={{ width: share(metrics.gutter) }} />{columns.map(c => <col key={c.id} style={{ width: share(metrics.column) }} />)}</colgroup>
      <thead><tr><th scope="col"><span class="unseen">quantity</span></th>{columns.map(c => <Head key={c.id} line={line} column={c} />)}</tr></thead>
      <tbody>{rows.map(r => <tr key={r.name} class={r === wallRows[0] ? 'descent-break' : undefined}>
        <th scope="row" class={r.part ? 'descent-part' : undefined}>{r.name}</th>{columns.map(c => <td key={c.id}><Cell row={r} column={c} falls={falls} lifts={lifts} /></td>)}
      </tr>)}</tbody>
    </table>
  );
}

function Head({ line, column }: { line: string; column: Column }) {
  switch (column.kind) {
    case 'effect': return <th scope="col"><Link href={pages.effect(line, column.name)}>{column.name}</Link></th>;
    case 'recompressor': return <th scope="col">{column.name}</th>;
    default: return <td />;
  }
}

export function Cell({ row, column, falls, lifts }: { row: NumberRow; column: Column; falls: Map<string, Fall>; lifts: Map<string, Lift> }) {
  const f = falls.get(column.id), l = lifts.get(column.id);
  return <>{f ? row.of(f) : l && row.machine ? row.machine(l) : null}</>;
}
