import type { CleanReference, Effect } from '../api/types';
import { zone } from '../site/state';
import { exponentRows, withDates } from '../words/expectation';
import { measured } from '../words/number';

/** What the clean expectation rests on, in plain words; one part for each product. */
export function CleanBasis({ effect, of, now }: { effect: Effect; of: readonly CleanReference[]; now: number }) {
  return (
    <details class="fold"><summary>What the clean expectation rests on</summary>
      <p class="words">The coefficient of a clean surface moves with solids, boiling temperature and heat flux. What {effect.name} would do if clean is taken from the hours after its cleanings, at
        the conditions of each hour; cleanliness and fouling resistance are held against that.</p>
      {of.length === 0 && <p class="words">Nothing is learnt for the present campaign yet{effect.now?.clean_from ? `; in use is the ${withDates(effect.now.clean_from, zone.value, now)}` : ''}.</p>}
      {of.map(r => <section key={`${r.surface} ${r.product}`} class="basis">
        <h3>{[r.surface !== effect.name && r.surface, r.product || 'all products'].filter(Boolean).join(', ')}</h3>
        {r.coefficient_w_m2k.value === null
          ? <p class="words">No clean coefficient: {withDates(r.source, zone.value, now)}.</p>
          : <p class="words"><b>{measured(r.coefficient_w_m2k.value, r.coefficient_w_m2k.u)} W/(m²·K)</b> at the reference conditions, from the {withDates(r.source.split(';')[0]!, zone.value, now)}.
            {learnt(r.source) !== null && ` ${learnt(r.source)}.`}</p>}
        <table class="stacked">
          <thead><tr><th scope="col">condition</th><th scope="col">at the reference</th><th scope="col">exponent</th><th scope="col">what it means</th></tr></thead>
          <tbody>{exponentRows(r).map(row => <tr key={row.name}>
            <th scope="row">{row.name}</th><td data-name="at the reference">{row.reference || 'not set'}</td><td data-name="exponent">{row.exponent}</td><td data-name="means">{row.meaning}</td>
          </tr>)}</tbody>
        </table>
      </section>)}
      {of.length > 0 && <p class="legend-small">An exponent stands for ln U by ln of the condition; of the boiling temperature for ln U by K.</p>}
    </details>
  );
}

/** "Conditions learnt from 1645 hours of 72 days" of the service's words; null without it. */
function learnt(source: string): string | null {
  const found = /conditions learnt from [^:]+/.exec(source)?.[0];
  return found ? found.charAt(0).toUpperCase() + found.slice(1) : null;
}
