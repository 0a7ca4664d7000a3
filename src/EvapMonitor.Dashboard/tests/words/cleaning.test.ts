import { describe, expect, test } from 'vitest';
import { askedWords, knownWords, laneWords, onePerEffect, surfaceWords, verdictWords, waiting } from '../../src/words/cleaning';
import { now } from './sample';
import { cleaning, recognised, result } from './sample-cleaning';

test.each([
  [cleaning(), 'cleaned', ''], [cleaning({ end: null, result: null }), 'goes on', ''], [cleaning({ result: null }), 'not computed yet', ''],
  [cleaning({ result: result({ verdict: 'awaiting hours', reason: 'nothing was produced since' }) }), 'waits for hours of production', 'nothing was produced since'],
  [cleaning({ known_by: 'rejected' }), 'no cleaning', 'somebody says so'],
])('Verdict %#_InWords', (c, words, why) => expect(verdictWords(c)).toEqual({ words, why }));
test('Known_EachInItsWord', () => expect((['logged', 'signal', 'recognised', 'rejected'] as const).map(known_by => knownWords(cleaning({ known_by })))).toEqual(['logged', 'by signal', 'recognised, not logged', 'rejected: no cleaning']));

describe('lane words', () => {
  test('Logged_KindAndShare', () => expect(laneWords(cleaning())).toEqual({ long: 'chemical, 95 % removed', short: '95 %' }));
  test('Recognised_SaysSo', () => expect(laneWords(recognised()).long).toBe('recognised, 95 % removed'));
  test('Failed_SaysSoEvenShort', () => expect(laneWords(cleaning({ result: result({ verdict: 'did not clean' }) }))).toEqual({ long: 'chemical, did not clean', short: 'did not clean' }));
  test('ABody_IsNamed', () => expect(laneWords(cleaning({ result: result({ surface: 'NB' }) })).long).toBe('NB: chemical, 95 % removed'));
  test('ShareOver100_StaysSo', () => expect(laneWords(cleaning({ result: result({ removed_share: 1.019 }) })).short).toBe('102 %'));
});
test('SurfaceOfTheEffectItself_NeedsNoName', () => expect([surfaceWords(cleaning()), surfaceWords(cleaning({ body: 'NB', result: null }))]).toEqual([null, 'NB']));

describe('waiting', () => {
  const older = recognised({ start: '2026-09-01T00:00:00Z', end: '2026-09-01T08:00:00Z' });
  test('RecognisedWithoutAnEntry_NewestFirst', () => expect(waiting([older, cleaning({ start: '2026-08-01T00:00:00Z', end: '2026-08-01T01:00:00Z' }), recognised()])).toEqual([recognised(), older]));
  test.each(['logged', 'rejected'] as const)('AnEntryThatIs %s_AnswersAtOnce', known_by => expect(waiting([recognised(), cleaning({ known_by, start: '2026-10-26T03:00:00Z', result: null })])).toEqual([]));
  test('AnEntryOfAnotherEffect_DoesNotAnswer', () => expect(waiting([recognised(), cleaning({ effect: 'N3' })])).toHaveLength(1));
  test('OnePerEffect_TheNewest', () => expect(onePerEffect(waiting([older, recognised(), recognised({ effect: 'N3' })])).map(c => `${c.effect} ${c.start.slice(5, 7)}`)).toEqual(['N4 10', 'N3 10']));
});

test('Question_SaysWhatRoseWhenAndHowSure', () => {
  const { head, rest } = askedWords(recognised(), 'Europe/Copenhagen', now);
  expect(head).toBe('lost 0.3700 ± 0.0016 m²·K/kW of resistance on Mon 26 Oct without an entry');
  expect(rest).toBe(', 95 % of what was there: was it cleaned? It was out of production from Mon 26 Oct 01:00 for 8 h; that its coefficient rose is as good as certain.');
});
test('QuestionWithoutNumbers_AsksAllTheSame', () => {
  const { head, rest } = askedWords(recognised({ result: null }), 'Europe/Copenhagen', now);
  expect(`${head}${rest}`).toBe('came back better on Mon 26 Oct without an entry: was it cleaned? It was out of production from Mon 26 Oct 01:00 for 8 h.');
});
