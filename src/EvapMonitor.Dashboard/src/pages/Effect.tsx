import { useEffect } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { addresses, pages } from '../api/addresses';
import type { Cleaning, Effect } from '../api/types';
import { useResource } from '../api/use-resource';
import { Bore } from '../bore/Bore';
import { weeksPerStratum } from '../bore/deposit';
import { CleaningForm } from '../cleaning/CleaningForm';
import { CleaningsTable } from '../parts/CleaningsTable';
import { LimitsTable } from '../parts/LimitsTable';
import { NowTable } from '../parts/NowTable';
import { Shown } from '../parts/Waiting';
import { Words } from '../parts/Words';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { cleaningsChanged, lines, resultsChanged, zone } from '../site/state';
import { aged } from '../words/aged';
import { effectWords } from '../words/effect';
import { EffectTrends } from './EffectTrends';
import { NotHere } from './NotHere';

/** How fast does it foul, is it fouling at all? */
export function EffectPage({ line, effect }: { line: string; effect: string }) {
  useTitle(`${effect}, ${line}`);
  const one = useResource<Effect>(addresses.effect(line, effect));
  const cleanings = useResource<{ cleanings: Cleaning[] }>(addresses.cleanings(line, effect));
  const results = resultsChanged.value[line], logged = cleaningsChanged.value;
  useEffect(() => { if (one.state.peek().value) void one.load(); }, [results, logged]);
  useEffect(() => { if (cleanings.state.peek().value) void cleanings.load(); }, [logged]);
  if (one.state.value.failure?.status === 404) return <NotHere />;
  return (
    <Shown of={one} what="The effect">
      {e => <>
        <Head effect={e} />
        <EffectTrends effect={e} cleanings={cleanings.state.value.value?.cleanings ?? []} version={`${results ?? 0} ${logged}`} />
        <section class="line" aria-labelledby="now"><h2 class="line-name" id="now">Now</h2><div><NowTable effect={e} now={calmNow.value} /></div></section>
        <section class="line" aria-labelledby="cleanings">
          <h2 class="line-name" id="cleanings">Cleanings</h2>
          <div>
            <Shown of={cleanings} what="The cleanings">
              {({ cleanings: all }) => (all.length === 0 ? <p class="quiet">No cleaning of {e.name} is logged.</p>
                : <CleaningsTable all={all} now={calmNow.value} everywhere={false} />)}
            </Shown>
            <details class="log"><summary>Log a cleaning of {e.name}</summary>
              <CleaningForm lines={lines.state.value.value?.lines ?? []} chosen={{ line, effect }} />
            </details>
          </div>
        </section>
      </>}
    </Shown>
  );
}

function Head({ effect }: { effect: Effect }) {
  const now = calmNow.value;
  const found = lines.state.value.value?.lines.find(l => l.name === effect.line);
  const line = found && aged(found, now);
  const readings = line?.readings ?? 'live';
  const latest = line?.latest_reading_at ? Date.parse(line.latest_reading_at) : null;
  return (
    <section class="line head">
      <div>
        <h1 class="line-name">{effect.name}</h1>
        <p class="quiet"><Link href={pages.line(effect.line)}>{effect.line}</Link></p>
      </div>
      <div>
        <Words pieces={effectWords(effect, readings, latest, now, zone.value)} />
        <div class="head-row">
          <Bore effect={effect} radius={64} now={now} stale={readings !== 'live'} weeks={weeksPerStratum([effect])} />
          <LimitsTable effect={effect} now={now} fresh={readings === 'live'} />
        </div>
        <p class="legend-small">Ring thickness stands for fouling resistance; not to scale, not a flow restriction.</p>
      </div>
    </section>
  );
}
