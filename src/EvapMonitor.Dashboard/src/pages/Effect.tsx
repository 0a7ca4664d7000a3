import { useEffect, useMemo } from 'preact/hooks';
import { Link } from 'wouter-preact';
import { addresses, pages } from '../api/addresses';
import type { Campaigns, Cleaning, Effect, Stop } from '../api/types';
import { useResource } from '../api/use-resource';
import { Bore } from '../bore/Bore';
import { weeksPerStratum } from '../bore/deposit';
import { CleaningForm } from '../cleaning/CleaningForm';
import { CampaignsPart } from '../fouling/CampaignsPart';
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
import { failedWords, foulingWords } from '../words/fouling';
import { EffectTrends } from './EffectTrends';
import { NotHere } from './NotHere';

const noCleanings: Cleaning[] = [], noStops: Stop[] = [];

/** How fast does it foul, is it fouling at all? */
export function EffectPage({ line, effect }: { line: string; effect: string }) {
  useTitle(`${effect}, ${line}`);
  const one = useResource<Effect>(addresses.effect(line, effect));
  const cleanings = useResource<{ cleanings: Cleaning[] }>(addresses.cleanings(line, effect));
  const campaigns = useResource<Campaigns>(addresses.campaigns(line, effect));
  const results = resultsChanged.value[line], logged = cleaningsChanged.value;
  useEffect(() => { if (one.state.peek().value) void one.load(); }, [results, logged]);
  useEffect(() => {
    for (const resource of [cleanings, campaigns]) if (resource.state.peek().value) void resource.load();
  }, [results, logged]);
  const known = campaigns.state.value.value;
  // Stops of bodies that serve elsewhere now say nothing of this effect.
  const stops = useMemo(() => (known === null ? noStops : known.stops.filter(s => s.surface === known.surface || s.surface === effect)), [known, effect]);
  if (one.state.value.failure?.status === 404) return <NotHere />;
  return (
    <Shown of={one} what="The effect">
      {e => <>
        <Head effect={e} />
        <EffectTrends effect={e} cleanings={cleanings.state.value.value?.cleanings ?? noCleanings} stops={stops} version={`${results ?? 0} ${logged}`} />
        <section class="line" aria-labelledby="now"><h2 class="line-name" id="now">Now</h2><div><NowTable effect={e} now={calmNow.value} /></div></section>
        <CampaignsPart effect={e} of={campaigns} now={calmNow.value} />
        <section class="line cleanings-part" aria-labelledby="cleanings">
          <h2 class="line-name" id="cleanings">Cleanings</h2>
          <div>
            <Shown of={cleanings} what="The cleanings">
              {({ cleanings: all }) => (all.length === 0 ? <p class="quiet">No cleaning of {e.name} is known.</p>
                : <CleaningsTable all={all} now={calmNow.value} everywhere={false} first={10} />)}
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
  const failed = failedWords(effect, zone.value, now);
  const latest = line?.latest_reading_at ? Date.parse(line.latest_reading_at) : null;
  return (
    <section class="line head">
      <div>
        <h1 class="line-name">{effect.name}</h1>
        <p class="quiet"><Link href={pages.line(effect.line)}>{effect.line}</Link></p>
      </div>
      <div>
        <Words pieces={effectWords(effect, readings, latest, now, zone.value)} />
        {failed && <Words pieces={failed} />}
        <Words pieces={foulingWords(effect, readings === 'live' && (effect.now?.coefficient_w_m2k ?? null) !== null, zone.value, now)} />
        <div class="head-row">
          <Bore effect={effect} radius={64} stale={readings !== 'live'} weeks={weeksPerStratum([effect])} />
          <LimitsTable effect={effect} now={now} fresh={readings === 'live'} />
        </div>
        <p class="legend-small">Ring thickness stands for fouling resistance; not to scale, not a flow restriction.</p>
      </div>
    </section>
  );
}
