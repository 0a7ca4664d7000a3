import { Mark } from '../bore/Mark';
import type { DueWords } from '../words/due';

/** The words under an effect with their mark; filled up to the colon when someone must act. */
export function DueLabel({ due }: { due: DueWords }) {
  if (due.mark !== 'now') return <span class="due"><Mark kind={due.mark} /><span>{due.words}</span></span>;
  const [head, limit] = due.words.split(': ') as [string, string | undefined];
  return <span class="due due-act"><Mark kind="now" /><span class="due-now">{head}</span>{limit !== undefined && <span class="due-limit"><span class="unseen">: </span>{limit}</span>}</span>;
}
