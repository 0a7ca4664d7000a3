import { useSignal } from '@preact/signals';
import { useEffect, useRef } from 'preact/hooks';
import { useLocation, useSearch } from 'wouter-preact';
import type { Quantity } from '../api/types';
import { calmNow } from '../site/clock';
import { useSettled } from './use-settled';
import { readView, spanOf, viewOf, writeView, type Span } from './view';

/** The span that the address bar names, and how to change it. `settled`: the span that is fetched, once it has kept still. */
export function useSpan() {
  const search = useSearch();
  const [path, navigate] = useLocation();
  const view = readView(search);
  const moving = useSignal<Span | null>(null);
  useEffect(() => { moving.value = null; }, [search]);
  const span = moving.value ?? spanOf(view, calmNow.value);
  const write = (next: Span, replace: boolean) => navigate(path + writeView(viewOf(next, view.quantity, calmNow.peek())), { replace });
  // Fingers and keys move faster than browsers let the address change; it follows when they rest.
  const rest = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => () => clearTimeout(rest.current), []);
  const show = (next: Span, settled: boolean) => {
    clearTimeout(rest.current);
    moving.value = settled ? null : next;
    if (settled) write(next, false);
    else rest.current = setTimeout(() => write(next, true), 300);
  };
  const reset = () => { clearTimeout(rest.current); moving.value = null; navigate(path + writeView({ from: null, to: null, quantity: view.quantity })); };
  const choose = (quantity: Quantity | null) => navigate(path + writeView({ ...view, quantity }), { replace: true });
  // What a button or the address names is fetched at once.
  const [from, to] = useSettled(`${span.from} ${span.to}`, moving.value === null ? 0 : 250).split(' ').map(Number) as [number, number];
  return { span, settled: { from, to }, quantity: view.quantity, show, reset, choose };
}
