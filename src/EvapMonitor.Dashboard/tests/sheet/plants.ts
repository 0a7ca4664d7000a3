import plants from './plants.json';
import type { FlowSheet } from '../../src/api/types';

type Drawn = Pick<FlowSheet, 'places' | 'ways'>;

/** Lines as the service answers them, each instrument with a reading; its tests hold this file to its code. */
export const sheets = Object.entries(plants as unknown as Record<string, Drawn>);
export const sheet = (name: string): Drawn => (plants as unknown as Record<string, Drawn>)[name]!;
