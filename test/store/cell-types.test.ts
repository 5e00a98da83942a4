import { expect, test } from 'vitest';
import type { CellType } from '../../server/model/cell-type.ts';
import {
  cellTypeInUse,
  findCellType,
  insertCellType,
  listCellTypes,
  removeCellType,
  updateCellType,
} from '../../server/store/cell-types.ts';
import { insertEntry, undoEntry } from '../../server/store/log.ts';
import { insertProp } from '../../server/store/props.ts';
import { sampleCellType, sampleProp, sampleSwap, storeWithSamples } from './samples.ts';

test('a cell type comes back as it went in, with and without its price', () => {
  const { db, close } = storeWithSamples();
  const priced: CellType = { ...sampleCellType, priceEach: 0, rechargeable: true, name: 'Another box' };
  insertCellType(db, sampleCellType);
  insertCellType(db, { ...priced, id: 'another' });
  expect(findCellType(db, sampleCellType.id)).toStrictEqual(sampleCellType);
  expect(listCellTypes(db)).toStrictEqual([{ ...priced, id: 'another' }, sampleCellType]);
  updateCellType(db, { ...priced, id: sampleCellType.id });
  expect(findCellType(db, sampleCellType.id)).toStrictEqual({ ...priced, id: sampleCellType.id });
  updateCellType(db, sampleCellType);
  expect(findCellType(db, sampleCellType.id)).toStrictEqual(sampleCellType);
  expect(findCellType(db, 'LR6')).toBeNull();
  close();
});

test('uses are counted in props and in swaps, undone or not', () => {
  const { db, close } = storeWithSamples();
  insertCellType(db, sampleCellType);
  expect(cellTypeInUse(db, sampleCellType.id)).toBe(0);
  insertProp(db, { ...sampleProp, id: 'prop-2', tag: 'B-07', cellTypeId: sampleCellType.id });
  insertEntry(db, { ...sampleSwap, cellTypeId: sampleCellType.id });
  insertEntry(db, { ...sampleSwap, id: 'swap-2' });
  undoEntry(db, sampleSwap.id, sampleSwap.at);
  expect(cellTypeInUse(db, sampleCellType.id)).toBe(2);
  expect(removeCellType(db, sampleCellType.id)).toBe(true);
  expect(removeCellType(db, sampleCellType.id)).toBe(false);
  close();
});
