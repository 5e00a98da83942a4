import type { CellType } from '../model/cell-type.ts';
import { BUILT_IN_CELL_TYPES } from '../model/cell-types-built-in.ts';
import { listCellTypes as listOwnCellTypes } from '../store/cell-types.ts';
import type { Deps } from './deps.ts';

/**
 * Every cell type: the crew's own first, then the built-in ones.
 * @param deps what a deed needs
 */
export function listCellTypes(deps: Deps): CellType[] {
  return [...listOwnCellTypes(deps.store.db), ...BUILT_IN_CELL_TYPES];
}
