/** Calls `act` at once, then at most once per `interval` ms with the latest wish; the last wish is never lost. */
export function throttle(act: () => void, interval: number): () => void {
  let waiting = false, again = false;
  const run = () => {
    act();
    waiting = true;
    setTimeout(() => {
      waiting = false;
      if (again) { again = false; run(); }
    }, interval);
  };
  return () => { if (waiting) again = true; else run(); };
}
