import { expect, test } from 'vitest';
import { ofWallPage, wallPage, wallPages } from '../../src/site/wall';

const lines = Array.from({ length: 40 }, (_, i) => i + 1);

test('FortyLines_SevenPagesThatShowEachOnce', () => {
  expect(wallPages(40)).toBe(7);
  expect(Array.from({ length: 7 }, (_, p) => ofWallPage(lines, p)).flat()).toEqual(lines);
});
test('Page_CutEvery20sAndRoundAgain', () => {
  const begun = 7 * 20_000 * 1000;
  expect([0, 19_999, 20_000, 139_999, 140_000].map(t => wallPage(40, begun + t))).toEqual([0, 0, 1, 6, 0]);
});
test('SixLinesOrNone_OnePageThatStands', () => {
  expect([wallPages(6), wallPages(0), wallPage(6, 123_456_789), wallPage(0, 5)]).toEqual([1, 1, 0, 0]);
});
test('HeldPageBehindTheLastAfterLinesWereTakenAway_ShowsTheLast', () => expect(ofWallPage(lines.slice(0, 8), 6)).toEqual([7, 8]));
