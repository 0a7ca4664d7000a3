/** What fingers do on a chart: one moves the cursor, two zoom. Vertical swipes stay with the page (touch-action: pan-y). Positions in px from the left of the plot. */
export interface TouchHandlers {
  cursor(x: number): void;
  /** Zoom by `factor` (under 1: show less) about `x`, and move by `dx`. */
  pinch(factor: number, x: number, dx: number): void;
  pinched(): void;
}

/** Listens on the plotting area; returns what stops it. */
export function watchTouch(area: HTMLElement, handlers: TouchHandlers): () => void {
  const fingers = new Map<number, number>();
  let apart = 0, middle = 0, pinching = false;
  const at = (e: PointerEvent) => e.clientX - area.getBoundingClientRect().left;
  const measure = () => {
    const [a, b] = [...fingers.values()] as [number, number];
    return { apart: Math.max(20, Math.abs(a - b)), middle: (a + b) / 2 };
  };
  const down = (e: PointerEvent) => {
    if (e.pointerType !== 'touch') return;
    fingers.set(e.pointerId, at(e));
    if (fingers.size === 1) handlers.cursor(at(e));
    if (fingers.size === 2) { ({ apart, middle } = measure()); pinching = true; }
  };
  const move = (e: PointerEvent) => {
    if (!fingers.has(e.pointerId)) return;
    fingers.set(e.pointerId, at(e));
    if (fingers.size === 1 && !pinching) handlers.cursor(at(e));
    if (fingers.size === 2) {
      const m = measure();
      handlers.pinch(apart / m.apart, m.middle, middle - m.middle);
      ({ apart, middle } = m);
    }
  };
  const up = (e: PointerEvent) => {
    if (!fingers.delete(e.pointerId) || fingers.size > 0) return;
    if (pinching) handlers.pinched();
    pinching = false;
  };
  const listeners = [['pointerdown', down], ['pointermove', move], ['pointerup', up], ['pointercancel', up]] as const;
  listeners.forEach(([name, act]) => area.addEventListener(name, act));
  return () => listeners.forEach(([name, act]) => area.removeEventListener(name, act));
}
