import { describe, expect, test } from 'vitest';
import { depositOf } from '../../src/bore/deposit';
import { failedWords, foulingWords, rateOf, residualOf } from '../../src/words/fouling';
import { effect, now } from './sample';
import { campaign, cleaning, result } from './sample-cleaning';

const zone = 'UTC', say = (of: Parameters<typeof foulingWords>[0], fresh = true) => foulingWords(of, fresh, zone, now).map(p => p.text).join('');

describe('rate', () => {
  test('LongCampaign_ByTheWeek_RoundedToItsUncertainty', () => expect(rateOf(campaign())).toMatchObject({ words: '0.154 ± 0.004 m²·K/kW a week', grows: true }));
  test('RunOfADay_ByTheDay', () => expect(rateOf(campaign({ production_hours: 18, rate_m2k_w_per_day: { value: 0.0000884, u: 0.0000063 } }))).toMatchObject({ words: '0.088 ± 0.006 m²·K/kW a day', per: 'day' }));
  test('UnderTwiceItsUncertainty_CannotBeTold', () => expect(rateOf(campaign({ rate_m2k_w_per_day: { value: 0.000001, u: 0.0000006 } }))?.grows).toBeNull());
  test('Falling_DoesNotGrow', () => expect(rateOf(campaign({ rate_m2k_w_per_day: { value: -0.000022, u: 0.0000006 } }))?.grows).toBe(false));
  test('NotKnown_None', () => expect(rateOf(campaign({ rate_m2k_w_per_day: { value: null, u: null } }))).toBeNull());
});

describe('sentence', () => {
  test('Fouling_RateShareOfTheLimitAndWhatWasLeft', () => expect(say(effect({ campaign: campaign() })))
    .toBe('N1 fouls by 0.154 ± 0.004 m²·K/kW a week of production, 38 % of its limit, since the cleaning of Fri 13 Nov. It began with 0.019 ± 0.005 left.'));
  test('Stale_IsToldOfThePast', () => expect(say(effect({ campaign: campaign() }), false)).toMatch(/^N1 fouled by/));
  test('NoGrowth_SaysThatNoneCanBeTold', () => expect(say(effect({ campaign: campaign({ rate_m2k_w_per_day: { value: 0.0000001, u: 0.000001 } }) }))).toMatch(/^No fouling of N1 can be told/));
  test('Falling_SaysBySoMuchWithoutASign', () => expect(say(effect({ campaign: campaign({ rate_m2k_w_per_day: { value: -0.000022, u: 0.000001 } }) }))).toMatch(/^The resistance of N1 falls, by 0\.154/));
  test('NoCampaign_SaysSo', () => expect(say(effect())).toContain('not known yet'));
  test('RecognisedBegin_SaysThatNobodyLoggedIt', () => expect(say(effect({ campaign: campaign({ started_by: 'recognised' }) }))).toContain('the recovery of Fri 13 Nov, which nobody logged'));
  test.each([campaign(), campaign({ rate_m2k_w_per_day: { value: null, u: null } }), campaign({ started_by: 'first data' })])('OneClauseIsBold', of =>
    expect(foulingWords(effect({ campaign: of }), true, zone, now).filter(p => p.bold)).toHaveLength(1));
});

describe('residual', () => {
  test('Told_TheSameInRingAndSentence', () => {
    const e = effect({ campaign: campaign() });
    expect(depositOf(e, 1)?.deposit.residual).toBe(0.000019);
    expect(residualOf(e)).toMatchObject({ value: 0.000019, told: true });
    expect(say(e)).toContain('0.019 ± 0.005 left');
  });
  test('UnderItsUncertainty_NoRingAndNotToldFromClean', () => {
    const e = effect({ campaign: campaign({ initial_resistance_m2k_w: { value: 0.000004, u: 0.000008 } }) });
    expect(depositOf(e, 1)?.deposit.residual).toBeNull();
    expect(say(e)).toContain('not to be told from clean');
  });
  test('NotKnown_NoRingAndNoWord', () => {
    const e = effect({ campaign: campaign({ initial_resistance_m2k_w: { value: null, u: null } }) });
    expect(depositOf(e, 1)?.deposit.residual).toBeNull();
    expect(say(e)).not.toContain('began');
  });
});

test('DidNotClean_SaysSoWithItsNumbers', () => {
  const last = cleaning({ result: result({ verdict: 'did not clean', removed_m2k_w: { value: 0.000004, u: 0.000006 }, removed_share: 0.01 }) });
  expect(failedWords({ last_cleaning: last, surface: 'N4' }, zone, now)?.map(p => p.text).join('')).toBe('The cleaning of Mon 26 Oct did not clean: it removed 0.004 ± 0.006 of 0.388 ± 0.002 m²·K/kW (1 %).');
  expect(failedWords({ last_cleaning: last, surface: 'NB' }, zone, now)).toBeNull();
  expect(failedWords({ last_cleaning: cleaning(), surface: 'N4' }, zone, now)).toBeNull();
  expect(failedWords({ last_cleaning: null, surface: null }, zone, now)).toBeNull();
});
