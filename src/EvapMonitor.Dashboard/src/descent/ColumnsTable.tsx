import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Metrics } from '../sheet/metrics';
import type { Column } from '../sheet/order';
import { fitted } from '../sheet/text';
import type { Fall, Lift } from './descent';
import { rowsFor, wallRows, type NumberRow } from './numbers';

export interface TableProps { line: string; columns: Column[]; falls: Map<string, Fall>; lifts: Map<string, Lift>; asOf: string }

/** Every number of the drawing and the descent, in the same columns. */
export function ColumnsTable({ line, columns, falls, lifts, asOf, metrics, width }: TableProps & { metrics: Metrics; width: number }) {
  const share = (px: number) => `${(px / width) * 100}%`;
  const rows = rowsFor(falls, lifts);
  return (
    <table class={columns.length > 8 ? 'descent-table descent-many' : 'descent-table'} style={{ width: `${width}px` }}>
      <caption class="unseen">The descent of {line} in numbers, {asOf}; ± one standard uncertainty</caption>
      <colgroup><col style={{ width: share(metrics.gutter) }} />{columns.map(c => <col key={c.id} style={{ width: share(metrics.column) }} />)}</colgroup>
      <thead><tr><th scope="col"><span class="unseen">quantity</span></th>{columns.map(c => <Head key={c.id} line={line} column={c} name={fitted(c.name, metrics.column - 10, 14.5)} />)}</tr></thead>
      <tbody>{rows.map(r => <tr key={r.name} class={r === wallRows[0] ? 'descent-break' : undefined}>
        <th scope="row" class={r.part ? 'descent-part' : undefined}>{r.name}</th>{columns.map(c => <td key={c.id}><Cell row={r} column={c} falls={falls} lifts={lifts} /></td>)}
      </tr>)}</tbody>
    </table>
  );
}

/** A name that is too long is shortened for the eye, not for the ear. */
function Head({ line, column, name }: { line: string; column: Column; name: string }) {
  const shown = name === column.name ? name : <><span aria-hidden="true">{name}</span><span class="unseen">{column.name}</span></>;
  switch (column.kind) {
    case 'effect': return <th scope="col"><Link href={pages.effect(line, column.name)}>{shown}</Link></th>;
    case 'recompressor': return <th scope="col">{shown}</th>;
    default: return <td />;
  }
}

export function Cell({ row, column, falls, lifts }: { row: NumberRow; column: Column; falls: Map<string, Fall>; lifts: Map<string, Lift> }) {
  const f = falls.get(column.id), l = lifts.get(column.id);
  return <>{f ? row.of(f) : l && row.machine ? row.machine(l) : null}</>;
}
