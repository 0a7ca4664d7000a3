import type { MarkKind } from '../words/due';

/** A 16 px mark made from the bore; always stands beside its word. */
export function Mark({ kind }: { kind: MarkKind }) {
  if (kind === null) return null;
  return (
    <svg class={`mark mark-${kind}`} width="16" height="16" viewBox="0 0 16 16" aria-hidden="true" focusable="false">
      {kind === 'now' && <>
        <circle cx="8" cy="8" r="7" class="mark-fill" />
        <line x1="8" y1="3.5" x2="8" y2="12.5" class="mark-slot" />
      </>}
      {kind === 'unknown' && <circle cx="8" cy="8" r="6" class="mark-line" stroke-dasharray="3 2.3" />}
      {kind === 'cleaning' && <>
        <circle cx="8" cy="8" r="6.5" class="mark-line" />
        <circle cx="8" cy="8" r="3.5" class="mark-line" />
      </>}
    </svg>
  );
}
