import { expect, test } from 'vitest';
import { columnsOf } from '../../src/sheet/order';
import { spoken } from '../../src/sheet/words';
import { sheet } from './plants';

test('the drawing in words names every way', () => {
  const jet = sheet('thermal-recompression');
  expect(spoken(jet, columnsOf(jet))).toBe('4 effects in the order of the steam: F1, F2, F3, FINISHER. Steam: from steam to FINISHER. Motive steam: from motive steam to thermal recompressor J1. '
    + 'Vapour: from thermal recompressor J1 to F1; from F1 to F2 and thermal recompressor J1; from F2 to F3; from F3 to condenser; from FINISHER to condenser. '
    + 'Liquor: from feed to F1; from F1 to F2; from F2 to F3; from F3 to FINISHER; from FINISHER to product. Condensate: from F1 to condensate; from F2 to condensate; from F3 to condensate; from FINISHER to condensate.');
});
