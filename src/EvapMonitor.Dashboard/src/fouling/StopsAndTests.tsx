import type { Campaigns } from '../api/types';
import { Scroller } from '../parts/Scroller';
import { zone } from '../site/state';
import { count, measured } from '../words/number';
import { resistance, resistanceUnit } from '../words/resistance';
import { duration } from '../words/duration';
import { moment } from '../words/time';

/** Times out of production that cleaned nothing, and runs on water; quieter than campaigns. */
export function StopsAndTests({ of, bodies, now }: { of: Campaigns; bodies: boolean; now: number }) {
  if (of.stops.length === 0 && of.water_tests.length === 0) return null;
  const heads = [of.stops.length > 0 && count(of.stops.length, 'stop'), of.water_tests.length > 0 && count(of.water_tests.length, 'test on water', 'tests on water')].filter(Boolean);
  return (
    <details class="fold"><summary>{heads.join(' and ')}</summary>
      {of.stops.length > 0 && <Scroller label="Table of stops"><table class="stacked">
        <caption>Stops: out of production, and the surface was as before</caption>
        <thead><tr>{bodies && <th scope="col">body</th>}<th scope="col">from</th><th scope="col">lasted</th><th scope="col">why no cleaning</th></tr></thead>
        <tbody>{of.stops.map(s => <tr key={`${s.surface} ${s.start}`}>
          {bodies && <td data-name="body">{s.surface}</td>}<th scope="row" class="time">{moment(Date.parse(s.start), zone.value, now)}</th>
          <td class="time" data-name="lasted">{duration((s.end === null ? now : Date.parse(s.end)) - Date.parse(s.start))}{s.end === null && ', goes on'}</td><td data-name="why no cleaning">{s.reason}</td>
        </tr>)}</tbody>
      </table></Scroller>}
      {of.water_tests.length > 0 && <Scroller label="Table of tests on water"><table class="stacked">
        <caption>Tests on water: without solids or elevation the coefficient tells of the surface alone</caption>
        <thead><tr>{bodies && <th scope="col">body</th>}<th scope="col">from</th><th scope="col">lasted</th><th scope="col">coefficient on water, W/(m²·K)</th><th scope="col">resistance since the test before, {resistanceUnit}</th></tr></thead>
        <tbody>{of.water_tests.map(t => <tr key={`${t.surface} ${t.start}`}>
          {bodies && <td data-name="body">{t.surface}</td>}<th scope="row" class="time">{moment(Date.parse(t.start), zone.value, now)}</th>
          <td class="time" data-name="lasted">{duration(Date.parse(t.end) - Date.parse(t.start))}</td>
          <td class="number" data-name="coefficient on water">{t.coefficient_w_m2k.value === null ? 'not known' : measured(t.coefficient_w_m2k.value, t.coefficient_w_m2k.u)}</td>
          <td class="number" data-name="since the test before">{resistance(t.resistance_since_previous_m2k_w) ?? 'no test before'}</td>
        </tr>)}</tbody>
      </table></Scroller>}
    </details>
  );
}
