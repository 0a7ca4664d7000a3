import { useSignal } from '@preact/signals';
import { useEffect, useMemo, useRef } from 'preact/hooks';
import { useLocation, useSearch } from 'wouter-preact';
import { addresses } from '../api/addresses';
import { RequestFailure } from '../api/request';
import { quantities, type Cleaning, type Effect, type Quantity, type Trend } from '../api/types';
import { useResource } from '../api/use-resource';
import { saveCsv } from '../chart/save';
import { columns, type Columns } from '../chart/trend';
import { TrendChart } from '../chart/TrendChart';
import { useSettled } from '../chart/use-settled';
import { readView, spanOf, viewOf, writeView, type Span } from '../chart/view';
import { ViewButtons } from '../chart/ViewButtons';
import { Shown } from '../parts/Waiting';
import { useNarrow } from '../parts/use-narrow';
import { calmNow } from '../site/clock';
import { zone } from '../site/state';
import { quantityWords } from '../words/quantity';
import { limitOf, latestLabel } from '../chart/labels';

const points = 2000;
const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** The coefficient over time, and a chosen quantity under it. The address bar says what is shown. */
export function EffectTrends({ effect, cleanings, version }: { effect: Effect; cleanings: Cleaning[]; version: string }) {
  const search = useSearch();
  const [path, navigate] = useLocation();
  const view = readView(search);
  const moving = useSignal<Span | null>(null);
  useEffect(() => { moving.value = null; }, [search]);
  const span = moving.value ?? spanOf(view, calmNow.value);
  const narrow = useNarrow();
  const failure = useSignal<string | null>(null);

  const write = (next: Span, replace: boolean) => navigate(path + writeView(viewOf(next, view.quantity, calmNow.peek())), { replace });
  // Fingers and keys move faster than browsers let the address change; it follows when they rest.
  const rest = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => () => clearTimeout(rest.current), []);
  const show = (next: Span, settled: boolean) => {
    clearTimeout(rest.current);
    moving.value = settled ? null : next;
    if (settled) write(next, false);
    else rest.current = setTimeout(() => write(next, true), 300);
  };
  const reset = () => { clearTimeout(rest.current); moving.value = null; navigate(path + writeView({ from: null, to: null, quantity: view.quantity })); };
  const settled = useSettled(`${span.from} ${span.to}`, 250).split(' ').map(Number) as [number, number];
  const address = (q: Quantity) => addresses.trend(effect.line, effect.name, q, settled[0], settled[1], points);

  const coefficient = useTrend(address('coefficient'), 'coefficient', version);
  const clean = useTrend(address('clean_coefficient'), 'clean', version);
  const other = useTrend(address(view.quantity), view.quantity, version);

  const chart = (quantity: Quantity, shown: Columns, busy: boolean, main: boolean) => {
    const name = `${effect.line}-${effect.name}-${quantity}`;
    return <TrendChart title={`${capital(quantityWords[quantity].name)} of ${effect.name}, ${shown.unit}`} name={name} height={main ? (narrow ? 290 : 350) : (narrow ? 190 : 210)} busy={busy}
      model={{
        columns: shown, clean: main ? clean.columns : null, limit: limitOf(quantity, effect), cleanings, span, zone: zone.value,
        lane: main, latest: latestLabel(shown, span, narrow, calmNow.peek()), narrow,
      }}
      show={show} reset={reset} csv={() => {
        failure.value = null;
        saveCsv(address(quantity), name).catch((error: unknown) => { failure.value = error instanceof RequestFailure ? error.message : String(error); });
      }} />;
  };

  return (
    <section class="line trends" aria-labelledby="trends">
      <h2 class="line-name" id="trends">Trend</h2>
      <div>
        <ViewButtons span={span} now={calmNow.value} show={show} reset={reset} />
        {failure.value && <p class="wrong" role="alert">The CSV could not be made: {failure.value}.</p>}
        <Shown of={coefficient.resource} what="The coefficient">{() => chart('coefficient', coefficient.columns!, coefficient.busy, true)}</Shown>
        {clean.resource.state.value.failure && <p class="quiet">The clean expectation is not drawn: {clean.resource.state.value.failure.words}. It is tried again by itself.</p>}
        <label class="picker">Below it <select value={view.quantity}
          onChange={e => navigate(path + writeView({ ...view, quantity: e.currentTarget.value as Quantity }), { replace: true })}>
          {quantities.filter(q => q !== 'coefficient').map(q => <option key={q} value={q}>{quantityWords[q].name}</option>)}
        </select></label>
        <Shown key={view.quantity} of={other.resource} what="The series">{t => chart(t.quantity, other.columns!, other.busy, false)}</Shown>
      </div>
    </section>
  );
}

function useTrend(address: string, subject: string, version: string) {
  const resource = useResource<Trend>(address, subject);
  useEffect(() => { if (resource.state.peek().value) void resource.load(); }, [version]);
  const { value, loadingSince } = resource.state.value;
  const mapped = useMemo(() => value && columns(value), [value]);
  return { resource, columns: mapped, busy: loadingSince !== null };
}
