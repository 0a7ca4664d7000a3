import { useEffect, useRef } from 'preact/hooks';
import { useLocation } from 'wouter-preact';
import { announce } from './Announcer';

/** Scrolls to what the address names behind its hash. False: it names nothing here. */
export function scrollToHash(): boolean {
  let name = location.hash.slice(1);
  try { name = decodeURIComponent(name); } catch { /* not an address of ours: it will not be found */ }
  const target = name === '' ? null : document.getElementById(name);
  target?.scrollIntoView();
  return target !== null;
}

/** Does at a change of page what the browser does at a load: begins at the top, with the focus at the content and the title said. Going back keeps its place. */
export function useArrival(): void {
  const [path] = useLocation();
  const first = useRef(true), back = useRef(false);
  useEffect(() => {
    const note = () => { back.current = true; };
    addEventListener('popstate', note);
    return () => removeEventListener('popstate', note);
  }, []);
  useEffect(() => {
    if (first.current) { first.current = false; return; }
    document.getElementById('content')?.focus({ preventScroll: true });
    if (!scrollToHash() && !back.current) scrollTo(0, 0);
    back.current = false;
    // The title is set by the page, which has rendered by now.
    setTimeout(() => announce(document.title), 100);
  }, [path]);
}
