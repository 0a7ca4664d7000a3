import { expect, test } from 'vitest';
import type { Balance, BalanceVariable, Fit } from '../../src/api/types';
import { byPlace, fitWords, misfit, rowNumbers, stateWords } from '../../src/words/balance';
import { now } from './sample';

const fit = (part: Partial<Fit> = {}): Fit => ({ state: 'fits', words: 'fits the others', since: null, wanted: 0.1, unit: 't/h', wanted_in_standards: 0.3, one_of: [], as_of: '2026-11-30T13:30:00Z', ...part });
const variable = (part: Partial<BalanceVariable> = {}): BalanceVariable => ({
  variable: 'feed_flow', place: 'feed', what: 'flow', unit: 't/h', measured: 206.31, reconciled: 187.66, standard: 1.12, correction: -18.66, correction_in_standards: -9.23, class: 'checked by others', signals: ['N.FT-10'], suspicion: null, ...part,
});

test('Misfit_SaysSinceWhen', () => {
  const off = fit({ state: 'does not fit', words: 'does not fit the others: the others want −19 t/h (9.2 standard uncertainties)', since: '2026-11-30T05:10:00Z' });
  expect(fitWords(off, 'Europe/Copenhagen', now)).toBe('does not fit the others: the others want −19 t/h (9.2 standard uncertainties), since 06:10');
  expect([off, fit({ state: 'left out' }), fit(), fit({ state: 'not checked' }), null].map(misfit)).toEqual([true, true, false, false, false]);
  expect(fitWords(null, 'Europe/Copenhagen', now)).toBe('no balance');
});
test('Row_IsRoundedToTheUncertaintyOfTheBalance', () => {
  expect(rowNumbers(variable())).toEqual({ measured: '206.3', reconciled: '187.7 ± 1.1', correction: '−18.7 (9.2)' });
  expect(rowNumbers(variable({ correction: 0.4, correction_in_standards: 0.31 })).correction).toBe('+0.4 (0.3)');
  expect(rowNumbers(variable({ measured: null, correction: null, correction_in_standards: null, reconciled: null, standard: null }))).toEqual({ measured: '–', reconciled: 'cannot be told', correction: '–' });
});
test('State_PutsSuspicionFirst', () => {
  expect(stateWords(variable({ suspicion: 'N.FT-10 left out' }))).toBe('N.FT-10 left out');
  expect(stateWords(variable({ class: 'follows from others' }))).toBe('nothing checks it');
  expect(stateWords(variable({ class: 'follows from others', measured: null }))).toBe('no reading; follows from others');
  expect(stateWords(variable({ class: 'follows from others', signals: [] }))).toBe('follows from others');
});
test('Variables_StandByPlaceInTheirOrder', () => {
  const of = { variables: [variable(), variable({ variable: 'feed_solids', what: 'solids', signals: [] }), variable({ variable: 'leaving_flow N1', place: 'N1' }), variable({ variable: 'feed_temperature' })] } as Balance;
  expect(byPlace(of, true).map(g => [g.place, g.variables.map(v => v.variable)])).toEqual([['feed', ['feed_flow', 'feed_temperature']], ['N1', ['leaving_flow N1']]]);
  expect(byPlace(of, false).flatMap(g => g.variables.map(v => v.variable))).toEqual(['feed_solids']);
});
