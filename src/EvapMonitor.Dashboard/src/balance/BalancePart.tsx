import { useEffect } from 'preact/hooks';
import { addresses } from '../api/addresses';
import type { Balance, BalanceVariable } from '../api/types';
import { useResource } from '../api/use-resource';
import { Shown } from '../parts/Waiting';
import { zone } from '../site/state';
import { byPlace, rowNumbers, stateWords, unitWords } from '../words/balance';
import { moment } from '../words/time';
import '../styles/balance.css';

/** Measured against reconciled, by place; first what does not fit. */
export function BalancePart({ line, changes, now }: { line: string; changes: unknown; now: number }) {
  const balance = useResource<Balance>(addresses.balance(line), line);
  useEffect(() => { if (balance.state.peek().value) void balance.load(); }, [changes]);
  if (balance.state.value.failure?.status === 404) return <p class="quiet">{balance.state.value.failure.words}</p>;
  return <Shown of={balance} what="The balance">{of => <Told of={of} now={now} />}</Shown>;
}

function Told({ of, now }: { of: Balance; now: number }) {
  const derived = byPlace(of, false), count = derived.reduce((n, g) => n + g.variables.length, 0);
  return (
    <>
      <h2>What was measured, and what fits together</h2>
      <p class="say">{of.suspects.length === 0 ? 'Every reading that can be checked fits the others.' : of.suspects.map(s => <span key={s.signals.join()}><b>{s.sentence.replace(/\.$/, '')}</b>, since {moment(Date.parse(s.since), zone.value, now)}. </span>)}</p>
      <p class="quiet balance-check">Window to {moment(Date.parse(of.as_of), zone.value, now)}. {of.check}</p>
      <Table groups={byPlace(of, true)} caption={`Balance of ${of.line}: what was measured`} measured />
      {count > 0 && <details class="balance-derived">
        <summary>What follows without an instrument of its own: {count} values</summary>
        <Table groups={derived} caption={`Balance of ${of.line}: what follows`} measured={false} />
      </details>}
      <p class="legend-small">± one standard uncertainty. In brackets the correction in standard uncertainties of the reading. Pressures are absolute.</p>
    </>
  );
}

function Table({ groups, caption, measured }: { groups: { place: string; variables: BalanceVariable[] }[]; caption: string; measured: boolean }) {
  return (
    <table class="balance">
      <caption class="unseen">{caption}</caption>
      <thead><tr><th scope="col">place</th><th scope="col">quantity</th>{measured && <th scope="col" class="number">measured</th>}<th scope="col" class="number">by balance</th><th scope="col">unit</th>
        {measured && <th scope="col" class="number">correction</th>}<th scope="col">how it is known</th>{measured && <th scope="col">signal</th>}</tr></thead>
      <tbody>{groups.map(({ place, variables }) => variables.map((v, i) => <Row key={v.variable} v={v} place={i === 0 ? { name: place, rows: variables.length } : null} measured={measured} />))}</tbody>
    </table>
  );
}

function Row({ v, place, measured }: { v: BalanceVariable; place: { name: string; rows: number } | null; measured: boolean }) {
  const n = rowNumbers(v), words = stateWords(v);
  return (
    <tr class={place ? 'balance-first' : undefined}>
      {place && <th scope="rowgroup" rowSpan={place.rows}>{place.name}</th>}
      <td class="balance-what">{v.what}</td>
      {measured && <td class="number" data-name="measured">{n.measured}</td>}
      <td class="number" data-name="by balance">{n.reconciled}</td>
      <td>{unitWords(v.unit)}</td>
      {measured && <td class="number" data-name="correction">{n.correction}</td>}
      <td>{v.suspicion === null ? words : <b>{words}</b>}</td>
      {measured && <td class="where quiet">{v.signals.join(', ')}</td>}
    </tr>
  );
}
