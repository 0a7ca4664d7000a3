import type { ComponentChildren } from 'preact';
import { twice } from './draft';

interface Attributes { id: string; 'aria-invalid': 'true' | undefined; 'aria-describedby': string | undefined }

/** A labelled field with its error beside it. `name` is unique on the page. */
export function Field({ name, label, error, children }: { name: string; label: string; error: string | undefined; children: (a: Attributes) => ComponentChildren }) {
  const id = `field-${name}`;
  return (
    <div class="field">
      <label htmlFor={id}>{label}</label>
      {children({ id, 'aria-invalid': error ? 'true' : undefined, 'aria-describedby': error ? `${id}-error` : undefined })}
      {error && <p class="wrong" id={`${id}-error`}>{error}</p>}
    </div>
  );
}

interface TimeProps {
  name: string; label: string; value: string; second: boolean; error: string | undefined; zone: string;
  change: (value: string, second: boolean) => void;
}

/** A local time of the site; in the hour that the clocks repeat it asks which one is meant. */
export function TimeField({ name, label, value, second, error, zone, change }: TimeProps) {
  const both = twice(value, zone);
  return (
    <>
      <Field name={name} label={`${label}, local time (${zone})`} error={error}>
        {props => <input {...props} type="datetime-local" value={value} onInput={e => change(e.currentTarget.value, false)} />}
      </Field>
      {both && <fieldset class="field">
        <legend>The clocks went back in this hour. Which one?</legend>
        {both.map((words, i) => <label class="tick" key={words}>
          <input type="radio" name={`${name}-which`} checked={second === (i === 1)} onChange={() => change(value, i === 1)} /> {i === 0 ? 'the first' : 'the second'} ({words})
        </label>)}
      </fieldset>}
    </>
  );
}
