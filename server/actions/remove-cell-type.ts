import { cellTypeInUse, removeCellType as removeStoredCellType } from '../store/cell-types.ts';
import { raiseAllRevisions } from '../store/sites.ts';
import { ownCellType } from './change-cell-type.ts';
import type { Deps } from './deps.ts';
import { Refusal } from './refusal.ts';

/**
 * Removes a cell type of the crew's own that nothing names any more.
 * @param deps what a deed needs
 * @param input which cell type
 * @throws Refusal 'not-found'; 'conflict' for a built-in one and while props or swaps name it
 */
export function removeCellType(deps: Deps, input: { cellTypeId: string }): void {
  deps.store.transact((db) => {
    ownCellType(db, input.cellTypeId);
    const uses = cellTypeInUse(db, input.cellTypeId);
    if (uses > 0)
      throw new Refusal(
        'conflict',
        `${uses} ${uses === 1 ? 'prop or swap names' : 'props and swaps name'} "${input.cellTypeId}". Give them another cell type first; what the log names has to stay.`,
      );
    removeStoredCellType(db, input.cellTypeId);
    raiseAllRevisions(db, deps.clock.now());
  });
}
