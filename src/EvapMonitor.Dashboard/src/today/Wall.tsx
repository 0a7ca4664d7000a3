import { useEffect, useState } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Effect, Line } from '../api/types';
import { Bore } from '../bore/Bore';
import { depositOf, weeksPerStratum } from '../bore/deposit';
import { Mark } from '../bore/Mark';
import { connection } from '../live/connection';
import { useTitle } from '../parts/use-title';
import { calmNow, now, serviceTime } from '../site/clock';
import { lines, notices, site, zone } from '../site/state';
import { ofWallPage, wallPage, wallPages } from '../site/wall';
import { aged } from '../words/aged';
import { dueWords } from '../words/due';
import { age, duration } from '../words/duration';
import { firstSentences, wallFirst, type First } from '../words/first';
import { siteWords } from '../words/site';
import { dayAndClock, moment } from '../words/time';

/** As many lines of alerts as a wall can carry beside six lines of effects. */
const alertsShown = 3;

/** Today for a wall screen: six lines a page, cut every 20 s; alerts, clock and data age stand still above them. */
export function Wall() {
  useTitle('Today on the wall');
  const [held, hold] = useState<number | null>(null);
  useEffect(() => {
    document.documentElement.classList.add('on-wall');
    return () => document.documentElement.classList.remove('on-wall');
  }, []);
  const at = calmNow.value, all = (lines.state.value.value?.lines ?? []).map(l => aged(l, at));
  const page = held ?? wallPage(all.length, at), shown = ofWallPage(all, page);
  const weeks = weeksPerStratum(all.flatMap(l => l.effects));
  return (
    <div class="wall">
      <Top />
      <Alerts all={firstSentences(notices.value, all, [], at, zone.value, Infinity).first} />
      {all.length === 0
        ? <p class="wall-empty">{lines.state.value.failure === null ? 'The lines are on the way.' : `The lines could not be fetched: ${lines.state.value.failure.words}. It is tried again by itself.`}</p>
        : <div class="wall-lines" style={{ gridTemplateRows: `repeat(${shown.length}, minmax(0, 1fr))` }}>{shown.map(l => <Row key={l.name} line={l} now={at} weeks={weeks} />)}</div>}
      <footer class="wall-foot">
        <p>{all.length > 0 && siteWords(all).map(p => p.text).join('')}</p>
        {wallPages(all.length) > 1 && <>
          <p>page {page + 1} of {wallPages(all.length)}</p>
          <button type="button" aria-pressed={held !== null} onClick={() => hold(held === null ? page : null)}>{held === null ? 'Hold' : 'Held'}</button>
        </>}
        <Link href={pages.today}>Leave</Link>
      </footer>
    </div>
  );
}

function Top() {
  const known = site.state.value.value;
  return (
    <header class="wall-top">
      <h1>{known?.name ?? 'EvapMonitor'}</h1>
      {known && <p><span class={known.readings === 'live' ? undefined : 'stale'}>{age(known.latest_reading_at === null ? null : Date.parse(known.latest_reading_at), now.value)}</span>
        {' · '}{dayAndClock(now.value, zone.value)}</p>}
    </header>
  );
}

/** The bold clause of each sentence; a lost connection comes before all. */
function Alerts({ all }: { all: First[] }) {
  const state = connection.value, since = state.state === 'lost' ? serviceTime(state.since) : null;
  const lost = since !== null && now.value - since >= 3000;
  const { full, also } = wallFirst(all, alertsShown - (lost ? 1 : 0));
  if (!lost && all.length === 0) return null;
  return (
    <div class="wall-alerts">
      {lost && <p><span><b>The connection to the service is lost</b> since {moment(since, zone.value, now.value)}; all this is as of then.</span></p>}
      {full.map(f => <p key={f.key}>{f.act && <Mark kind="now" />}<span>{f.line !== null && `${f.line}: `}<b>{clause(f)}</b></span></p>)}
      {also !== '' && <p>{also}</p>}
    </div>
  );
}

const clause = (f: First) => f.pieces.find(p => p.bold)?.text ?? f.pieces.map(p => p.text).join('');

function Row({ line, now: at, weeks }: { line: Line; now: number; weeks: 1 | 4 }) {
  const stale = line.readings !== 'live';
  return (
    <section class="wall-line" aria-label={line.name}>
      <div class="wall-name">
        <h2>{line.name}</h2>
        {stale && <p><b>{line.latest_reading_at === null ? 'no reading yet' : `silent ${duration(at - Date.parse(line.latest_reading_at))}`}</b></p>}
      </div>
      <ul>{line.effects.map(e => <li key={e.name}><Bore effect={e} radius={30} stale={stale} weeks={weeks} />
        <p><b>{e.name}</b><br /><State effect={e} now={at} stale={stale} /></p></li>)}</ul>
    </section>
  );
}

/** An effect in a word or a number: what is due, else the share of the clean coefficient. Of a silent line no number, which would pass for news across a room. */
function State({ effect, now: at, stale }: { effect: Effect; now: number; stale: boolean }) {
  const { mark } = dueWords(effect, at, !stale), share = effect.now?.cleanliness ?? null;
  if (mark === 'now') return <span class={stale ? undefined : 'due-now'}>{stale ? 'was due' : 'due'}</span>;
  if (mark === 'cleaning') return <>cleaning</>;
  if (mark === 'unknown' || share === null || depositOf(effect, 1) === null) return <>unknown</>;
  return stale ? null : <>{Math.round(share * 100)} %</>;
}
