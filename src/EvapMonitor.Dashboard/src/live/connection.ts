import { signal } from '@preact/signals';

/** The stream of events: being opened, open, or lost since an instant of this machine's clock, ms. */
export type Connection = { state: 'opening' | 'open' } | { state: 'lost'; since: number };
export const connection = signal<Connection>({ state: 'opening' });

/** The service sends its site every 15 s; three missed ones are a loss that the browser did not notice. */
const silence = 45_000, pause = 5_000;

/** Where the stream is, from the start and after an event. */
export interface StreamAddress { first: string; after: (id: string) => string }

/** Opens the stream and keeps it open. After a loss the service sends what was missed since the last event; `missed` is called when
 * that cannot be known: the service said `reset`, or no event had come before the loss. */
export function connect(address: StreamAddress, handlers: Record<string, (data: unknown) => void>, missed: () => void): () => void {
  let source: EventSource, watch: ReturnType<typeof setTimeout>, ended = false, last = '';
  const lost = () => { if (connection.peek().state !== 'lost') connection.value = { state: 'lost', since: Date.now() }; };
  const heard = () => {
    clearTimeout(watch);
    watch = setTimeout(() => { lost(); source.close(); open(); }, silence);
  };
  const open = () => {
    if (ended) return;
    // The browser keeps the id when it opens again by itself, but a fresh stream knows nothing of the one before.
    source = new EventSource(last === '' ? address.first : address.after(last));
    heard();
    source.onopen = () => {
      const was = connection.peek().state;
      connection.value = { state: 'open' };
      heard();
      if (was === 'lost' && last === '') missed();
    };
    source.onerror = () => {
      lost();
      // The browser tries again by itself unless the answer itself was wrong.
      if (source.readyState === EventSource.CLOSED) { clearTimeout(watch); watch = setTimeout(open, pause); }
    };
    const listen = (name: string, handle: (text: string) => void) => source.addEventListener(name, event => {
      const { data, lastEventId } = event as MessageEvent<string>;
      heard();
      if (lastEventId !== '') last = lastEventId;
      handle(data);
    });
    listen('reset', missed);
    for (const [name, handle] of Object.entries(handlers)) {
      listen(name, text => {
        let data: unknown;
        try { data = JSON.parse(text); } catch { return; }
        handle(data);
      });
    }
  };
  open();
  return () => { ended = true; clearTimeout(watch); source.close(); };
}
