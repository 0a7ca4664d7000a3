import { moved, zoomed, type Span } from './view';

const day = 86_400_000;
const spans = [{ name: '2 days', length: 2 * day }, { name: '1 week', length: 7 * day }, { name: '5 weeks', length: 35 * day }, { name: '1 year', length: 365 * day }];

/** Room before a campaign, so that the cleaning it began with is seen. */
const before = 0.04;

/** The same as dragging and keys, by buttons. `campaign`: when the present one began, ms; null when that is not known. */
export function ViewButtons({ span, now, campaign, show, reset }: { span: Span; now: number; campaign: number | null; show(span: Span, settled: boolean): void; reset(): void }) {
  const length = span.to - span.from;
  const middle = (span.from + span.to) / 2;
  return (
    <div class="view-buttons" role="group" aria-label="Time shown">
      {spans.map(s => <button type="button" key={s.name} aria-pressed={Math.abs(length / s.length - 1) < 0.01 && span.to >= now}
        onClick={() => show({ from: now - s.length, to: now + 1 }, true)}>{s.name}</button>)}
      {campaign !== null && campaign < now && <button type="button" aria-pressed={Math.abs(span.from - beginOf(campaign, now)) < 0.01 * (now - campaign) && span.to >= now}
        onClick={() => show({ from: beginOf(campaign, now), to: now + 1 }, true)}>This campaign</button>}
      <span class="view-steps">
        <Step name="Earlier" path="M10 3 5 8l5 5" act={() => show(moved(span, -0.5), true)} />
        <Step name="Later" path="M6 3l5 5-5 5" act={() => show(moved(span, 0.5), true)} disabled={span.to >= now} />
        <Step name="Show less time" path="M8 3v10M3 8h10" act={() => show(zoomed(span, 0.5, middle), true)} />
        <Step name="Show more time" path="M3 8h10" act={() => show(zoomed(span, 2, span.to >= now ? span.to : middle), true)} />
      </span>
      <button type="button" onClick={reset}>Reset</button>
    </div>
  );
}

const beginOf = (campaign: number, now: number) => campaign - before * (now - campaign);

function Step({ name, path, act, disabled = false }: { name: string; path: string; act(): void; disabled?: boolean }) {
  return (
    <button type="button" class="step" aria-label={name} title={name} disabled={disabled} onClick={act}>
      <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true" focusable="false"><path d={path} class="step-line" /></svg>
    </button>
  );
}
