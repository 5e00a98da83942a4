import { and, asc, desc, eq, inArray, isNull, sql } from 'drizzle-orm';
import type { Instant } from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import type { Db } from './open.ts';
import { preparedOnce } from './rows.ts';
import { log, props } from './schema.ts';

type LogRow = typeof log.$inferSelect;

/**
 * Written out, field by field: taking the nulls out of each row by name costs three times as much, and a site's
 * whole log is read for every forecast. The CHECK on kind keeps the columns of one kind out of the other.
 */
function entryOf(row: LogRow): LogEntry {
  const { id, propId, at, recordedAt } = row;
  const entry: LogEntry =
    row.kind === 'swap'
      ? { kind: 'swap', id, propId, at, recordedAt, state: row.state! }
      : { kind: 'sighting', id, propId, at, recordedAt, seen: row.seen! };
  if (entry.kind === 'swap') {
    if (row.leftShare !== null) entry.leftShare = row.leftShare;
    if (row.cellTypeId !== null) entry.cellTypeId = row.cellTypeId;
    if (row.cells !== null) entry.cells = row.cells;
    if (row.setId !== null) entry.setId = row.setId;
    if (row.healthShare !== null) entry.healthShare = row.healthShare;
    if (row.oldSet !== null) entry.oldSet = row.oldSet;
  } else {
    if (row.volts !== null) entry.volts = row.volts;
    if (row.taken !== null) entry.taken = row.taken;
  }
  if (row.note !== null) entry.note = row.note;
  if (row.undoneAt !== null) entry.undoneAt = row.undoneAt;
  return entry;
}

const oldestFirst = [asc(log.at), asc(log.recordedAt), asc(log.id)];

const statements = preparedOnce((db) => ({
  ofProp: db
    .select()
    .from(log)
    .where(and(eq(log.propId, sql.placeholder('propId')), isNull(log.undoneAt)))
    .orderBy(...oldestFirst)
    .prepare(),
  // By a list of props, not by a join: SQLite then reads the index in order and need not sort.
  ofSite: db
    .select()
    .from(log)
    .where(
      and(
        inArray(
          log.propId,
          db
            .select({ id: props.id })
            .from(props)
            .where(eq(props.siteId, sql.placeholder('siteId'))),
        ),
        isNull(log.undoneAt),
      ),
    )
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
  for (const row of statements(db).ofSite.all({ siteId })) {
    const entries = byProp.get(row.propId);
    if (entries) entries.push(entryOf(row));
    else byProp.set(row.propId, [entryOf(row)]);
  }
  return byProp;
}
