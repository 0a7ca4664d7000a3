import type { Line } from '../api/types';
import { significant } from '../words/number';

const perHour = 3.6;

/** What the line evaporates against what is required of it, t/h. */
export function Evaporation({ line, stale }: { line: Line; stale: boolean }) {
  const { evaporation_kg_s: now, required_evaporation_kg_s: required } = line;
  if (now === null && required === null) return null;
  const width = 200, most = Math.max(now ?? 0, required ?? 0) * 1.08 || 1;
  const x = (v: number) => (v / most) * width;
  const t = (v: number) => significant(v * perHour, 3);
  return (
    <div class="evaporation">
      <p class="evaporation-name">evaporation, t/h</p>
      <svg width={width} height="36" viewBox={`0 0 ${width} 36`} aria-hidden="true" focusable="false">
        <rect x="0.5" y="8.5" width={width - 1} height="19" class="groove" />
        {now !== null && <rect x="0" y="8" width={x(now)} height="20" class={stale ? 'bar-outline' : 'bar'} />}
        {required !== null && <>
          <line x1={x(required)} x2={x(required)} y1="1" y2="35" class="bar-halo" />
          <line x1={x(required)} x2={x(required)} y1="1" y2="35" class="bar-required" />
        </>}
      </svg>
      <p>{now === null ? 'not known now' : `${stale ? 'was' : 'now'} ${t(now)}`}</p>
      {required !== null && <p class="quiet">required {t(required)}</p>}
    </div>
  );
}
