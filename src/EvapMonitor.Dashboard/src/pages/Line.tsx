import { useEffect, useMemo } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { addresses, pages } from '../api/addresses';
import type { FlowSheet } from '../api/types';
import { useResource } from '../api/use-resource';
import { BalancePart } from '../balance/BalancePart';
import { ColumnsTable } from '../descent/ColumnsTable';
import { DescentFigure } from '../descent/DescentFigure';
import { fallsOf, liftsOf, type Fall } from '../descent/descent';
import { RowsTables } from '../descent/RowsTables';
import { useRegularly } from '../instruments/use-regularly';
import { Scroller } from '../parts/Scroller';
import { useNarrow } from '../parts/use-narrow';
import { useTitle } from '../parts/use-title';
import { useWidth } from '../parts/use-width';
import { Shown } from '../parts/Waiting';
import { Words } from '../parts/Words';
import { FlowSheetFigure } from '../sheet/FlowSheetFigure';
import { layout } from '../sheet/layout';
import { acrossThePage, downThePage } from '../sheet/metrics';
import { columnsOf } from '../sheet/order';
import { Readings } from '../sheet/Readings';
import { every } from '../sheet/words';
import { calmNow } from '../site/clock';
import { cleaningsChanged, lines, resultsChanged, site, zone } from '../site/state';
import { aged } from '../words/aged';
import { lineWords } from '../words/line';
import { fullMoment, moment } from '../words/time';
import { NotHere } from './NotHere';
import '../styles/line.css';

/** Where do heat, water and kelvins go? */
export function LinePage({ line }: { line: string }) {
  useTitle(line);
  const one = useResource<FlowSheet>(addresses.flowSheet(line), line);
  const results = resultsChanged.value[line], logged = cleaningsChanged.value;
  useEffect(() => { if (one.state.peek().value) void one.load(); }, [results, logged]);
  useRegularly(() => void one.load(), 30_000);
  if (one.state.value.failure?.status === 404) return <NotHere />;
  return <Shown of={one} what="The line">{sheet => <><Head line={line} /><Pictures of={sheet} /></>}</Shown>;
}

function Head({ line }: { line: string }) {
  const now = calmNow.value, found = lines.state.value.value?.lines.find(l => l.name === line), known = found && aged(found, now);
  return (
    <section class="line line-head">
      <div>
        <h1 class="line-name">{line}</h1>
        <p class="quiet"><Link href={`${pages.lines}#line.${encodeURIComponent(line)}`}>All lines</Link></p>
      </div>
      {known && <div>
        <Words pieces={lineWords(known, now, zone.value)} />
        <p class="quiet">
          {known.liquor ?? 'liquor told by a signal'}; {known.state === 'unknown' ? 'running state not known' : known.state}
          {known.as_of && <>; results of the hour to {moment(Date.parse(known.as_of), zone.value, now)}</>}
        </p>
      </div>}
    </section>
  );
}

function Pictures({ of }: { of: FlowSheet }) {
  const [frame, width] = useWidth<HTMLDivElement>();
  const narrow = useNarrow(), now = calmNow.value;
  const falls = useMemo(() => fallsOf(of), [of]), lifts = useMemo(() => liftsOf(of, falls), [of, falls]);
  const sheet = useMemo(() => (width === 0 ? null : layout(of, narrow ? downThePage() : acrossThePage(columnsOf(of).length, width))), [of, narrow, width]);
  const stale = of.readings !== 'live' || (of.latest_reading_at !== null && now - Date.parse(of.latest_reading_at) > 17 * 60_000);
  const asOf = of.as_of === null ? 'no result yet' : `hour to ${moment(Date.parse(of.as_of), zone.value, now)}`;
  return (
    <>
      <section class="page line-pictures" aria-label="The line drawn and in numbers">
        <div ref={frame}>
          {sheet && (narrow
            ? <>
              <FlowSheetFigure of={of} sheet={sheet} stale={stale} />
              <DescentFigure of={of} columns={sheet.columns} metrics={sheet.metrics} falls={falls} lifts={lifts} width={width} />
              <RowsTables line={of.line} columns={sheet.columns} falls={falls} lifts={lifts} asOf={asOf} />
            </>
            : <Scroller label={`${of.line}, drawn and in numbers`}>
              <FlowSheetFigure of={of} sheet={sheet} stale={stale} />
              <DescentFigure of={of} columns={sheet.columns} metrics={sheet.metrics} falls={falls} lifts={lifts} width={sheet.width} />
              <ColumnsTable line={of.line} columns={sheet.columns} falls={falls} lifts={lifts} asOf={asOf} metrics={sheet.metrics} width={sheet.width} />
            </Scroller>)}
        </div>
        <Reasons falls={[...falls.values()]} />
        <p class="legend-small">{asOf === 'no result yet' ? 'No hour has a result yet.' : `Mean of the ${asOf}; ± one standard uncertainty.`} Scale takes the heat flux times the fouling resistance: the kelvins that the deposit costs; less than their uncertainty is not drawn.
          {[...falls.values()].some(f => f.lossStated) && ' A line loss in brackets is not measured: that chest has no gauge, and the plant file says what is lost on the way to it.'}</p>
      </section>
      {/* Without a result there is no balance either, and the reasons stand above. */}
      {of.as_of !== null && <section class="page line-balance" aria-label="The balance of the line">
        {/* On paper the balance is a sheet of its own, which may be parted from the first. */}
        <p class="paper-only" aria-hidden="true">{of.line}, {site.state.value.value?.name}, {fullMoment(Date.parse(of.as_of), zone.value)}</p>
        <BalancePart line={of.line} changes={of.as_of} now={now} />
      </section>}
      <section class="page line-readings"><Readings of={of} now={now} /></section>
    </>
  );
}

/** Why a coefficient is missing, said once for all effects with the same reason. */
function Reasons({ falls }: { falls: Fall[] }) {
  const names = new Map<string, string[]>();
  for (const f of falls) if (f.reason !== null) names.set(f.reason, [...names.get(f.reason) ?? [], f.effect.name]);
  if (names.size === 0) return null;
  return <ul class="reasons">{[...names].map(([reason, all]) => <li key={reason}><b>{every(all)} {all.length === 1 ? 'has' : 'have'} no coefficient</b>: {reason}.</li>)}</ul>;
}
