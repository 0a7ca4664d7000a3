import { describe, expect, test } from 'vitest';
import type { Line } from '../../src/api/types';
import { aged } from '../../src/words/aged';
import { cleanlinessWords, dueWords } from '../../src/words/due';
import { against, effectWords } from '../../src/words/effect';
import { lineWords } from '../../src/words/line';
import { due, effect, line, now, unknown } from './sample';

const zone = 'Europe/Copenhagen';
const text = (l: Line) => lineWords(l, now, zone).map(p => p.text).join('');
const stale = { readings: 'stale' as const, latest_reading_at: '2026-11-30T10:08:00Z' };

const cases: Record<string, Line> = {
  calm: line([effect()]),
  due: line([effect(), due('N4', '2026-11-29T04:00:00Z')]),
  severalDue: line([due('N2', '2026-11-30T04:00:00Z'), due('N4', '2026-11-29T04:00:00Z'), unknown('N3', 'no driving force')]),
  unknown: line([effect(), unknown('N3', 'chest pressure is absent')]),
  stale: line([effect()], stale),
  staleDue: line([due('N4', '2026-11-29T04:00:00Z')], stale),
  none: line([effect()], { readings: 'none', latest_reading_at: null }),
  idle: line([effect()], { state: 'idle' }),
  cleaning: line([effect({ cleaning_since: '2026-11-30T06:10:00Z' }), effect({ name: 'N2' })]),
  noLimit: line([effect({ due: { state: 'no limit', limit: null, since: null, sentence: null, evidence: [] } })]),
};

describe.each(Object.entries(cases))('line %s', (_, l) => {
  test('Sentences_AtMostTwoOf25WordsAndOneBoldClause', () => {
    const sentences = text(l).split(/(?<=[.!?])\s+(?=[A-Z])/);
    expect(sentences.length).toBeLessThanOrEqual(2);
    for (const s of sentences) expect(s.split(/\s+/).length).toBeLessThanOrEqual(25);
    expect(lineWords(l, now, zone).filter(p => p.bold).length).toBeLessThanOrEqual(1);
  });
  test('Words_NeverPromise', () => expect(text(l)).not.toMatch(/healthy|optimal|all ok|will fail|score|guaranteed|safe to open/i));
});

test('StaleReadings_NoCalmWords', () => {
  expect(text(cases.stale!)).toBe('No reading has come for 3 h, since 11:08. What is drawn here is as of then.');
  expect(text(cases.staleDue!)).toContain('By then N4 was due.');
  expect(dueWords(effect(), now, false).words).toBe('was not due');
  const words = effectWords(effect(), 'stale', Date.parse(stale.latest_reading_at), now, zone).map(p => p.text).join('');
  expect(words).not.toContain('not due');
});
test('SeveralDue_TheLongestDueComesFirst', () => {
  expect(text(cases.severalDue!)).toBe('N4 has been under its coefficient floor for 34 h: 680 of 690 W/(m²·K). N2 is due too; N3 cannot be judged.');
});
test('Unknown_SaysWhy', () => expect(text(cases.unknown!)).toBe('N3 cannot be judged: chest pressure is absent. No cleaning is due at the others.'));
test('DueEffect_NamesLimitAndSince', () => {
  expect(dueWords(due('N4', '2026-11-29T03:32:00Z'), now, true)).toEqual({ mark: 'now', words: 'due for 34 h: coefficient floor' });
});
test('ResistanceUnderItsUncertainty_CannotBeToldFromClean', () => {
  const e = effect();
  expect(cleanlinessWords({ ...e, now: { ...e.now!, fouling_resistance_m2k_w: 0.00001, fouling_resistance_u: 0.00003 } })).toBe('cannot be told from clean');
});
test('LiveWhenFetchedButGrownOldOnThePage_ReadsAsStale', () => {
  expect(aged(cases.calm!, now).readings).toBe('live');
  const later = now + 20 * 60_000;
  expect(lineWords(aged(cases.calm!, later), later, zone).map(p => p.text).join('')).toMatch(/^No reading has come for 20 min/);
});
test('LimitAgainstBound_ToTheDecimalsThatTellThemApart', () => {
  expect(against(0.7612, 0.7, '1')).toEqual({ value: '76', bound: '70', unit: '%' });
  expect(against(673.4, 690, 'W/(m2.K)')).toEqual({ value: '673', bound: '690', unit: 'W/(m²·K)' });
  expect(against(0.000334, 0.00041, 'm2.K/W')).toMatchObject({ value: '0.33', bound: '0.41', unit: 'm²·K/kW' });
  expect(against(0.6961, 0.7, '1')).toEqual({ value: '69.6', bound: '70.0', unit: '%' });
  expect(against(null, 600, 'h')).toEqual({ value: 'not known', bound: '600', unit: 'h' });
});
