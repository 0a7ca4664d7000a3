import { expect, test } from 'vitest';
import type { CleanReference } from '../../src/api/types';
import { exponentRows, restsOn } from '../../src/words/expectation';
import { now } from './sample';

const reference: CleanReference = {
  surface: 'N4', product: 'juice', since: '2026-11-13T10:00:00Z', source: 'level of 2; conditions learnt from 1645 hours of 72 days: solids -0.21 ± 0.03, boiling temperature 0.004 ± 0.001 (held at its bound), flux 0 ± 0.009 (not told from 0)', coefficient_w_m2k: { value: 962, u: 5 }, by_solids: { value: -0.21, u: 0.03 },
  by_boiling_temperature: { value: 0.004, u: 0.001 }, by_heat_flux: { value: 0, u: 0.009 }, reference_solids: 0.58, reference_boiling_temperature_c: 61.89, reference_heat_flux_kw_m2: 15.14,
};

test('Source_ItsHeadWithTheDateOfThePage', () => expect(restsOn('level of 2 of the last 5 cleanings with this product, the last on 2026-11-13; conditions learnt from 1645 hours', 'UTC', now))
  .toBe('level of 2 of the last 5 cleanings with this product, the last on Fri 13 Nov'));
test('Exponents_WithUncertaintyAndWhatTheyMean', () => expect(exponentRows(reference)).toEqual([
  { name: 'solids leaving', exponent: '−0.21 ± 0.03', meaning: 'a tenth more solids: 2.0 % lower', reference: '58.0 %' },
  { name: 'boiling temperature', exponent: '0.0040 ± 0.0010', meaning: '10 K more: 4.1 % higher (held at its bound)', reference: '61.9 °C' },
  { name: 'heat flux', exponent: '0.000 ± 0.009', meaning: 'taken as none: not told from 0', reference: '15.1 kW/m²' },
]));
test('ExponentNotKnown_SaysSo', () => expect(exponentRows({ ...reference, by_solids: { value: null, u: null }, reference_solids: null })[0]).toEqual({ name: 'solids leaving', exponent: 'not known', meaning: 'not followed', reference: '' }));
test('ConditionThatHardlyMoved_IsNotLearnt', () => expect(exponentRows({ ...reference, source: 'x: solids 0 (hardly moved)', by_solids: { value: 0, u: 0.5 } })[0]).toMatchObject({ exponent: '0.0 ± 0.5', meaning: 'not learnt: it hardly moved' }));
