import { expect, test } from 'vitest';
import { chosen, choices, readChoice, writeChoice } from '../../src/today/choice';
import { due, effect, line } from '../words/sample';

const lines = [
  line([effect()], { name: 'North 1' }), line([due('N4', '2026-11-29T04:00:00Z')], { name: 'North 2' }),
  line([due('N4', '2026-11-29T04:00:00Z')], { name: 'South', readings: 'stale', latest_reading_at: '2026-11-30T10:08:00Z' }),
];
const names = (show: 'all' | 'asking' | 'silent', named = '') => chosen(lines, { show, named }).map(l => l.name);

test('Choice_ByStateAndByName_KeepsTheOrder', () => {
  expect(names('all')).toEqual(['North 1', 'North 2', 'South']);
  expect(names('asking')).toEqual(['North 2']);
  expect(names('silent')).toEqual(['South']);
  expect(names('all', ' nORTH ')).toEqual(['North 1', 'North 2']);
});
test('Counts_SilentApartFromThoseThatAsk', () => expect(choices(lines).map(c => c[1])).toEqual(['every line (3)', 'lines that ask (1)', 'silent lines (1)']));
test('AddressBar_HoldsTheChoiceAndBack', () => {
  const choice = { show: 'asking' as const, named: 'a&b' };
  expect(readChoice(writeChoice(choice))).toEqual(choice);
  expect(writeChoice({ show: 'all', named: '' })).toBe('');
  expect(readChoice('?show=nonsense')).toEqual({ show: 'all', named: '' });
});
