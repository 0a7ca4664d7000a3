import { Route, Switch, useLocation, useSearch } from 'wouter-preact';
import { pages } from './api/addresses';
import { Boundary } from './parts/Boundary';
import { Later } from './parts/Later';
import { useArrival } from './parts/use-arrival';
import { Announcer } from './parts/Announcer';
import { BottomBar, Header } from './parts/Header';
import { ConnectionLost } from './parts/ConnectionLost';
import { ImportProgress } from './parts/ImportProgress';
import { NoticeLine, NoticeVoice } from './parts/Notices';
import { Cleanings } from './pages/Cleanings';
import { EffectPage } from './pages/Effect';
import { Instruments } from './pages/Instruments';
import { Lines } from './pages/Lines';
import { NotHere } from './pages/NotHere';
import { Plant } from './pages/Plant';
import { Today } from './pages/Today';
import { Wall } from './today/Wall';

const linePage = () => import('./pages/Line').then(page => page.LinePage);

/** What the address names: a page in its frame, or Today for a wall screen, which has none. */
export function App() {
  useArrival();
  const [path] = useLocation();
  const wall = path === pages.today && new URLSearchParams(useSearch()).has('wall');
  return (
    <>
      {wall ? <main id="content" tabIndex={-1}><Boundary><Wall /></Boundary></main> : <Framed today={path === pages.today} />}
      <NoticeVoice />
      <Announcer />
    </>
  );
}

function Framed({ today }: { today: boolean }) {
  return (
    <>
      <a class="skip" href="#content">Skip to the content</a>
      <Header />
      <ConnectionLost />
      {!today && <NoticeLine />}
      <ImportProgress />
      <main id="content" tabIndex={-1}>
        <Boundary><Switch>
          <Route path={pages.today} component={Today} />
          <Route path={pages.lines} component={Lines} />
          <Route path="/lines/:line/effects/:effect">
            {params => <EffectPage key={`${params.line}/${params.effect}`} line={params.line} effect={params.effect} />}
          </Route>
          <Route path="/lines/:line">
            {params => <Later key={params.line} load={linePage} what="The page of the line" props={{ line: params.line }} />}
          </Route>
          <Route path={pages.cleanings} component={Cleanings} />
          <Route path={pages.instruments} component={Instruments} />
          <Route path={pages.plant} component={Plant} />
          <Route component={NotHere} />
        </Switch></Boundary>
      </main>
      <BottomBar />
    </>
  );
}
