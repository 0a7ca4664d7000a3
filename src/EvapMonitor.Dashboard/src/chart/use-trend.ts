import { useEffect, useMemo } from 'preact/hooks';
import type { Trend } from '../api/types';
import { useResource } from '../api/use-resource';
import { columns } from './trend';

/** A series that follows its address, as the chart draws it. `version`: fetched anew when it changes. */
export function useTrend(address: string, subject: string, version: string) {
  const resource = useResource<Trend>(address, subject);
  useEffect(() => { if (resource.state.peek().value) void resource.load(); }, [version]);
  const { value, loadingSince } = resource.state.value;
  const mapped = useMemo(() => value && columns(value), [value]);
  return { resource, columns: mapped, busy: loadingSince !== null };
}
