import type { FlowSheet, MeasuredNow } from '../api/types';
import { zone } from '../site/state';
import { duration } from '../words/duration';
import { raw } from '../words/number';
import { prettyUnit } from '../words/quantity';
import { moment } from '../words/time';

/** What is measured at each place now, with its signal; what is old or missing says so. */
export function Readings({ of, now }: { of: FlowSheet; now: number }) {
  const places = of.places.map(p => ({ p, all: [...p.measured, ...of.ways.filter(w => (w.from === p.id || w.to === p.id) && w.flow && w.kind === 'bleed' && p.kind !== 'effect').map(w => w.flow!)] })).filter(x => x.all.length > 0);
  const all = places.flatMap(x => x.all), unsound = all.filter(m => m.state !== 'good').length;
  if (all.length === 0) return <p class="quiet">The plant file names no instrument of this line.</p>;
  return (
    <details class="readings" open={unsound > 0 && unsound < 6}>
      <summary>Measured now at each place: {all.length} readings{unsound > 0 && <b>, {unsound} not sound</b>}</summary>
      <table class="readings-table">
        <thead><tr><th scope="col">place</th><th scope="col">measured</th><th scope="col" class="number">value</th><th scope="col">unit</th><th scope="col">signal</th><th scope="col">state</th></tr></thead>
        <tbody>{places.map(({ p, all: here }) => here.map((m, i) => <tr key={`${p.id} ${m.what}`}>
          {i === 0 && <th scope="rowgroup" rowSpan={here.length}>{p.name}{p.bodies.length > 0 && <span class="quiet"> {bodies(p.bodies)}</span>}</th>}
          <td>{m.what}</td><td class="number">{m.value === null ? '–' : raw(m.value)}</td><td>{prettyUnit(m.unit)}</td><td class="where quiet">{m.signal}</td><td>{state(m, now)}</td>
        </tr>))}</tbody>
      </table>
    </details>
  );
}

function state(m: MeasuredNow, now: number) {
  switch (m.state) {
    case 'good': return 'good';
    case 'uncertain': return <b>uncertain</b>;
    case 'bad': return <b>bad by its source</b>;
    case 'none': return <b>no reading yet</b>;
    case 'stale': return <b>{duration(now - Date.parse(m.at!))} old, since {moment(Date.parse(m.at!), zone.value, now)}</b>;
  }
}

/** "in B2, B8; not in B9; B7 not known". */
function bodies(all: { name: string; serving: boolean | null }[]): string {
  const named = (serving: boolean | null) => all.filter(b => b.serving === serving).map(b => b.name).join(', ');
  return [named(true) && `in ${named(true)}`, named(false) && `not in ${named(false)}`, named(null) && `${named(null)} not known`].filter(Boolean).join('; ');
}
