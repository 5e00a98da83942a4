import type { CellType } from '../model/cell-type.ts';
import { BUILT_IN_CELL_TYPES, builtInCellType } from '../model/cell-types-built-in.ts';
import { findCellType, listCellTypes } from '../store/cell-types.ts';
import type { Db } from '../store/open.ts';
import type { Deps } from './deps.ts';
import { didYouMean, nearNames } from './near-names.ts';
import { type Fault, nothingCalled } from './refusal.ts';

/**
 * A cell type, built in or the crew's own.
 * @param deps what a deed needs
 * @param id its id, as 'LR6'
 */
export function findCellTypeAnywhere(deps: Pick<Deps, 'store'>, id: string): CellType | null {
  return builtInCellType(id) ?? findCellType(deps.store.db, id);
}

/**
 * The cell type with an id, built in or the crew's own.
 * @param deps what a deed needs
 * @param id its id, as 'LR6'
 * @throws Refusal 'not-found'
 */
export function cellTypeOf(deps: Pick<Deps, 'store'>, id: string): CellType {
  const type = findCellTypeAnywhere(deps, id);
  if (!type) throw nothingCalled('cell type', id);
  return type;
}

/**
 * Says that no cell type has an id, and which were perhaps meant.
 * @param db the database, or the transaction a deed is in
 * @param id what was given
 */
export function unknownCellTypeFault(db: Db, id: string): Fault {
  const ids = [...BUILT_IN_CELL_TYPES, ...listCellTypes(db)].map((type) => type.id);
  const guess =
    didYouMean(nearNames(id, ids)) || ' AA alkaline is "LR6"; the list of cell types names them all.';
  return { field: 'cellTypeId', message: `No cell type is called ${JSON.stringify(id)}.${guess}` };
}
