import { useSignal } from '@preact/signals';
import { addresses } from '../api/addresses';
import type { DifferentLine, Differences, Revision } from '../api/types';
import { useResource } from '../api/use-resource';
import { Shown } from '../parts/Waiting';
import { differenceWords } from './start';

const signs: Record<DifferentLine['change'], string> = { same: ' ', added: '+', removed: '−' };

/** What a plant file changed against another: in words, then line by line with + and −. */
export function DifferencesOf({ one, all }: { one: Revision; all: Revision[] }) {
  const others = all.filter(r => r.revision !== one.revision);
  const other = useSignal((others.find(r => r.revision < one.revision) ?? others[0]!).revision);
  return (
    <section class="differences" aria-label={`Differences of revision ${one.revision}`}>
      <label class="picker">Revision {one.revision} compared with
        <select value={other.value} onChange={event => { other.value = Number(event.currentTarget.value); }}>
          {others.map(r => <option key={r.revision} value={r.revision}>revision {r.revision}</option>)}
        </select>
      </label>
      <Compared key={other.value} id={one.revision} other={other.value} />
    </section>
  );
}

function Compared({ id, other }: { id: number; other: number }) {
  const differences = useResource<Differences>(addresses.differences(id, other));
  return (
    <Shown of={differences} what="The differences">
      {d => <>
        <p role="status">{differenceWords(d.added, d.removed, d.from)}</p>
        {d.stretches.map((stretch, i) => (
          <ol key={i} class="stretch" tabIndex={0} aria-label={`Changed place ${i + 1} of ${d.stretches.length}`}>
            {stretch.lines.map((line, k) => (
              <li key={k} class={line.change}>
                <span class="where">{line.to_line ?? line.from_line}</span>
                <span class="sign" aria-hidden="true">{signs[line.change]}</span>
                {line.change !== 'same' && <span class="unseen">{line.change}: </span>}
                <code>{line.text}</code>
              </li>
            ))}
          </ol>
        ))}
      </>}
    </Shown>
  );
}
