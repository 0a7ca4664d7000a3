import type { ComponentChildren } from 'preact';
import { useLayoutEffect, useRef, useState } from 'preact/hooks';

/** A wide thing that scrolls in its own frame, so that the page never does; reachable by keyboard when it really scrolls. */
export function Scroller({ label, children }: { label: string; children: ComponentChildren }) {
  const frame = useRef<HTMLDivElement>(null);
  const [scrolls, setScrolls] = useState(false);
  useLayoutEffect(() => {
    const element = frame.current!;
    const watch = new ResizeObserver(() => setScrolls(element.scrollWidth > element.clientWidth + 1 || element.scrollHeight > element.clientHeight + 1));
    watch.observe(element);
    return () => watch.disconnect();
  }, []);
  return <div class="scroller" ref={frame} role={scrolls ? 'region' : undefined} aria-label={scrolls ? label : undefined} tabIndex={scrolls ? 0 : undefined}>{children}</div>;
}
