import type { Line } from '../api/types';
import { zone } from '../site/state';
import type { Checked, Draft } from './draft';
import { Field, TimeField } from './Field';
import { useBodies } from './use-bodies';

interface FieldsProps {
  draft: Draft;
  errors: Checked['errors'];
  /** Lines to choose the effect from; null when it is given. */
  lines: readonly Line[] | null;
  /** Keeps the fields of several forms on a page apart. */
  prefix: string;
  /** Whether the cleaning may still go on. */
  open: boolean;
  change(part: Partial<Draft>): void;
}

/** The fields of a cleaning, for all forms alike. */
export function CleaningFields({ draft, errors, lines, prefix, open, change }: FieldsProps) {
  const bodies = useBodies(draft.line, draft.effect), names = draft.body === '' || bodies.includes(draft.body) ? bodies : [draft.body, ...bodies];
  const name = (field: string) => (prefix === '' ? field : `${prefix}-${field}`);
  return (
    <>
      {lines && <Field name={name('effect')} label="Effect" error={errors?.effect}>
        {props => <select {...props} value={`${draft.line}/${draft.effect}`}
          onChange={e => { const [line, effect] = e.currentTarget.value.split('/') as [string, string]; change({ line, effect, body: '' }); }}>
          <option value="/">choose</option>
          {lines.map(l => <optgroup key={l.name} label={l.name}>{l.effects.map(f => <option key={f.name} value={`${l.name}/${f.name}`}>{f.name}</option>)}</optgroup>)}
        </select>}
      </Field>}
      {names.length > 0 && <Field name={name('body')} label="Body" error={undefined}>
        {props => <select {...props} value={draft.body} onChange={e => change({ body: e.currentTarget.value })}>
          <option value="">the one that served then</option>
          {names.map(b => <option key={b} value={b}>{b}</option>)}
        </select>}
      </Field>}
      <TimeField name={name('start')} label="Start" value={draft.start} second={draft.startSecond} error={errors?.start} zone={zone.value}
        change={(start, startSecond) => change({ start, startSecond })} />
      {!draft.goesOn && <TimeField name={name('end')} label="End" value={draft.end} second={draft.endSecond} error={errors?.end} zone={zone.value}
        change={(end, endSecond) => change({ end, endSecond })} />}
      {open && <label class="tick"><input type="checkbox" checked={draft.goesOn} onChange={e => change({ goesOn: e.currentTarget.checked })} /> The cleaning still goes on</label>}
      <Field name={name('kind')} label="Kind, in the words of the plant" error={errors?.kind}>
        {props => <>
          <input {...props} type="text" list={name('kinds')} maxLength={60} value={draft.kind} onInput={e => change({ kind: e.currentTarget.value })} />
          <datalist id={name('kinds')}><option value="rinse" /><option value="boil-out" /><option value="chemical" /><option value="mechanical" /></datalist>
        </>}
      </Field>
      <Field name={name('note')} label="Note (may stay empty)" error={errors?.note}>
        {props => <textarea {...props} rows={2} maxLength={2000} value={draft.note} onInput={e => change({ note: e.currentTarget.value })} />}
      </Field>
    </>
  );
}
