import { expect, test } from 'vitest';
import { bytes, fixed, measured, raw, significant } from '../../src/words/number';
import { prettyUnit, shownAs } from '../../src/words/quantity';

test.each([
  [730.4, 17, '730 ± 17'], [16.93, 0.42, '16.9 ± 0.4'], [76.2, 2.1, '76 ± 2'], [16012, 300, '16\u202f000 ± 300'], [0.333, 0.031, '0.33 ± 0.03'],
  [-0.012, 0.02, '\u22120.01 ± 0.02'], [960, null, '960'], [12.34, 0, '12.3'], [731, 19.7, '730 ± 20'],
])('%s WithUncertainty%s_Reads%s', (v, u, words) => expect(measured(v, u)).toBe(words));

test('RawValues_WithoutZerosBehindThem', () => expect([raw(1.4), raw(-0.30000001), raw(23), raw(1234567)]).toEqual(['1.4', '\u22120.3', '23', '1\u202f234\u202f570']));
test('MinusZero_HasNoSign', () => expect(fixed(-0.001, 1)).toBe('0.0'));
test('FourDigits_NoSpace', () => expect(fixed(2900)).toBe('2900'));
test('Significant_NeverInPowers', () => expect([significant(123456, 2), significant(0.000123, 2), significant(0, 3)]).toEqual(['120\u202f000', '0.00012', '0']));
test.each([[840, '840 B'], [1842310, '1.8 MB'], [999_600, '1.0 MB']])('%s Bytes_Reads%s', (n, words) => expect(bytes(n)).toBe(words));

test('ResistanceInItsUnit_IsShownPerKilowatt', () => expect(shownAs('fouling_resistance', 'm2.K/W')).toEqual({ factor: 1000, unit: 'm²·K/kW' }));
test('UnforeseenUnit_IsShownAsItCame', () => expect(shownAs('fouling_resistance', 'm2.K/kW')).toEqual({ factor: 1, unit: 'm2.K/kW' }));
test('Units_InTheTypeOfThePage', () => expect([prettyUnit('W/(m2.K)'), prettyUnit('degC'), prettyUnit('h')]).toEqual(['W/(m²·K)', '°C', 'h']));
