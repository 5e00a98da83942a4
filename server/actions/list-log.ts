import type { Instant } from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import { listLog as listStoredLog } from '../store/log.ts';
import type { Deps } from './deps.ts';
import { propOf } from './find-prop.ts';

/** Where a page of a log ended. */
export type LogPlace = { at: Instant; id: string };

/**
 * A page of a prop's log, newest first.
 * @param deps what a deed needs
 * @param input.limit entries on the page, 1 or more
 * @param input.before where the page before ended
 * @param input.undone also what was undone
 * @returns the entries, and where to go on; null at the end
 * @throws Refusal 'not-found'
 */
export function listLog(
  deps: Deps,
  input: { propId: string; limit: number; before?: LogPlace; undone: boolean },
): { entries: LogEntry[]; nextBefore: LogPlace | null } {
  const { propId, ...page } = input;
  const { db } = deps.store;
  propOf(db, propId);
  const found = listStoredLog(db, propId, { ...page, limit: page.limit + 1 });
  const entries = found.slice(0, page.limit);
  const last = entries.at(-1);
  return { entries, nextBefore: found.length > page.limit && last ? { at: last.at, id: last.id } : null };
}
