import { expect, test } from 'vitest';
import { limitShare, stepOf } from '../../src/bore/steps';
import { effect, unknown } from '../words/sample';

test('FiveSteps_AQuarterOfTheLimitEach', () => expect([-0.2, 0, 0.24, 0.25, 0.5, 0.99, 1, 7].map(stepOf)).toEqual([0, 0, 0, 1, 2, 3, 4, 4]));
test('Share_OfTheLimitAndNoneWithoutAResistance', () => {
  expect(limitShare(effect())).toBeCloseTo(0.33 / 0.41, 3);
  expect(limitShare(unknown('N1', 'x'))).toBeNull();
});
