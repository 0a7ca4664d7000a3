import { useEffect, useMemo, useState } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { fetchJson } from '../api/request';
import type { Cleaning } from '../api/types';
import { cleaningsChanged } from '../site/state';
import { waiting } from '../words/cleaning';

const none: Cleaning[] = [];

/** Recognised cleanings that wait for an answer; none while the log is not known. `wanted`: a site of many lines does not carry its whole log to the first page. */
export function useAsked(wanted: boolean): Cleaning[] {
  const [log, found] = useState<Cleaning[]>(none);
  const changes = cleaningsChanged.value;
  useEffect(() => {
    if (!wanted) return;
    const abort = new AbortController();
    // Without an answer nothing is asked; the Cleanings page says what is wrong.
    fetchJson<{ cleanings: Cleaning[] }>(addresses.cleanings(), abort.signal).then(all => found(all.cleanings), () => undefined);
    return () => abort.abort();
  }, [wanted, changes]);
  return useMemo(() => waiting(log), [log]);
}
