import { expect, test } from 'vitest';
import type { CleanReference } from '../../src/api/types';
import { exponentRows, restsOn } from '../../src/words/expectation';
import { now } from './sample';

const reference: CleanReference = {
  surface: 'N4', product: 'juice', since: '2026-11-13T10:00:00Z', source: 'x', coefficient_w_m2k: { value: 962, u: 5 }, by_solids: { value: -0.21, u: 0.03 },
  by_boiling_temperature: { value: 0.004, u: 0.001 }, by_heat_flux: { value: 0, u: 0.009 }, reference_solids: 0.58, reference_boiling_temperature_c: 61.89, reference_heat_flux_kw_m2: 15.14,
};

test('Source_ItsHeadWithTheDateOfThePage', () => expect(restsOn('level of 2 of the last 5 cleanings with this product, the last on 2026-11-13; conditions learnt from 1645 hours', 'UTC', now))
  .toBe('level of 2 of the last 5 cleanings with this product, the last on Fri 13 Nov'));
test('Exponents_WithUncertaintyAndWhatTheyMean', () => expect(exponentRows(reference)).toEqual([
  { name: 'solids leaving', exponent: '−0.21 ± 0.03', meaning: 'a tenth more solids: 2.0 % lower', reference: '58.0 %' },
  { name: 'boiling temperature', exponent: '0.0040 ± 0.0010', meaning: '10 K more: 4.1 % higher', reference: '61.9 °C' },
  { name: 'heat flux', exponent: '0.000 ± 0.009', meaning: 'does not move it, or that could not be told', reference: '15.1 kW/m²' },
]));
test('ExponentNotKnown_SaysSo', () => expect(exponentRows({ ...reference, by_solids: { value: null, u: null }, reference_solids: null })[0]).toEqual({ name: 'solids leaving', exponent: 'not known', meaning: 'not followed', reference: '' }));
