import type { ComponentType } from 'preact';
import { useEffect, useState } from 'preact/hooks';

/** Shows a component whose code is fetched when it is first needed, so that the first page stays small. */
export function Later<P extends object>({ load, what, props }: { load: () => Promise<ComponentType<P>>; what: string; props: P }) {
  const [Found, found] = useState<ComponentType<P> | null>(null);
  const [failed, fail] = useState(false);
  useEffect(() => {
    let here = true;
    load().then(component => { if (here) found(() => component); }, () => { if (here) fail(true); });
    return () => { here = false; };
  }, []);
  if (Found) return <Found {...props} />;
  return failed
    ? <section class="empty" role="alert"><h1>{what} could not be fetched</h1><p>The service may have been renewed or be away. <button type="button" onClick={() => location.reload()}>Load the page again</button></p></section>
    : <p class="quiet loading" aria-busy="true">{what} is on the way.</p>;
}
