import type { CellType } from '../model/cell-type.ts';
import { builtInCellType } from '../model/cell-types-built-in.ts';
import { findCellType, updateCellType } from '../store/cell-types.ts';
import type { Db } from '../store/open.ts';
import { raiseAllRevisions } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { nothingCalled, Refusal } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

/** What can change: the kind of cells cannot, since the log would then tell another story. */
export type CellTypeChanges = Partial<
  Pick<
    CellType,
    'name' | 'capacityMah' | 'nominalVolts' | 'cellsInside' | 'priceEach' | 'massG' | 'rechargeable'
  >
>;

/**
 * Changes a cell type of the crew's own.
 * @param deps what a deed needs
 * @param input its id and the fields to replace
 * @throws Refusal 'not-found'; 'conflict' for a built-in one
 */
export function changeCellType(
  deps: Deps,
  input: { cellTypeId: string; changes: CellTypeChanges },
): CellType {
  return deps.store.transact((db) => {
    const type: CellType = { ...ownCellType(db, input.cellTypeId), ...input.changes };
    type.name = tidyText(type.name);
    updateCellType(db, type);
    raiseAllRevisions(db, deps.clock.now());
    return type;
  });
}

/**
 * A cell type that may be changed or removed.
 * @param db the transaction a deed is in
 * @param cellTypeId its id
 * @throws Refusal 'not-found'; 'conflict' for a built-in one
 */
export function ownCellType(db: Db, cellTypeId: string): CellType {
  if (builtInCellType(cellTypeId))
    throw new Refusal(
      'conflict',
      `"${cellTypeId}" is built in and stays as it is. Add one of your own with the numbers you measured.`,
    );
  const type = findCellType(db, cellTypeId);
  if (!type) throw nothingCalled('cell type', cellTypeId);
  return type;
}
