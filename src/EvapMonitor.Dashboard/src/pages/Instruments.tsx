import { useEffect } from 'preact/hooks';
import { useLocation, useSearch } from 'wouter-preact';
import { addresses } from '../api/addresses';
import type { Signals, Sources } from '../api/types';
import { useResource } from '../api/use-resource';
import { SignalsOfLine } from '../instruments/SignalsOfLine';
import { SourcesPart } from '../instruments/SourcesPart';
import { UnknownSignals } from '../instruments/UnknownSignals';
import { useRegularly } from '../instruments/use-regularly';
import { Shown } from '../parts/Waiting';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { eventsMissed, resultsChanged } from '../site/state';
import { byLine } from '../words/signal';

/** Can I trust the data? Every signal with value, age and share of sound time; where readings come from and what became of them. */
export function Instruments() {
  useTitle('Instruments');
  const signals = useResource<Signals>(addresses.signals), sources = useResource<Sources>(addresses.sources);
  const changes = resultsChanged.value, missed = eventsMissed.value;
  const again = () => { for (const r of [signals, sources]) if (r.state.peek().value) void r.load(); };
  useEffect(again, [changes, missed]);
  useRegularly(again, 30_000);
  const [path, navigate] = useLocation();
  const first = new URLSearchParams(useSearch()).get('order') === 'attention';
  const now = calmNow.value;
  return (
    <>
      <h1 class="page-name">Instruments</h1>
      <Shown of={signals} what="The signals">
        {({ signals: all, unknown }) => <>
          {all.length === 0
            ? <p class="empty">The plant file names no signal yet. The Plant page shows what is in force.</p>
            : <p class="order"><label class="tick"><input type="checkbox" checked={first}
                onChange={e => navigate(path + (e.currentTarget.checked ? '?order=attention' : ''), { replace: true })} />What asks for attention first, within its line</label></p>}
          {byLine(all).map(g => <SignalsOfLine key={g.line} line={g.line} signals={g.signals} first={first} now={now} />)}
          <UnknownSignals all={unknown} now={now} />
        </>}
      </Shown>
      <Shown of={sources} what="The sources">{of => <SourcesPart of={of} now={now} />}</Shown>
    </>
  );
}
