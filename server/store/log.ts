import { and, asc, desc, eq, isNull, sql } from 'drizzle-orm';
import type { Instant } from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import type { Db } from './open.ts';
import { preparedOnce, present } from './rows.ts';
import { log, props } from './schema.ts';

type LogRow = typeof log.$inferSelect;

/** The CHECK on kind keeps the columns of one kind out of the other, so a row without nulls is an entry. */
const entryOf = (row: LogRow): LogEntry => present(row) as LogEntry;

const oldestFirst = [asc(log.at), asc(log.recordedAt), asc(log.id)];

const statements = preparedOnce((db) => ({
  ofProp: db
    .select()
    .from(log)
    .where(and(eq(log.propId, sql.placeholder('propId')), isNull(log.undoneAt)))
    .orderBy(...oldestFirst)
    .prepare(),
  ofSite: db
    .select({ entry: log })
    .from(log)
    .innerJoin(props, eq(props.id, log.propId))
    .where(and(eq(props.siteId, sql.placeholder('siteId')), isNull(log.undoneAt)))
    .orderBy(asc(log.propId), ...oldestFirst)
    .prepare(),
}));

/** Keeps a swap or a sighting. Throws SqliteError when the id is taken, the prop unknown or a value out of bounds. */
export function insertEntry(db: Db, entry: LogEntry): void {
  db.insert(log).values(entry).run();
}

/** The entry, undone or not, or null. */
export function findEntry(db: Db, entryId: string): LogEntry | null {
  const row = db.select().from(log).where(eq(log.id, entryId)).get();
  return row ? entryOf(row) : null;
}

/** Marks an entry as undone, once: a second undo keeps the first moment. False when nothing changed. */
export function undoEntry(db: Db, entryId: string, at: Instant): boolean {
  return (
    db
      .update(log)
      .set({ undoneAt: at })
      .where(and(eq(log.id, entryId), isNull(log.undoneAt)))
      .run().changes > 0
  );
}

/**
 * A page of a prop's log, newest first.
 * @param page `limit` 1 or more; `before` moment and id of the last entry of the page before; `undone` shows undone ones too
 */
export function listLog(
  db: Db,
  propId: string,
  page: { limit: number; before?: { at: Instant; id: string }; undone: boolean },
): LogEntry[] {
  const { before } = page;
  // The cursor's own recordedAt is looked up; an entry that is gone lets everything strictly older follow.
  const older = before
    ? sql`(${log.at}, ${log.recordedAt}, ${log.id}) < (${before.at}, coalesce((select recorded_at_ms from log as cursor where cursor.id = ${before.id}), -9e15), ${before.id})`
    : undefined;
  return db
    .select()
    .from(log)
    .where(and(eq(log.propId, propId), page.undone ? undefined : isNull(log.undoneAt), older))
    .orderBy(desc(log.at), desc(log.recordedAt), desc(log.id))
    .limit(page.limit)
    .all()
    .map(entryOf);
}

/** What happened to a prop and was not undone, oldest first. */
export function propLog(db: Db, propId: string): LogEntry[] {
  return statements(db).ofProp.all({ propId }).map(entryOf);
}

/** The same for every prop of a site, by prop id; a prop with an empty log is not in it. */
export function siteLog(db: Db, siteId: string): Map<string, LogEntry[]> {
  const byProp = new Map<string, LogEntry[]>();
  for (const { entry } of statements(db).ofSite.all({ siteId })) {
    const entries = byProp.get(entry.propId);
    if (entries) entries.push(entryOf(entry));
    else byProp.set(entry.propId, [entryOf(entry)]);
  }
  return byProp;
}
