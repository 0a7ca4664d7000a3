import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Cleaning, Line } from '../api/types';
import { weeksPerStratum } from '../bore/deposit';
import { Shown } from '../parts/Waiting';
import { useTitle } from '../parts/use-title';
import { calmNow } from '../site/clock';
import { lines, notices, site, zone } from '../site/state';
import { useAsked } from '../cleaning/use-asked';
import { FirstSentences } from '../today/FirstSentences';
import { LedgerLine } from '../today/LedgerLine';
import { Legend } from '../today/Legend';
import { ManyLines } from '../today/ManyLines';
import { OneLine } from '../today/OneLine';
import { aged } from '../words/aged';
import { firstSentences } from '../words/first';
import { NoReadings } from './NoReadings';

/** More lines than these are not all drawn as bores. */
const many = 12;

/** How is the site, what must I do? */
export function Today() {
  useTitle('Today');
  const none = site.state.value.value?.readings === 'none';
  return (
    <>
      <h1 class="unseen">Today</h1>
      {none && <><First of={[]} /><NoReadings /></>}
      <Shown of={lines} what="The lines">
        {({ lines: all }) => <>
          {all.length === 0 && !none && <><First of={[]} /><p class="empty">No plant file names a line yet. The Plant page shows what is in force.</p></>}
          {!none && all.length > 0 && <Sized lines={all} />}
        </>}
      </Shown>
    </>
  );
}

/** Before the rows: notices, and what the lines ask for. */
function First({ of, asked = [] }: { of: Line[]; asked?: readonly Cleaning[] }) {
  return <FirstSentences {...firstSentences(notices.value, of, asked, calmNow.value, zone.value)} />;
}

/** The page by the size of the site; rows keep the plant file's order whatever their state. */
function Sized({ lines: given }: { lines: Line[] }) {
  const now = calmNow.value, all = given.map(l => aged(l, now)), effects = all.flatMap(l => l.effects), weeks = weeksPerStratum(effects);
  const asked = useAsked(all.length <= many);
  if (all.length === 1) return <><First of={[]} asked={asked} /><OneLine line={all[0]!} /><Legend effects={effects} weeks={weeks} dense={false} /></>;
  const { first, left } = firstSentences(notices.value, all.length > many ? [] : all, asked, now, zone.value);
  const told = new Set(first.map(f => f.line));
  return (
    <>
      <FirstSentences first={first} left={left} />
      {all.length > many ? <ManyLines lines={all} now={now} weeks={weeks} /> : all.map(l => <LedgerLine key={l.name} line={l} weeks={weeks} told={told.has(l.name)} />)}
      <Legend effects={effects} weeks={weeks} dense={all.length > many} />
      <p class="legend legend-wall"><Link href={pages.wall}>Show this on a wall screen</Link></p>
    </>
  );
}
