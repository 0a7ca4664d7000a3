import { Mark } from '../bore/Mark';
import type { DueWords } from '../words/due';

/** The words under an effect with their mark; filled when someone must act. */
export function DueLabel({ due }: { due: DueWords }) {
  return <span class="due"><Mark kind={due.mark} /><span class={due.mark === 'now' ? 'due-now' : undefined}>{due.words}</span></span>;
}
