import { useSignal } from '@preact/signals';
import { Link } from 'wouter-preact';
import { pages } from '../api/addresses';
import type { Cleaning } from '../api/types';
import { zone } from '../site/state';
import { duration } from '../words/duration';
import { moment } from '../words/time';
import { Scroller } from './Scroller';

/** Cleanings, the youngest first. `everywhere`: name line and effect too. */
export function CleaningsTable({ all, now, everywhere }: { all: Cleaning[]; now: number; everywhere: boolean }) {
  const most = useSignal(50);
  const sorted = [...all].sort((a, b) => Date.parse(b.start) - Date.parse(a.start));
  return (
    <>
      <Scroller label="Table of cleanings">
        <table>
          <thead><tr>{everywhere && <><th scope="col">line</th><th scope="col">effect</th></>}<th scope="col">from</th><th scope="col">to</th><th scope="col">lasted</th>
            <th scope="col">kind</th><th scope="col">note</th></tr></thead>
          <tbody>{sorted.slice(0, most.value).map(c => {
            const start = Date.parse(c.start), end = c.end === null ? null : Date.parse(c.end);
            return <tr key={c.id ?? `${c.line} ${c.effect} ${c.start}`}>
              {everywhere && <><td>{c.line}</td><th scope="row"><Link href={pages.effect(c.line, c.effect)}>{c.effect}</Link></th></>}
              <td class="time">{moment(start, zone.value, now)}</td><td class="time">{end === null ? <b>goes on</b> : moment(end, zone.value, now)}</td>
              <td class="time">{duration((end ?? now) - start)}</td><td>{c.kind}</td><td class="note">{c.note}</td>
            </tr>;
          })}</tbody>
        </table>
      </Scroller>
      {sorted.length > most.value && <button type="button" onClick={() => { most.value += 200; }}>Show {Math.min(200, sorted.length - most.value)} more</button>}
    </>
  );
}
