import { useEffect, useRef, useState } from 'preact/hooks';
import { useLocation, useSearch } from 'wouter-preact';
import type { Line } from '../api/types';
import { Words } from '../parts/Words';
import { asks, siteWords } from '../words/site';
import { chosen, choices, readChoice, writeChoice, type Choice } from './choice';
import { DenseLine } from './DenseLine';
import { LedgerLine } from './LedgerLine';

/** Lines that ask for something are opened where they stand in the plant file, the others are rows; silent ones are counted apart. */
export function ManyLines({ lines, now, weeks }: { lines: Line[]; now: number; weeks: 1 | 4 }) {
  const search = useSearch();
  const [path, navigate] = useLocation();
  const [choice, choose] = useState(() => readChoice(search));
  const write = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => () => clearTimeout(write.current), []);
  const change = (next: { show: Choice; named: string }) => {
    choose(next);
    // Browsers let the address change only so often; it follows when the typing rests.
    clearTimeout(write.current);
    write.current = setTimeout(() => navigate(path + writeChoice(next), { replace: true }), 300);
  };
  const shown = chosen(lines, choice);
  return (
    <>
      <div class="many">
        <Words pieces={siteWords(lines)} />
        <div class="many-choice">
          <label>Show <select value={choice.show} onChange={e => change({ ...choice, show: e.currentTarget.value as Choice })}>
            {choices(lines).map(([value, words]) => <option key={value} value={value}>{words}</option>)}
          </select></label>
          <label>named <input type="search" value={choice.named} onInput={e => change({ ...choice, named: e.currentTarget.value })} /></label>
        </div>
        <p class="quiet" role="status">{shown.length === 0 ? 'No line is like this.' : shown.length < lines.length ? `${shown.length} of ${lines.length} lines are shown.` : ''}</p>
      </div>
      {shown.map(l => (asks(l) ? <LedgerLine key={l.name} line={l} weeks={weeks} told={false} /> : <DenseLine key={l.name} line={l} now={now} />))}
    </>
  );
}
