import { useSignal } from '@preact/signals';
import { useEffect } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { RequestFailure, send } from '../api/request';
import type { Cleaning } from '../api/types';
import { announce } from '../parts/Announcer';
import { cleaningsChanged } from '../site/state';

const patience = 10;

/** Says what was logged and lets it be taken back for ten seconds. */
export function Undo({ of, done }: { of: Cleaning & { id: string }; done: () => void }) {
  const left = useSignal(patience);
  const words = useSignal<string | null>(null);
  useEffect(() => {
    const timer = setInterval(() => { if (left.peek() > 0) left.value--; }, 1000);
    return () => clearInterval(timer);
  }, []);
  const takeBack = async () => {
    try {
      await send(addresses.cleaning(of.id), { method: 'DELETE' });
      words.value = `Taken back: ${of.effect} is not logged as cleaned.`;
      cleaningsChanged.value++;
    } catch (error) {
      words.value = `It could not be taken back: ${error instanceof RequestFailure ? error.message : String(error)}. It stays in the log.`;
    }
    announce(words.value);
  };
  return (
    <div class="notice calm">
      <p>{words.value ?? <><b>Logged</b>: {of.effect} of {of.line}, {of.kind}. </>}
        {words.value === null && left.value > 0 && <button type="button" onClick={() => void takeBack()}>Take it back ({left.value} s)</button>}
        {' '}{(words.value !== null || left.value === 0) && <button type="button" onClick={done}>Log another</button>}</p>
    </div>
  );
}
