import type { Effect, HourResult } from '../api/types';
import { zone } from '../site/state';
import { restsOn } from '../words/expectation';
import { fixed, measured } from '../words/number';
import { moment } from '../words/time';

/** `clean`: it needs the clean expectation, whose words say why it is absent where the hour itself has a coefficient. */
interface Row { name: string; value: number | null; u: number | null; unit: string; factor?: number; decimals?: number; from?: string | null; clean?: true }

const rows = (n: HourResult, now: number): Row[] => [
  { name: 'apparent coefficient', value: n.coefficient_w_m2k, u: n.coefficient_u, unit: 'W/(m²·K)' },
  { name: 'coefficient if clean', value: n.clean_coefficient_w_m2k, u: n.clean_coefficient_u, unit: 'W/(m²·K)', from: n.clean_from && restsOn(n.clean_from, zone.value, now), clean: true },
  { name: 'cleanliness', value: n.cleanliness, u: n.cleanliness_u, unit: '%', factor: 100, clean: true },
  { name: 'fouling resistance', value: n.fouling_resistance_m2k_w, u: n.fouling_resistance_u, unit: 'm²·K/kW', factor: 1000, clean: true },
  { name: 'coefficient at the reference conditions', value: n.coefficient_at_reference_w_m2k, u: n.coefficient_at_reference_u, unit: 'W/(m²·K)', clean: true },
  { name: 'driving force', value: n.driving_force_k, u: n.driving_force_u, unit: 'K' },
  ...(n.head_corrected_driving_force_k === null ? [] : [{
    name: 'driving force at half the liquor’s height', value: n.head_corrected_driving_force_k, u: n.head_corrected_driving_force_u, unit: 'K',
  }]),
  { name: 'duty', value: n.duty_kw, u: n.duty_u, unit: 'kW', from: n.duty_from },
  { name: 'heat flux', value: n.heat_flux_kw_m2, u: null, unit: 'kW/m²', decimals: 1 },
  { name: 'heating temperature', value: n.heating_temperature_c, u: null, unit: '°C', decimals: 1, from: n.heating_temperature_from },
  { name: 'boiling temperature', value: n.boiling_temperature_c, u: null, unit: '°C', decimals: 1, from: n.boiling_temperature_from },
  { name: 'boiling-point elevation', value: n.elevation_k, u: null, unit: 'K', decimals: 1 },
];

/** The latest hour's numbers with uncertainty and origin; where one is absent, why. */
export function NowTable({ effect, now }: { effect: Effect; now: number }) {
  const n = effect.now;
  if (n === null) return <p class="quiet">No hour has a result yet. Results follow as soon as readings of this effect are evaluated.</p>;
  const all = rows(n, now), why = (r: Row) => (r.clean && n.coefficient_w_m2k !== null ? n.clean_from ?? n.reason : n.reason) ?? 'the reason was not given';
  return (
    <table class="now">
      <caption>Mean of {n.hours === 1 ? 'the hour' : `${n.hours} hours`} from {moment(Date.parse(n.at), zone.value, now)}; ± one standard uncertainty; area {effect.area_m2} m²</caption>
      <thead class="unseen"><tr><th scope="col">quantity</th><th scope="col">value</th><th scope="col">unit</th><th scope="col">from</th></tr></thead>
      <tbody>{all.map((r, i) => {
        const factor = r.factor ?? 1, said = all.slice(0, i).some(other => other.value === null && why(other) === why(r));
        return <tr key={r.name}>
          <th scope="row">{r.name}</th>
          {r.value === null
            ? <td colSpan={3} class="absent">{said ? 'none, for the same reason' : `none: ${why(r)}`}</td>
            : <><td class="number"><b>{r.decimals !== undefined ? fixed(r.value, r.decimals) : measured(r.value * factor, r.u === null ? null : r.u * factor)}</b></td><td>{r.unit}</td><td class="quiet">{r.from && `from ${r.from}`}</td></>}
        </tr>;
      })}</tbody>
    </table>
  );
}
