import { CELL_KINDS } from '../model/cell-kinds.ts';
import type { CellType } from '../model/cell-type.ts';
import { isRechargeable } from '../model/cell-types-built-in.ts';
import { insertCellType, listCellTypes } from '../store/cell-types.ts';
import { raiseAllRevisions } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { findCellTypeAnywhere } from './find-cell-type.ts';
import { Refusal } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

export type NewCellType = Omit<CellType, 'id' | 'name' | 'cellsInside' | 'rechargeable' | 'builtIn'> &
  Partial<Pick<CellType, 'id' | 'name' | 'cellsInside' | 'rechargeable'>>;

/** A block of six volts and more is made of several cells: their volts tell how many. */
function cellsInsideOf({ kind, nominalVolts }: Pick<CellType, 'kind' | 'nominalVolts'>): number {
  return Math.max(1, Math.round(nominalVolts / CELL_KINDS[kind].nominalVolts));
}

export const MOST_OWN_CELL_TYPES = 500;

/**
 * Adds a cell type of the crew's own.
 * @param deps what a deed needs
 * @param input the type; without an id it gets one, without a name it is called by its id
 * @throws Refusal 'conflict' when the id is taken or there are too many
 */
export function addCellType(deps: Deps, input: NewCellType): CellType {
  const id = input.id ?? deps.newId();
  const type: CellType = {
    ...input,
    id,
    name: tidyText(input.name ?? id),
    cellsInside: input.cellsInside ?? cellsInsideOf(input),
    rechargeable: input.rechargeable ?? isRechargeable(input.kind),
    builtIn: false,
  };
  return deps.store.transact((db) => {
    const holder = findCellTypeAnywhere(deps, id);
    if (holder) {
      const message = `"${id}" is already ${holder.builtIn ? 'a built-in cell type' : 'one of yours'}: ${holder.name}. Give this one another id, like "${id}-2".`;
      throw new Refusal('conflict', [{ field: 'id', message }]);
    }
    if (listCellTypes(db).length >= MOST_OWN_CELL_TYPES)
      throw new Refusal(
        'conflict',
        `${MOST_OWN_CELL_TYPES} cell types of your own are kept at most. Remove one nobody uses first.`,
      );
    insertCellType(db, type);
    raiseAllRevisions(db, deps.clock.now());
    return type;
  });
}
