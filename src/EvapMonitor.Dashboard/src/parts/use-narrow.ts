import { useEffect, useState } from 'preact/hooks';

const query = matchMedia('(max-width: 639px)');

/** True on a phone, under 640 px. */
export function useNarrow(): boolean {
  const [narrow, setNarrow] = useState(query.matches);
  useEffect(() => {
    const follow = () => setNarrow(query.matches);
    query.addEventListener('change', follow);
    return () => query.removeEventListener('change', follow);
  }, []);
  return narrow;
}
