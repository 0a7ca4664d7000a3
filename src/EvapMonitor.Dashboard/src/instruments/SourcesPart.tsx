import type { RefusedReading, Source, Sources } from '../api/types';
import { Mark } from '../bore/Mark';
import { zone } from '../site/state';
import { count, raw } from '../words/number';
import { countsWords, isCut, kindWords, sourceWords, spoolWords } from '../words/source';
import { inSiteTime, moment } from '../words/time';

/** Where the readings come from, what waits on disk, and what the database would not take. */
export function SourcesPart({ of, now }: { of: Sources; now: number }) {
  return (
    <section class="line instruments" aria-labelledby="sources">
      <h2 class="line-name" id="sources">sources</h2>
      <div>
        {of.sources.length === 0 && <p class="say">No source of readings is set up, and none has been posted since the service started.</p>}
        <ul class="sources">{of.sources.map(s => <One key={s.name} source={s} now={now} />)}</ul>
        <p class="spool">{spoolWords(of.spool)}</p>
        {of.refused === null && <p>What the database refused cannot be read: it does not answer.</p>}
        {of.refused !== null && of.refused.length > 0 && <Refused all={of.refused} now={now} />}
      </div>
    </section>
  );
}

function One({ source: s, now }: { source: Source; now: number }) {
  const { bold, rest } = sourceWords(s, zone.value, now);
  return (
    <li>
      <h3>{s.name}</h3>
      <p class="quiet">{kindWords(s)}{s.address !== '' && `, ${s.address}`}</p>
      <p class="source-state">{isCut(s) && <Mark kind="unknown" />}<span>{bold !== '' && <b>{bold}</b>}{rest}</span></p>
      <p>Since the service started: {countsWords(s).join('; ')}.</p>
      {s.last_error !== null && <p>Last error of the connection: {inSiteTime(s.last_error, zone.value, now)}</p>}
      {s.samples.length > 0 && <details>
        <summary>{count(s.samples.length, 'example')} of what was not used<span class="unseen"> from {s.name}</span></summary>
        <ul>{[...s.samples].reverse().map(e => <li>{moment(Date.parse(e.at), zone.value, now)}, <span class="where">{e.where}</span>: {inSiteTime(e.reason, zone.value, now)}</li>)}</ul>
      </details>}
    </li>
  );
}

function Refused({ all, now }: { all: RefusedReading[]; now: number }) {
  return (
    <details class="refused">
      <summary>{count(all.length, 'reading')} that the database would not take, the latest first</summary>
      <ul>{all.map(r => <li>
        refused {moment(Date.parse(r.refused_at), zone.value, now)}: <b class="where">{r.signal}</b> of {moment(Date.parse(r.at), zone.value, now)}, {r.value === null ? 'no value' : raw(r.value)}
        {' '}({r.quality}) from {r.source}: {inSiteTime(r.reason, zone.value, now)}
      </li>)}</ul>
    </details>
  );
}
