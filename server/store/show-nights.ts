import { asc, eq, getTableColumns } from 'drizzle-orm';
import type { Evening, Instant } from '../model/evening.ts';
import type { Db } from './open.ts';
import { showNights } from './schema.ts';

/** A show night with the trace that lets it be seen as of an earlier day. */
export type StoredShowNight = {
  evening: Evening;
  /** Wall times 'HH:MM' within the evening. */
  opensAt: string;
  closesAt: string;
  calledOff: boolean;
  addedAt: Instant;
  calledOffAt: Instant | null;
};

const { siteId: _, ...nightColumns } = getTableColumns(showNights);

/** The site's show nights in order, the called-off ones among them. */
export function listShowNights(db: Db, siteId: string): StoredShowNight[] {
  return db
    .select(nightColumns)
    .from(showNights)
    .where(eq(showNights.siteId, siteId))
    .orderBy(asc(showNights.evening))
    .all();
}

/** Puts these nights in place of all the site had; call it inside a transaction. Throws SqliteError when an evening comes twice. */
export function replaceShowNights(db: Db, siteId: string, nights: readonly StoredShowNight[]): void {
  db.delete(showNights).where(eq(showNights.siteId, siteId)).run();
  for (const night of nights)
    db.insert(showNights)
      .values({ ...night, siteId })
      .run();
}
