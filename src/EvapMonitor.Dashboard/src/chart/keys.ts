/** What a key does on a chart; null: not the chart's business. `steps`: points to move the cursor by. */
export type KeyAct = { move: number } | { edge: 'first' | 'last' } | { zoom: number } | { reset: true } | { table: true } | null;

export function keyAct(key: string, shift: boolean): KeyAct {
  switch (key) {
    case 'ArrowLeft': return { move: shift ? -20 : -1 };
    case 'ArrowRight': return { move: shift ? 20 : 1 };
    case 'Home': return { edge: 'first' };
    case 'End': return { edge: 'last' };
    case '+': case '=': return { zoom: 0.5 };
    case '-': case '\u2212': return { zoom: 2 };
    case '0': return { reset: true };
    case 't': case 'T': return { table: true };
    default: return null;
  }
}
