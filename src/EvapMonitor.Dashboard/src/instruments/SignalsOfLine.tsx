import { useState } from 'preact/hooks';
import type { SignalRow } from '../api/types';
import { zone } from '../site/state';
import { fitWords, misfit } from '../words/balance';
import { raw } from '../words/number';
import { prettyUnit } from '../words/quantity';
import { ageWords, attentionFirst, rejectedWords, shareWords, signalsWords, troubleOf } from '../words/signal';
import { moment } from '../words/time';
import { CorrectionChart } from './CorrectionChart';
import { InstrumentLog } from './InstrumentLog';
import '../styles/balance.css';

/** The signals of a line; in the plant file's order, or with what asks for attention first. */
export function SignalsOfLine({ line, signals, first, now }: { line: string | null; signals: SignalRow[]; first: boolean; now: number }) {
  const { head, bold } = signalsWords(signals, now), name = line ?? 'of no one line';
  return (
    <section class="line instruments" aria-labelledby={`signals.${name}`}>
      <h2 class="line-name" id={`signals.${name}`}>{name}</h2>
      <div>
        <p class="say">{head}{bold !== '' && <><b>{bold}</b>.</>}</p>
        <table class="signals">
          <thead><tr><th scope="col">signal</th><th scope="col" class="number">value</th><th scope="col" class="unit">unit</th><th scope="col">quality</th>
            <th scope="col">age</th><th scope="col" class="number">good, last 24 h</th><th scope="col" class="rejected">rejected, last 24 h</th>
            <th scope="col" class="fit">against the others</th></tr></thead>
          <tbody>{(first ? attentionFirst(signals, now) : signals).map(s => <Row key={s.name} signal={s} now={now} />)}</tbody>
        </table>
      </div>
    </section>
  );
}

function Row({ signal: s, now }: { signal: SignalRow; now: number }) {
  const [open, setOpen] = useState(false);
  const trouble = troubleOf(s, now), rejected = rejectedWords(s.rejected);
  const strong = (words: string, when: boolean) => (when ? <b>{words}</b> : words);
  return (
    <><tr>
      <th scope="row" class="signal">{s.name}</th>
      <td class="number" data-name="value">{s.latest_value === null ? <span class="quiet">none</span> : raw(s.latest_value)}</td>
      <td class="unit">{prettyUnit(s.unit ?? '')}</td>
      <td data-name="quality">{strong(s.latest_quality ?? '', trouble === 'bad now')}</td>
      <td data-name="age" title={s.latest_at === null ? undefined : moment(Date.parse(s.latest_at), zone.value, now)}>{strong(ageWords(s, now), trouble === 'silent' || trouble === 'never read')}</td>
      <td class="number" data-name="good, last 24 h">{strong(shareWords(s.good_share), trouble === 'often unsound')}</td>
      <td data-name="rejected, last 24 h" class="rejected">{rejected === '' ? <span class="quiet">none</span> : rejected}</td>
      <td class="fit">{strong(fitWords(s.fit, zone.value, now), misfit(s.fit))}{s.changed && <>; <b>{s.changed.words}</b>, since {moment(Date.parse(s.changed.since), zone.value, now)}</>}
        {s.fit !== null && <> <button type="button" class="plain" aria-expanded={open} onClick={() => setOpen(!open)}>30 days, log<span class="unseen"> of {s.name}</span></button></>}</td>
    </tr>
    {open && <tr class="more"><td colSpan={8}><CorrectionChart signal={s.name} /><InstrumentLog signal={s.name} now={now} /></td></tr>}</>
  );
}
