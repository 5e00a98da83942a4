import { and, asc, eq, getTableColumns, notInArray } from 'drizzle-orm';
import type { DueEvent } from '../model/due-event.ts';
import type { Db } from './open.ts';
import { dueEvenings } from './schema.ts';
import { StoreError } from './store-error.ts';

export type { DueEvent };

/** What was told of the site, by evening. */
export function listDueEvents(db: Db, siteId: string): DueEvent[] {
  const inOrder = [asc(dueEvenings.evening), asc(dueEvenings.uid)];
  return db
    .select(getTableColumns(dueEvenings))
    .from(dueEvenings)
    .where(eq(dueEvenings.siteId, siteId))
    .orderBy(...inOrder)
    .all();
}

/**
 * Keeps these events of the site, new or changed, and drops its others; call it inside a transaction.
 * @throws StoreError when a uid belongs to another site: calendars would take one event for the other
 */
export function saveDueEvents(db: Db, siteId: string, events: readonly DueEvent[]): void {
  const uids = events.map((event) => event.uid);
  db.delete(dueEvenings)
    .where(and(eq(dueEvenings.siteId, siteId), notInArray(dueEvenings.uid, uids)))
    .run();
  for (const event of events) {
    const { uid, ...content } = { ...event, siteId };
    const saved = db
      .insert(dueEvenings)
      .values({ uid, ...content })
      .onConflictDoUpdate({ target: dueEvenings.uid, set: content, setWhere: eq(dueEvenings.siteId, siteId) })
      .run();
    if (saved.changes === 0)
      throw new StoreError(`The event ${uid} belongs to another site; make its uid from the site's id.`);
  }
}
