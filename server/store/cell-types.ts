import { asc, count, eq } from 'drizzle-orm';
import type { CellType } from '../model/cell-type.ts';
import type { Db } from './open.ts';
import { present } from './rows.ts';
import { cellTypes, log, props } from './schema.ts';

type CellTypeRow = typeof cellTypes.$inferSelect;

function cellTypeOf(row: CellTypeRow): CellType {
  return { ...present(row), builtIn: false };
}

function rowOf({ builtIn: _, ...type }: CellType): CellTypeRow {
  return { ...type, priceEach: type.priceEach ?? null };
}

/** Keeps a cell type of the crew's own. Throws SqliteError when the id is taken or a value is out of bounds. */
export function insertCellType(db: Db, type: CellType): void {
  db.insert(cellTypes).values(rowOf(type)).run();
}

/** An own cell type, or null; built-in ones are not here. */
export function findCellType(db: Db, cellTypeId: string): CellType | null {
  const row = db.select().from(cellTypes).where(eq(cellTypes.id, cellTypeId)).get();
  return row ? cellTypeOf(row) : null;
}

/** Own cell types by name. */
export function listCellTypes(db: Db): CellType[] {
  return db.select().from(cellTypes).orderBy(asc(cellTypes.name), asc(cellTypes.id)).all().map(cellTypeOf);
}

/** Replaces every field of the own cell type with this id. */
export function updateCellType(db: Db, type: CellType): void {
  db.update(cellTypes).set(rowOf(type)).where(eq(cellTypes.id, type.id)).run();
}

/** Removes an own cell type; false when there was none. Ask `cellTypeInUse` first: nothing here prevents it. */
export function removeCellType(db: Db, cellTypeId: string): boolean {
  return db.delete(cellTypes).where(eq(cellTypes.id, cellTypeId)).run().changes > 0;
}

/** How many props and swaps name this cell type, undone swaps included, since the log still shows them. */
export function cellTypeInUse(db: Db, cellTypeId: string): number {
  const inProps = db.select({ uses: count() }).from(props).where(eq(props.cellTypeId, cellTypeId)).get();
  const inSwaps = db.select({ uses: count() }).from(log).where(eq(log.cellTypeId, cellTypeId)).get();
  return (inProps?.uses ?? 0) + (inSwaps?.uses ?? 0);
}
