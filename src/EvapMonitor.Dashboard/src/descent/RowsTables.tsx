import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import { Cell, type TableProps } from './ColumnsTable';
import { rowsFor, type NumberRow } from './numbers';

/** The same numbers for a phone: a block per effect, names on the left. */
export function RowsTables({ line, columns, falls, lifts, asOf }: TableProps) {
  return <>{columns.filter(c => c.kind === 'effect' || c.kind === 'recompressor').map(c => {
    const machine = lifts.has(c.id);
    const rows: NumberRow[] = rowsFor(falls, lifts).filter(r => (machine ? r.machine : r.name !== 'lift, K'));
    return (
      <table key={c.id} class="descent-rows">
        <caption>{machine ? c.name : <Link href={pages.effect(line, c.name)}>{c.name}</Link>}<span class="unseen"> in numbers, {asOf}; ± one standard uncertainty</span></caption>
        <tbody>{rows.map(r => <tr key={r.name}><th scope="row" class={r.part ? 'descent-part' : undefined}>{r.name}</th><td><Cell row={r} column={c} falls={falls} lifts={lifts} /></td></tr>)}</tbody>
      </table>
    );
  })}</>;
}
