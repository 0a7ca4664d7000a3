import { signal } from '@preact/signals';

/** The stream of events: being opened, open, or lost since an instant of this machine's clock, ms. */
export type Connection = { state: 'opening' | 'open' } | { state: 'lost'; since: number };
export const connection = signal<Connection>({ state: 'opening' });

/** The service sends its site every 15 s; three missed ones are a loss that the browser did not notice. */
const silence = 45_000, pause = 5_000;

/** Opens the stream and keeps it open. `restored` is called when it opens again after a loss, for what was missed meanwhile. */
export function connect(address: string, handlers: Record<string, (data: unknown) => void>, restored: () => void): () => void {
  let source: EventSource, watch: ReturnType<typeof setTimeout>, ended = false;
  const lost = () => { if (connection.peek().state !== 'lost') connection.value = { state: 'lost', since: Date.now() }; };
  const heard = () => {
    clearTimeout(watch);
    watch = setTimeout(() => { lost(); source.close(); open(); }, silence);
  };
  const open = () => {
    if (ended) return;
    source = new EventSource(address);
    heard();
    source.onopen = () => {
      const was = connection.peek().state;
      connection.value = { state: 'open' };
      heard();
      if (was === 'lost') restored();
    };
    source.onerror = () => {
      lost();
      // The browser tries again by itself unless the answer itself was wrong.
      if (source.readyState === EventSource.CLOSED) { clearTimeout(watch); watch = setTimeout(open, pause); }
    };
    for (const [name, handle] of Object.entries(handlers)) {
      source.addEventListener(name, event => {
        heard();
        let data: unknown;
        try { data = JSON.parse((event as MessageEvent<string>).data); } catch { return; }
        handle(data);
      });
    }
  };
  open();
  return () => { ended = true; clearTimeout(watch); source.close(); };
}
