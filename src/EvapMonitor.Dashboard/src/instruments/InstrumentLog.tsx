import { useEffect, useState } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { InstrumentEvent } from '../api/types';
import { useResource } from '../api/use-resource';
import { announce } from '../parts/Announcer';
import { Shown } from '../parts/Waiting';
import { instrumentsChanged, zone } from '../site/state';
import { moment } from '../words/time';
import { InstrumentForm } from './InstrumentForm';

/** What people have logged of an instrument, and the form to log more. */
export function InstrumentLog({ signal, now }: { signal: string; now: number }) {
  const log = useResource<{ events: InstrumentEvent[] }>(addresses.instrumentLog(signal), signal);
  const changes = instrumentsChanged.value;
  useEffect(() => { if (log.state.peek().value) void log.load(); }, [changes]);
  return (
    <div class="instrument-log">
      <Shown of={log} what={`The log of ${signal}`}>{({ events }) => events.length === 0
        ? <p class="quiet">Nothing is logged of {signal}.</p>
        : <ul>{events.map(e => <Entry key={e.id} of={e} now={now} />)}</ul>}</Shown>
      <details><summary>Exclude {signal} for a time, or log that it was set right</summary><InstrumentForm signal={signal} /></details>
    </div>
  );
}

/** An entry in words. */
export function entryWords(e: InstrumentEvent, zone: string, now: number): string {
  const start = moment(Date.parse(e.start), zone, now);
  if (e.kind === 'recalibration') return `Set right (recalibrated) ${start}`;
  return `Excluded from ${start} ${e.end === null ? 'until further notice' : `to ${moment(Date.parse(e.end), zone, now)}`}`;
}

function Entry({ of, now }: { of: InstrumentEvent; now: number }) {
  const [failure, setFailure] = useState<string | null>(null);
  const takeBack = async () => {
    try {
      await send(addresses.instrumentEvent(of.id), { method: 'DELETE' });
      announce(`Taken back: ${entryWords(of, zone.peek(), now)}.`);
      instrumentsChanged.value++;
    } catch (error) { setFailure(error instanceof RequestFailure ? error.message : String(error)); }
  };
  return (
    <li>{entryWords(of, zone.value, now)}{of.note !== '' && <>: {of.note}</>}{' '}
      <button type="button" class="plain" onClick={() => void takeBack()}>take back</button>
      {failure !== null && <span class="wrong" role="alert"> It could not be taken back: {failure}</span>}</li>
  );
}
