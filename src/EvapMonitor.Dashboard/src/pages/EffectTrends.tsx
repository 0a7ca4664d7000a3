import { useSignal } from '@preact/signals';
import { useMemo } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure } from '../api/request';
import { quantities, type Cleaning, type Effect, type Quantity, type Stop } from '../api/types';
import { laneMarks } from '../chart/lane';
import { latestLabel, limitOf } from '../chart/labels';
import { saveCsv } from '../chart/save';
import type { Columns } from '../chart/trend';
import { TrendChart } from '../chart/TrendChart';
import { useSpan } from '../chart/use-span';
import { useTrend } from '../chart/use-trend';
import { standing } from '../chart/view';
import { ViewButtons } from '../chart/ViewButtons';
import { Condition, conditionsOf } from '../fouling/Conditions';
import { LaneKey } from '../fouling/LaneKey';
import { Shown } from '../parts/Waiting';
import { useNarrow } from '../parts/use-narrow';
import { calmNow } from '../site/clock';
import { zone } from '../site/state';
import { restsOn } from '../words/expectation';
import { rateOf } from '../words/fouling';
import { quantityWords } from '../words/quantity';

/** So many points a series are asked for; panels are lower, so fewer tell as much. */
const points = 2000, panelPoints = 800;
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
type Size = 'large' | 'middle' | 'small';
const heights: Record<Size, [wide: number, narrow: number]> = { large: [350, 290], middle: [230, 210], small: [104, 104] };

/** Coefficient, resistance and conditions over one time axis. The address bar says what is shown. */
export function EffectTrends({ effect, cleanings, stops, version }: { effect: Effect; cleanings: readonly Cleaning[]; stops: readonly Stop[]; version: string }) {
  const { span, settled, quantity: another, show, reset, choose } = useSpan();
  const narrow = useNarrow(), now = calmNow.value;
  const failure = useSignal<string | null>(null);
  const marks = useMemo(() => laneMarks(cleanings, stops), [cleanings, stops]);
  const address = (q: Quantity, most = points) => addresses.trend(effect.line, effect.name, q, settled.from, settled.to, most);
  const coefficient = useTrend(address('coefficient'), 'coefficient', version);
  const clean = useTrend(address('clean_coefficient'), 'clean', version);
  const resistance = useTrend(address('fouling_resistance'), 'resistance', version);

  const chart = (quantity: Quantity, shown: Columns, busy: boolean, size: Size, times: boolean) => {
    const name = `${effect.line}-${effect.name}-${quantity}`;
    return <TrendChart title={`${capital(quantityWords[quantity].name)} of ${effect.name}, ${shown.unit}`} name={name} height={heights[size][narrow ? 1 : 0] + (size === 'small' && times ? 36 : 0)} small={size === 'small'} busy={busy}
      model={{
        columns: shown, clean: size === 'large' ? clean.columns : null, limit: limitOf(quantity, effect), marks, span, zone: zone.value, lane: size === 'large',
        zero: quantity === 'fouling_resistance', times, most: size === 'small' ? 3 : 5, latest: latestLabel(shown, span, narrow, calmNow.peek()), narrow,
      }}
      show={show} reset={reset} csv={() => {
        failure.value = null;
        saveCsv(address(quantity), name).catch((error: unknown) => { failure.value = error instanceof RequestFailure ? error.message : String(error); });
      }} />;
  };
  const conditions = conditionsOf(effect);
  const rate = effect.campaign && rateOf(effect.campaign);
  const source = effect.now?.clean_from ?? null;

  return (
    <section class="line trends" aria-labelledby="trends">
      <h2 class="line-name" id="trends">Trend</h2>
      <div>
        <ViewButtons span={span} now={now} show={show} reset={reset} campaign={effect.campaign && Date.parse(effect.campaign.start)} />
        {failure.value && <p class="wrong" role="alert">The CSV could not be made: {failure.value}.</p>}
        <Shown of={coefficient.resource} what="The coefficient">{() => chart('coefficient', coefficient.columns!, coefficient.busy, 'large', true)}</Shown>
        <LaneKey marks={marks} span={span} />
        {clean.resource.state.value.failure
          ? <p class="quiet">The clean expectation is not drawn: {clean.resource.state.value.failure.words}. It is tried again by itself.</p>
          : source !== null && <p class="legend-small">Dashed, if clean: {restsOn(source, zone.value, now)}. Band: ± one standard uncertainty.</p>}
        <Shown of={resistance.resource} what="The fouling resistance">{() => chart('fouling_resistance', resistance.columns!, resistance.busy, 'middle', true)}</Shown>
        {rate && <p class="legend-small">{rate.grows === null ? `In this campaign no growth can be told: ${rate.words} of production.` : `In this campaign it ${rate.grows ? 'grows' : 'changes'} by ${rate.words} of production.`}</p>}
        <h3 class="panels-name">Conditions</h3>
        <div class="panels">
          {conditions.map((q, i) => <Condition key={q} quantity={q} address={address(q, panelPoints)} version={version}>
            {(shown, busy) => chart(q, shown, busy, 'small', i === conditions.length - 1)}
          </Condition>)}
        </div>
        <label class="picker">One more below <select value={another ?? ''} onChange={e => choose(quantities.find(q => q === e.currentTarget.value) ?? null)}>
          <option value="">none</option>
          {quantities.filter(q => !standing.includes(q) && !conditions.includes(q)).map(q => <option key={q} value={q}>{quantityWords[q].name}</option>)}
        </select></label>
        {another !== null && <div class="another"><Condition key={another} quantity={another} address={address(another)} version={version}>{(shown, busy) => chart(another, shown, busy, 'middle', true)}</Condition></div>}
      </div>
    </section>
  );
}
