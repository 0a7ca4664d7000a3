import type { FlowSheet, Place, WayKind } from '../api/types';
import type { Column } from './order';

/** The kinds of ways with their letters, in the order of the drawing. */
export const kinds: { kind: WayKind; letter: string; name: string }[] = [
  { kind: 'steam', letter: 'S', name: 'steam' }, { kind: 'motive', letter: 'M', name: 'motive steam' }, { kind: 'vapour', letter: 'V', name: 'vapour' }, { kind: 'bleed', letter: 'B', name: 'bleed' },
  { kind: 'liquor', letter: 'L', name: 'liquor' }, { kind: 'condensate', letter: 'C', name: 'condensate' },
];

/** The drawing in words, way by way from place to place, for those who do not see it. */
export function spoken({ places, ways }: Pick<FlowSheet, 'places' | 'ways'>, columns: Column[]): string {
  const name = new Map(places.map(p => [p.id, said(p)]));
  const effects = columns.filter(c => c.kind === 'effect').map(c => c.name);
  const parts = kinds.map(({ kind, name: what }) => {
    const from = [...new Set(ways.filter(w => w.kind === kind).map(w => w.from))];
    return from.length === 0 ? null : `${what[0]!.toUpperCase()}${what.slice(1)}: ${from.map(f => `from ${name.get(f)} to ${every(ways.filter(w => w.kind === kind && w.from === f).map(w => name.get(w.to)!))}`).join('; ')}.`;
  });
  return [`${effects.length === 1 ? 'One effect' : `${effects.length} effects`} in the order of the steam: ${effects.join(', ')}.`, ...parts].filter(Boolean).join(' ');
}

/** All the names, however many. */
export const every = (names: string[]) => (names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`);

const said = (p: Place) => (p.kind === 'heater' ? `heater ${p.name}` : p.kind === 'tank' ? `tank ${p.name}` : p.kind.endsWith('recompressor') ? `${p.kind} ${p.name}` : p.kind === 'flash vessel' ? `the vessel of the ${p.name}` : p.name);
