import { expect, test } from 'vitest';
import type { MeasuredNow, Way } from '../../src/api/types';
import { flowTexts } from '../../src/sheet/reading';

const flow: MeasuredNow = { what: 'flow', signal: 'N.FT-10', value: 206.31, unit: 't/h', at: '2026-11-30T13:31:57Z', state: 'good' };
const way = (part: Partial<Way>): Way => ({ from: 'feed', to: 'effect/N1', kind: 'liquor', share: null, share_u: null, flow: null, balance: null, ...part });
const balance = (agrees: boolean | null) => ({ value: 187.66, standard: 1.1, unit: 't/h', as_of: '2026-11-30T13:30:00Z', agrees });

test('ReadingThatFits_StandsPlain', () => expect(flowTexts(way({ flow, balance: balance(true) }))).toEqual(['206 t/h']));
test('ReadingThatDoesNotFit_StandsBesideTheBalance', () => expect(flowTexts(way({ flow, balance: balance(false) }))).toEqual(['read 206 t/h, 188*', '188 t/h*', '188*']));
test('NoInstrument_HasTheStarOfTheBalance', () => expect(flowTexts(way({ balance: balance(null) }))).toEqual(['188 t/h*', '188*']));
test('NeitherReadNorBalanced_SaysNothing', () => expect(flowTexts(way({}))).toEqual([]));
test('OldReading_IsNotHeldAgainstAnOldBalance', () => expect(flowTexts(way({ flow: { ...flow, state: 'stale' }, balance: balance(false) }))).toEqual(['was 206 t/h']));
