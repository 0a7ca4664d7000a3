import { useEffect, useMemo } from 'preact/hooks';
import { Resource } from './resource';

/** A resource that lives as long as the component and follows its address. A new `subject` drops the old value; the same one keeps it while loading. */
export function useResource<T>(address: string, subject = ''): Resource<T> {
  const resource = useMemo(() => new Resource<T>(address), [subject]);
  useEffect(() => void resource.load(address), [resource, address]);
  useEffect(() => () => resource.release(), [resource]);
  return resource;
}
