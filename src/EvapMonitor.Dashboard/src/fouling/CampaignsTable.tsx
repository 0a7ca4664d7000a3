import { useSignal } from '@preact/signals';
import type { Campaign } from '../api/types';
import { Scroller } from '../parts/Scroller';
import { zone } from '../site/state';
import { rateOf } from '../words/fouling';
import { fixed } from '../words/number';
import { percent, resistance, resistanceUnit } from '../words/resistance';
import { moment } from '../words/time';

const first = 8;

/** Campaigns, the newest first. `bodies`: surfaces take turns in this effect, so each row names its own. */
export function CampaignsTable({ all, bodies, now }: { all: readonly Campaign[]; bodies: boolean; now: number }) {
  const most = useSignal(first);
  const products = all.some(c => c.products.length > 0 && c.products.join() !== all[0]!.products.join()) || (all[0]?.products.length ?? 0) > 1;
  return (
    <>
      <Scroller label="Table of campaigns">
        <table class="campaigns stacked">
          <caption>Resistances in {resistanceUnit}, ± one standard uncertainty; growth in a day or a week of production</caption>
          <thead><tr>{bodies && <th scope="col">body</th>}<th scope="col">from</th><th scope="col">to</th><th scope="col">began with</th><th scope="col">removed then</th>
            <th scope="col">at first</th><th scope="col">at its end</th><th scope="col">growth</th><th scope="col">produced</th>{products && <th scope="col">products</th>}</tr></thead>
          <tbody>{all.slice(0, most.value).map(c => {
            const rate = rateOf(c);
            return <tr key={`${c.surface} ${c.start}`} class={c.end === null ? 'present' : undefined}>
              {bodies && <td data-name="body">{c.surface}</td>}
              <th scope="row" class="time">{moment(Date.parse(c.start), zone.value, now)}</th>
              <td class="time" data-name="to">{c.end === null ? <b>goes on</b> : moment(Date.parse(c.end), zone.value, now)}</td>
              <td data-name="began with">{begun(c)}</td>
              <td class="number" data-name="removed then">{c.removed_share === null ? 'not known' : percent(c.removed_share)}</td>
              <td class="number" data-name="at first">{resistance(c.initial_resistance_m2k_w) ?? 'not known'}</td>
              <td class="number" data-name="at its end">{resistance(c.final_resistance_m2k_w) ?? 'not known'}</td>
              <td class="number" data-name="growth">{rate === null ? 'not known' : rate.grows === null ? `none told (${rate.words.replace(` ${resistanceUnit}`, '')})` : rate.words.replace(` ${resistanceUnit}`, '')}</td>
              <td class="number" data-name="produced">{fixed(c.production_hours)} h{c.hours_since_cleaned > c.production_hours + 1 && <> ({fixed(c.hours_since_cleaned)} h since it was clean)</>}</td>
              {products && <td data-name="products">{c.products.join(', ') || 'not told'}</td>}
            </tr>;
          })}</tbody>
        </table>
      </Scroller>
      {all.length > most.value && <button type="button" class="more" onClick={() => { most.value += 100; }}>Show {Math.min(100, all.length - most.value)} earlier ones</button>}
    </>
  );
}

/** What it began with; how sure that is, where it is not. */
function begun(c: Campaign): string {
  const what = c.started_by === 'logged' ? 'logged cleaning' : c.started_by === 'signal' ? 'cleaning by signal' : c.started_by === 'recognised' ? 'recognised cleaning' : 'first data';
  return c.started_by !== 'first data' && c.confidence < 0.995 ? `${what} (${percent(c.confidence)} sure)` : what;
}
