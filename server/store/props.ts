import { and, asc, count, eq, getTableColumns, sql } from 'drizzle-orm';
import { toSnakeCase } from 'drizzle-orm/casing';
import type { Prop } from '../model/prop.ts';
import type { Db } from './open.ts';
import { preparedOnce, present } from './rows.ts';
import { props } from './schema.ts';
import { tagOrder } from './tag-order.ts';

type PropRow = typeof props.$inferSelect;

const { tagOrder: _, ...propColumns } = getTableColumns(props);

/** Absent fields become null, so that an update also takes away what is no longer given. */
function rowOf(prop: Prop): PropRow {
  return {
    ...prop,
    tagOrder: tagOrder(prop.tag),
    xM: prop.xM ?? null,
    yM: prop.yM ?? null,
    stopVolts: prop.stopVolts ?? null,
    trips: prop.trips ?? null,
    offsetC: prop.offsetC ?? null,
  };
}

const statements = preparedOnce((db) => {
  const ofSite = eq(props.siteId, sql.placeholder('siteId'));
  return {
    find: db
      .select(propColumns)
      .from(props)
      .where(eq(props.id, sql.placeholder('propId')))
      .prepare(),
    all: db
      .select(propColumns)
      .from(props)
      .where(ofSite)
      .orderBy(asc(props.tagOrder), asc(props.tag))
      .prepare(),
  };
});

/** Keeps a new prop. Throws SqliteError when its id or its tag on the site is taken or a value is out of bounds. */
export function insertProp(db: Db, prop: Prop): void {
  db.insert(props).values(rowOf(prop)).run();
}

/** Each column as the row that came in has it. */
const AS_GIVEN = Object.fromEntries(
  Object.keys(getTableColumns(props)).map((field) => [
    field,
    sql`excluded.${sql.identifier(toSnakeCase(field))}`,
  ]),
);

/** Rows a statement takes at once: many enough to share its cost, few enough for SQLite's count of values. */
const ROWS_AT_ONCE = 200;

/**
 * Keeps many props at once, new ones and ones that are here with every field replaced. Throws SqliteError as
 * `insertProp` does; only a transaction makes it all or nothing.
 */
export function saveProps(db: Db, saved: readonly Prop[]): void {
  for (let from = 0; from < saved.length; from += ROWS_AT_ONCE) {
    const rows = saved.slice(from, from + ROWS_AT_ONCE).map(rowOf);
    db.insert(props).values(rows).onConflictDoUpdate({ target: props.id, set: AS_GIVEN }).run();
  }
}

/** The prop, or null. */
export function findProp(db: Db, propId: string): Prop | null {
  const row = statements(db).find.get({ propId });
  return row ? present(row) : null;
}

/** The prop with this tag on the site, or null. Case counts. */
export function findPropByTag(db: Db, siteId: string, tag: string): Prop | null {
  const row = db
    .select(propColumns)
    .from(props)
    .where(and(eq(props.siteId, siteId), eq(props.tag, tag)))
    .get();
  return row ? present(row) : null;
}

/**
 * The site's props by tag, A-2 before A-10.
 * @param page `limit` all when absent; `after` id of the last prop of the page before; when that is gone the page is empty
 */
export function listProps(db: Db, siteId: string, page: { limit?: number; after?: string } = {}): Prop[] {
  const { limit, after } = page;
  if (limit === undefined && after === undefined) return statements(db).all.all({ siteId }).map(present);
  const later =
    after === undefined
      ? undefined
      : sql`(${props.tagOrder}, ${props.tag}) > (select last.tag_order, last.tag from props as last where last.id = ${after})`;
  return db
    .select(propColumns)
    .from(props)
    .where(and(eq(props.siteId, siteId), later))
    .orderBy(asc(props.tagOrder), asc(props.tag))
    .limit(limit ?? -1)
    .all()
    .map(present);
}

/** Replaces every field of the prop with this id; optional fields not given are taken away. */
export function updateProp(db: Db, prop: Prop): void {
  db.update(props).set(rowOf(prop)).where(eq(props.id, prop.id)).run();
}

/** Removes the prop with its log; false when there was none. */
export function removeProp(db: Db, propId: string): boolean {
  return db.delete(props).where(eq(props.id, propId)).run().changes > 0;
}

/** How many props the site has. */
export function countProps(db: Db, siteId: string): number {
  return db.select({ props: count() }).from(props).where(eq(props.siteId, siteId)).get()?.props ?? 0;
}
