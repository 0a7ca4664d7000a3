import { useEffect, useState } from 'preact/hooks';

/** A value once it has kept still for `wait` ms; the first one at once. */
export function useSettled(value: string, wait: number): string {
  const [settled, settle] = useState(value);
  useEffect(() => {
    if (value === settled) return;
    const timer = setTimeout(() => settle(value), wait);
    return () => clearTimeout(timer);
  }, [value, settled, wait]);
  return settled;
}
