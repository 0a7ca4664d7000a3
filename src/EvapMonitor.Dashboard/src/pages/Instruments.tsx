import { addresses } from '../api/addresses';
import type { Signals } from '../api/types';
import { useResource } from '../api/use-resource';
import { Scroller } from '../parts/Scroller';
import { Shown } from '../parts/Waiting';
import { useTitle } from '../parts/use-title';
import { useEffect } from 'preact/hooks';
import { calmNow } from '../site/clock';
import { resultsChanged, zone } from '../site/state';
import { duration } from '../words/duration';
import { count, raw } from '../words/number';
import { prettyUnit } from '../words/quantity';
import { moment } from '../words/time';

const old = 15 * 60_000;

/** Can I trust the data? Every signal with its latest value, quality and age. */
export function Instruments() {
  useTitle('Instruments');
  const signals = useResource<Signals>(addresses.signals);
  const changes = resultsChanged.value;
  useEffect(() => { if (signals.state.peek().value) void signals.load(); }, [changes]);
  const now = calmNow.value;
  return (
    <section class="page">
      <h1 class="page-name">Instruments</h1>
      <Shown of={signals} what="The signals">
        {({ signals: all, unknown }) => {
          const silent = all.filter(s => s.latest_at === null || now - Date.parse(s.latest_at) > old).length;
          return <>
            {all.length === 0
              ? <p class="say">The plant file names no signal yet.</p>
              : <p class="say">{count(all.length, 'signal')}{silent > 0 ? <>, <b>{silent} of them without a reading in the last 15 min</b>.</> : ', every one with a reading in the last 15 min.'}</p>}
            {all.length > 0 && <Scroller label="Signals">
              <table>
                <thead><tr><th scope="col">signal</th><th scope="col">line</th><th scope="col" class="number">latest value</th><th scope="col">unit</th><th scope="col">quality</th><th scope="col">age</th></tr></thead>
                <tbody>{all.map(s => {
                  const at = s.latest_at === null ? null : Date.parse(s.latest_at);
                  return <tr key={s.name}>
                    <th scope="row" class="signal">{s.name}</th><td>{s.line ?? ''}</td>
                    <td class="number">{s.latest_value === null ? 'none' : raw(s.latest_value)}</td><td>{prettyUnit(s.unit ?? '')}</td>
                    <td>{s.latest_quality ?? ''}</td>
                    <td>{at === null ? 'never read' : now - at > old ? <b title={moment(at, zone.value, now)}>{duration(now - at)}</b> : duration(now - at)}</td>
                  </tr>;
                })}</tbody>
              </table>
            </Scroller>}
            {unknown.length > 0 && <>
              <h2>Signals that no plant file names</h2>
              <p class="quiet">Their readings are counted, not stored. Name them in the plant file, or stop sending them.</p>
              <Scroller label="Signals that no plant file names">
                <table>
                  <thead><tr><th scope="col">signal</th><th scope="col" class="number">readings</th><th scope="col">last seen</th></tr></thead>
                  <tbody>{unknown.map(u => <tr key={u.name}><th scope="row" class="signal">{u.name}</th><td class="number">{u.count}</td>
                    <td>{u.last_seen === null ? '' : moment(Date.parse(u.last_seen), zone.value, now)}</td></tr>)}</tbody>
                </table>
              </Scroller>
            </>}
          </>;
        }}
      </Shown>
    </section>
  );
}
