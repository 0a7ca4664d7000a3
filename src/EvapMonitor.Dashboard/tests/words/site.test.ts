import { expect, test } from 'vitest';
import { siteWords } from '../../src/words/site';
import { due, effect, line, unknown } from './sample';

const words = (...lines: Parameters<typeof siteWords>[0][number][]) => siteWords(lines).map(p => p.text).join('');
const silent = line([due('N4', '2026-11-29T04:00:00Z')], { readings: 'stale' });

test('SomeAsk_CountedOfAll', () => expect(words(line([due('N4', '2026-11-29T04:00:00Z')]), line([unknown('N1', 'x')]), line([effect()]))).toBe('2 of 3 lines ask for something.'));
test('SilentLine_CountedApartAndNeverAsCalm', () => expect(words(line([effect()]), silent)).toBe('None of 1 line with live readings asks for anything; 1 is silent.'));
test('CleaningUnderWay_AsksForNothing', () => expect(words(line([{ ...due('N4', '2026-11-29T04:00:00Z'), cleaning_since: '2026-11-30T06:00:00Z' }]), line([effect()]))).toMatch(/^None/));
