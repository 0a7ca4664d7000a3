import { useEffect, useMemo, useState } from 'preact/hooks';
import { addresses } from '../api/addresses';
import { fetchJson } from '../api/request';
import type { Campaigns } from '../api/types';
import { lines } from '../site/state';

/** Bodies that have served an effect, by name; none for an effect with a surface of its own, or while they are not known. */
export function useBodies(line: string, effect: string): string[] {
  const [found, find] = useState<{ of: string; names: string[] }>({ of: '', names: [] });
  const known = lines.state.value.value?.lines.find(l => l.name === line)?.effects.find(e => e.name === effect);
  const turns = known !== undefined && known.surface !== effect, of = `${line}/${effect}`;
  useEffect(() => {
    if (!turns) return;
    const abort = new AbortController();
    // Without an answer the choice stays out: the body that served is taken.
    fetchJson<Campaigns>(addresses.campaigns(line, effect), abort.signal).then(all => find({ of, names: bodiesIn(all) }), () => undefined);
    return () => abort.abort();
  }, [of, turns]);
  return useMemo(() => (turns && found.of === of ? found.names : []), [turns, found, of]);
}

/** Names of the bodies in campaigns: surfaces that are not the effect's own, taken apart where several serve together. */
export function bodiesIn({ effect, surface, campaigns, stops }: Pick<Campaigns, 'effect' | 'surface' | 'campaigns' | 'stops'>): string[] {
  const surfaces = [surface, ...campaigns.map(c => c.surface), ...stops.map(s => s.surface)].filter((s): s is string => s !== null && s !== effect);
  return [...new Set(surfaces.flatMap(s => s.split('+')))].sort();
}
