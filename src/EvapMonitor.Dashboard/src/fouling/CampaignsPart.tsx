import type { Campaigns, Effect } from '../api/types';
import type { Resource } from '../api/resource';
import { Shown } from '../parts/Waiting';
import { CampaignsTable } from './CampaignsTable';
import { CleanBasis } from './CleanBasis';
import { StopsAndTests } from './StopsAndTests';

/** Campaigns, stops, tests on water, and what the clean expectation rests on. */
export function CampaignsPart({ effect, of, now }: { effect: Effect; of: Resource<Campaigns>; now: number }) {
  return (
    <section class="line campaigns-part" aria-labelledby="campaigns">
      <h2 class="line-name" id="campaigns">Campaigns</h2>
      <div>
        <Shown of={of} what="The campaigns">{all => {
          const bodies = [...all.campaigns, ...all.stops].some(c => c.surface !== effect.name);
          return <>
            {all.campaigns.length === 0
              ? <p class="quiet">{all.version === 0 ? 'Campaigns are not computed yet; they follow once hours of production are evaluated.' : `No campaign of ${effect.name} has an hour with a coefficient yet.`}</p>
              : <CampaignsTable all={all.campaigns} bodies={bodies} now={now} />}
            <StopsAndTests of={all} bodies={bodies} now={now} />
            <CleanBasis effect={effect} of={all.clean_references} now={now} />
          </>;
        }}</Shown>
      </div>
    </section>
  );
}
