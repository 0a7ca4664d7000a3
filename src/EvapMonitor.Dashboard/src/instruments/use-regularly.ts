import { useEffect, useRef } from 'preact/hooks';
import { connection } from '../live/connection';

/** Does something every so many ms while the page is looked at and the service is there: counts and ages change without an event. */
export function useRegularly(act: () => void, every: number): void {
  const latest = useRef(act);
  latest.current = act;
  useEffect(() => {
    const timer = setInterval(() => { if (connection.peek().state === 'open' && !document.hidden) latest.current(); }, every);
    return () => clearInterval(timer);
  }, [every]);
}
