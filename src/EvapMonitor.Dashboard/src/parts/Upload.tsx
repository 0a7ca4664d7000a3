import { useSignal } from '@preact/signals';
import { useRef } from 'preact/hooks';
import { upload } from '../api/upload';
import { RequestFailure } from '../api/request';
import { imports } from '../site/state';
import { bytes } from '../words/number';
import { announce } from './Announcer';

/** Brings in a file of readings: choose it, and it is sent, with progress and a way to stop. */
export function Upload() {
  const sending = useSignal<{ name: string; size: number; share: number } | null>(null);
  const said = useSignal<{ words: string; wrong: boolean } | null>(null);
  const stop = useRef<AbortController | null>(null);

  const start = async (file: File) => {
    const abort = stop.current = new AbortController();
    said.value = null;
    sending.value = { name: file.name, size: file.size, share: 0 };
    try {
      const one = await upload(file, share => { sending.value = { name: file.name, size: file.size, share }; }, abort.signal);
      said.value = { words: `${file.name} is here; its import ${one.state === 'done' ? 'is done' : 'has begun'}.`, wrong: false };
      void imports.load();
    } catch (error) {
      const words = error instanceof RequestFailure ? error.message : null;
      said.value = words === null
        ? { words: `Sending ${file.name} was stopped; nothing was imported.`, wrong: false }
        : { words: `${file.name} was not taken: ${words}. Sending it again does no harm; readings already here are not doubled.`, wrong: true };
    } finally {
      sending.value = null;
      if (said.peek()) announce(said.peek()!.words);
    }
  };

  return (
    <div class="upload">
      <label class="file">
        <span>A file of readings (.csv or .csv.gz)</span>
        <input type="file" accept=".csv,.gz,.txt,text/csv,application/gzip" disabled={sending.value !== null}
          onChange={event => { const input = event.currentTarget; const file = input.files?.[0]; if (file) void start(file); input.value = ''; }} />
      </label>
      {sending.value && <div class="work-one">
        <p id="sending"><b>Sending</b> {sending.value.name}, {bytes(sending.value.size)}: {Math.floor(sending.value.share * 100)} %</p>
        <progress value={sending.value.share} max={1} aria-labelledby="sending" />
        <button type="button" onClick={() => stop.current?.abort()}>Stop sending</button>
      </div>}
      {said.value && <p class={said.value.wrong ? 'wrong' : 'quiet'}>{said.value.words}</p>}
    </div>
  );
}
