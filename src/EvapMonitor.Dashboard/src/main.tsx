import { render } from 'preact';
import { App } from './app';
import { startClock } from './site/clock';
import { startState } from './site/state';
import './styles/fonts.css';
import './styles/tokens.css';
import './styles/type.css';
import './styles/shell.css';
import './styles/today.css';
import './styles/bore.css';
import './styles/forms.css';
import './styles/tables.css';
import './styles/chart.css';
import './styles/print.css';

startClock();
startState();
render(<App />, document.getElementById('page')!);
