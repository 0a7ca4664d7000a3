import { expect, test } from 'vitest';
import { fitted, textWidth, twoLines } from '../../src/sheet/text';

test('a name that fits is left alone', () => expect(fitted('N1', 80, 14)).toBe('N1'));

test('a long name keeps its end, by which neighbours differ', () => {
  const [a, b] = ['CONCENTRATOR-A', 'CONCENTRATOR-B'].map(n => fitted(n, 70, 14)) as [string, string];
  expect(a.endsWith('…-A') && b.endsWith('…-B')).toBe(true);
  expect(textWidth(a, 14)).toBeLessThanOrEqual(70);
});

test('a name breaks after its hyphen', () => expect(twoLines('juice-heater', 56, 13)).toEqual(['juice-', 'heater']));
