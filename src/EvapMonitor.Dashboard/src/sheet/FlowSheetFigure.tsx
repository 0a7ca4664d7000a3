import { useMemo } from 'preact/hooks';
import type { FlowSheet } from '../api/types';
import { Boxes } from './Boxes';
import type { Sheet } from './layout';
import { Stroke, Ways } from './Ways';
import { kinds, spoken } from './words';

/** The line as it runs. */
export function FlowSheetFigure({ of, sheet, stale }: { of: FlowSheet; sheet: Sheet; stale: boolean }) {
  const words = useMemo(() => spoken(of, sheet.columns), [of, sheet]);
  const used = kinds.filter(k => of.ways.some(w => w.kind === k.kind));
  return (
    <figure class="sheet">
      <figcaption>
        <h2>How it runs</h2>
        <ul class="sheet-key">{used.map(k => <li key={k.kind}>
          <svg width="30" height="16" aria-hidden="true" focusable="false"><Stroke d="M0 8H30" kind={k.kind} /></svg>{k.letter} {k.name}
        </li>)}</ul>
      </figcaption>
      <svg viewBox={`0 0 ${sheet.width} ${sheet.height}`} width={sheet.width} height={sheet.height} role="img" aria-labelledby="sheet-title" aria-describedby="sheet-words" focusable="false">
        <title id="sheet-title">How {of.line} runs</title>
        {!sheet.metrics.turned && sheet.tracks.map(t => <text x="0" y={t.at + 4.5} class="sheet-track">{t.name}</text>)}
        <Ways sheet={sheet} />
        <Boxes sheet={sheet} stale={stale} />
      </svg>
      <p class="unseen" id="sheet-words">{words}</p>
      <p class="legend-small">In each effect: heating temperature over the wall, boiling temperature under it, then the apparent coefficient, W/(m²·K). Flows as measured now, in the plant's units. * By balance: nothing measures this flow, or its reading does not fit, and this is what the other readings make it.</p>
    </figure>
  );
}
