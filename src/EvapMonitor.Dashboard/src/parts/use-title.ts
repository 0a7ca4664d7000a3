import { useEffect } from 'preact/hooks';
import { site } from '../site/state';

/** Title of the page: its subject, then the site. */
export function useTitle(subject: string): void {
  const name = site.state.value.value?.name ?? 'EvapMonitor';
  useEffect(() => { document.title = `${subject} · ${name}`; }, [subject, name]);
}
