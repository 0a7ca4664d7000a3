import { Link, useLocation } from 'wouter-preact';
import { pages } from '../api/addresses';
import { now } from '../site/clock';
import { site, zone } from '../site/state';
import { age } from '../words/duration';
import { dayAndClock } from '../words/time';
import { zoneName } from '../words/zone';

const places = [
  { to: pages.today, name: 'Today', short: 'Today' },
  { to: pages.lines, name: 'Lines', short: 'Lines' },
  { to: pages.cleanings, name: 'Cleanings', short: 'Log' },
  { to: pages.instruments, name: 'Instruments', short: 'Instruments' },
  { to: pages.plant, name: 'Plant', short: 'Plant' },
];

function Places({ short }: { short: boolean }) {
  const [here] = useLocation();
  return places.map(p => {
    const current = p.to === '/' ? here === '/' : here === p.to || here.startsWith(`${p.to}/`);
    return <Link key={p.to} href={p.to} aria-current={current ? (here === p.to ? 'page' : 'true') : undefined}>{short ? p.short : p.name}</Link>;
  });
}

/** Name of the site, the pages, the site's time and the age of its readings. */
export function Header() {
  const known = site.state.value.value;
  return (
    <header class="site">
      <p class="site-name">{known?.name ?? 'EvapMonitor'}</p>
      <nav aria-label="Pages" class="site-pages"><Places short={false} /></nav>
      {known && <p class="site-time">
        <span title={`${known.time_zone}, ${zoneName(now.value, zone.value)}`}>{dayAndClock(now.value, zone.value)}</span>
        {' · '}
        <span class={known.readings === 'live' ? undefined : 'stale'}>
          {age(known.latest_reading_at === null ? null : Date.parse(known.latest_reading_at), now.value)}
        </span>
      </p>}
    </header>
  );
}

/** The same pages at the thumb, on a phone. */
export function BottomBar() {
  return <nav aria-label="Pages, bottom bar" class="bottom-bar"><Places short /></nav>;
}
