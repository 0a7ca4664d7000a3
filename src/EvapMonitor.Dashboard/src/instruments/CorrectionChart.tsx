import { useMemo } from 'preact/hooks';
import { addresses } from '../api/addresses';
import type { Corrections } from '../api/types';
import { useResource } from '../api/use-resource';
import { timeTicks } from '../chart/ticks';
import { Shown } from '../parts/Waiting';
import { serviceTime } from '../site/clock';
import { zone } from '../site/state';
import { significant } from '../words/number';
import { prettyUnit } from '../words/quantity';
import { correctionPaths, correctionSpan, spokenCorrections } from './corrections';

const days = 30, width = 640, height = 150, left = 64, bottom = 24;

/** What the others wanted to add to a reading over the last 30 days. */
export function CorrectionChart({ signal }: { signal: string }) {
  const to = useMemo(() => serviceTime(Date.now()), [signal]), from = to - days * 86_400_000;
  const series = useResource<Corrections>(addresses.corrections(signal, from, to, 600), signal);
  return <Shown of={series} what="The corrections">{of => <Drawn of={of} from={from} to={to} />}</Shown>;
}

function Drawn({ of, from, to }: { of: Corrections; from: number; to: number }) {
  const span = correctionSpan(of.wanted), unit = prettyUnit(of.unit);
  if (span === null) return <p class="quiet">No balance of the last {days} days has a reading of {of.signal}.</p>;
  const x = (t: number) => left + ((t - from) / (to - from)) * (width - left - 8), y = (v: number) => 8 + ((span.highest - v) / (span.highest - span.lowest)) * (height - bottom - 16);
  const paths = correctionPaths(of, x, y), words = spokenCorrections(of, days);
  return (
    <figure class="corrections">
      <figcaption>Correction of {of.signal} wanted by the others, {unit}, last {days} days{paths.out !== '' && '; dotted while it is left out'}</figcaption>
      <svg viewBox={`0 0 ${width} ${height}`} role="img" aria-label={words}>
        {[0, span.highest, span.lowest].filter((v, i) => i === 0 || Math.abs(y(v) - y(0)) > 15).map(v => <g key={v}>
          <line x1={left} x2={width - 8} y1={y(v)} y2={y(v)} class={v === 0 ? 'corrections-zero' : 'corrections-edge'} />
          <text x={left - 8} y={y(v) + 4.5} text-anchor="end">{v > 0 ? '+' : ''}{significant(v, 2)}</text>
        </g>)}
        {timeTicks(from, to, zone.value, 7).map(t => <text key={t.at} x={x(t.at)} y={height - 6} text-anchor="middle">{t.label.split('\n')[0]}</text>)}
        <path d={paths.line} class="corrections-line" />
        <path d={paths.out} class="corrections-out" />
      </svg>
      <p class="quiet">{words}</p>
    </figure>
  );
}
