import { useLayoutEffect, useRef, useState } from 'preact/hooks';

/** Width of an element, px, as it changes; of paper while it prints. */
export function useWidth<E extends HTMLElement>(): [{ current: E | null }, number] {
  const element = useRef<E>(null);
  const [width, setWidth] = useState(0);
  useLayoutEffect(() => {
    const measure = () => { if (element.current) setWidth(Math.floor(element.current.clientWidth)); };
    const watch = new ResizeObserver(measure);
    if (element.current) watch.observe(element.current);
    measure();
    return () => watch.disconnect();
  }, []);
  return [element, width];
}
