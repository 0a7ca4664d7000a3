import { Route, Switch } from 'wouter-preact';
import { pages } from './api/addresses';
import { Boundary } from './parts/Boundary';
import { useArrival } from './parts/use-arrival';
import { Announcer } from './parts/Announcer';
import { BottomBar, Header } from './parts/Header';
import { ConnectionLost } from './parts/ConnectionLost';
import { ImportProgress } from './parts/ImportProgress';
import { Cleanings } from './pages/Cleanings';
import { EffectPage } from './pages/Effect';
import { Instruments } from './pages/Instruments';
import { Lines } from './pages/Lines';
import { NotHere } from './pages/NotHere';
import { Plant } from './pages/Plant';
import { Today } from './pages/Today';

/** The frame of every page and the page that the address names. */
export function App() {
  useArrival();
  return (
    <>
      <a class="skip" href="#content">Skip to the content</a>
      <Header />
      <ConnectionLost />
      <ImportProgress />
      <main id="content" tabIndex={-1}>
        <Boundary><Switch>
          <Route path={pages.today} component={Today} />
          <Route path={pages.lines} component={Lines} />
          <Route path="/lines/:line/effects/:effect">
            {params => <EffectPage key={`${params.line}/${params.effect}`} line={params.line} effect={params.effect} />}
          </Route>
          <Route path={pages.cleanings} component={Cleanings} />
          <Route path={pages.instruments} component={Instruments} />
          <Route path={pages.plant} component={Plant} />
          <Route component={NotHere} />
        </Switch></Boundary>
      </main>
      <BottomBar />
      <Announcer />
    </>
  );
}
