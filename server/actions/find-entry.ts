import type { LogEntry } from '../model/log-entry.ts';
import { findEntry } from '../store/log.ts';
import type { Db } from '../store/open.ts';
import { nothingCalled } from './refusal.ts';

/**
 * An entry of a prop's log, undone or not.
 * @param db the database, or the transaction a deed is in
 * @param which the prop and the entry
 * @throws Refusal 'not-found', also for an entry of another prop
 */
export function entryOf(db: Db, which: { propId: string; entryId: string }): LogEntry {
  const entry = findEntry(db, which.entryId);
  if (entry?.propId !== which.propId) throw nothingCalled('entry', which.entryId);
  return entry;
}
