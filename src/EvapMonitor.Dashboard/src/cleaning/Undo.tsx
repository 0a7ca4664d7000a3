import { useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { useEffect } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import { announce } from '../parts/Announcer';
import { cleaningsChanged } from '../site/state';

const patience = 10;

interface UndoProps {
  /** What was done. */
  said: ComponentChildren;
  /** What is said once it is taken back. */
  back: string;
  /** The entry that is withdrawn. */
  id: string;
  /** The button that goes on. */
  next: string;
  done(): void;
}

/** Says what was logged and lets it be taken back for ten seconds. */
export function Undo({ said, back, id, next, done }: UndoProps) {
  const left = useSignal(patience), words = useSignal<string | null>(null);
  useEffect(() => {
    const timer = setInterval(() => { if (left.peek() > 0) left.value--; }, 1000);
    return () => clearInterval(timer);
  }, []);
  const takeBack = async () => {
    try {
      await send(addresses.cleaning(id), { method: 'DELETE' });
      words.value = back;
      cleaningsChanged.value++;
    } catch (error) {
      words.value = `It could not be taken back: ${error instanceof RequestFailure ? error.message : String(error)}. It stays in the log.`;
    }
    announce(words.value);
  };
  return (
    <div class="notice calm">
      <p>{words.value ?? said}
        {words.value === null && left.value > 0 && <button type="button" onClick={() => void takeBack()}>Take it back ({left.value} s)</button>}
        {' '}{(words.value !== null || left.value === 0) && <button type="button" onClick={done}>{next}</button>}</p>
    </div>
  );
}
