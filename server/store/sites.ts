import { asc, eq, getTableColumns, sql } from 'drizzle-orm';
import type { Instant } from '../model/evening.ts';
import type { Site } from '../model/site.ts';
import type { Db } from './open.ts';
import { preparedOnce } from './rows.ts';
import { sites } from './schema.ts';

const { revision: _, changedAt: __, ...siteColumns } = getTableColumns(sites);

const statements = preparedOnce((db) => ({
  find: db
    .select(siteColumns)
    .from(sites)
    .where(eq(sites.id, sql.placeholder('siteId')))
    .prepare(),
  revision: db
    .select({ revision: sites.revision, changedAt: sites.changedAt })
    .from(sites)
    .where(eq(sites.id, sql.placeholder('siteId')))
    .prepare(),
}));

/** Keeps a new site; its revision is 0. Throws SqliteError when the id is taken or a value is out of bounds. */
export function insertSite(db: Db, site: Site): void {
  db.insert(sites).values(site).run();
}

/** The site, or null. */
export function findSite(db: Db, siteId: string): Site | null {
  return statements(db).find.get({ siteId }) ?? null;
}

/**
 * A page of sites by name, then id.
 * @param page `limit` 1 or more; `after` id of the last site of the page before; when that is gone the page is empty
 */
export function listSites(db: Db, page: { limit: number; after?: string }): Site[] {
  const { after } = page;
  return db
    .select(siteColumns)
    .from(sites)
    .where(
      after !== undefined
        ? sql`(${sites.name}, ${sites.id}) > (select last.name, last.id from sites as last where last.id = ${after})`
        : undefined,
    )
    .orderBy(asc(sites.name), asc(sites.id))
    .limit(page.limit)
    .all();
}

/** Replaces every field of the site with this id; a site that is not there stays absent. */
export function updateSite(db: Db, site: Site): void {
  db.update(sites).set(site).where(eq(sites.id, site.id)).run();
}

/** Removes the site with everything on it; false when there was none. */
export function removeSite(db: Db, siteId: string): boolean {
  return db.delete(sites).where(eq(sites.id, siteId)).run().changes > 0;
}

/** Counts the changes to a site and all that is on it; 0 for a new or unknown site. */
export function siteRevision(db: Db, siteId: string): number {
  return statements(db).revision.get({ siteId })?.revision ?? 0;
}

/** When the revision was last raised; 0 (1970) for a site never changed or unknown. */
export function siteChangedAt(db: Db, siteId: string): Instant {
  return statements(db).revision.get({ siteId })?.changedAt ?? 0;
}

/** Says that something about the site, or on it, changed. */
export function raiseRevision(db: Db, siteId: string, at: Instant): void {
  db.update(sites)
    .set({ revision: sql`${sites.revision} + 1`, changedAt: at })
    .where(eq(sites.id, siteId))
    .run();
}

/** The same for every site: for a change they share, as of a cell type. */
export function raiseAllRevisions(db: Db, at: Instant): void {
  db.update(sites)
    .set({ revision: sql`${sites.revision} + 1`, changedAt: at })
    .run();
}
