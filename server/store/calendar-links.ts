import { and, asc, eq } from 'drizzle-orm';
import type { Instant } from '../model/evening.ts';
import type { Db } from './open.ts';
import { calendarLinks } from './schema.ts';

export type CalendarLink = {
  id: string;
  siteId: string;
  /** 16 to 128 characters; the secret itself is not kept. */
  secretHash: string;
  label: string | null;
  alarms: boolean;
  createdAt: Instant;
  lastReadAt: Instant | null;
};

/** Keeps a new link. Throws SqliteError when its id or hash is taken or the site unknown. */
export function insertCalendarLink(db: Db, link: Omit<CalendarLink, 'lastReadAt'>): void {
  db.insert(calendarLinks).values(link).run();
}

/** The site's links, oldest first. */
export function listCalendarLinks(db: Db, siteId: string): CalendarLink[] {
  const oldestFirst = [asc(calendarLinks.createdAt), asc(calendarLinks.id)];
  return db
    .select()
    .from(calendarLinks)
    .where(eq(calendarLinks.siteId, siteId))
    .orderBy(...oldestFirst)
    .all();
}

/** Revokes a link of the site; false when there was none. */
export function removeCalendarLink(db: Db, siteId: string, linkId: string): boolean {
  const link = and(eq(calendarLinks.siteId, siteId), eq(calendarLinks.id, linkId));
  return db.delete(calendarLinks).where(link).run().changes > 0;
}

/** The link whose secret has this hash, or null. */
export function findCalendarLinkByHash(db: Db, secretHash: string): CalendarLink | null {
  return db.select().from(calendarLinks).where(eq(calendarLinks.secretHash, secretHash)).get() ?? null;
}

/** Says that a calendar has just read the link. */
export function touchCalendarLink(db: Db, linkId: string, at: Instant): void {
  db.update(calendarLinks).set({ lastReadAt: at }).where(eq(calendarLinks.id, linkId)).run();
}
