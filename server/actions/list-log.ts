import type { LogEntry } from '../model/log-entry.ts';
import { findEntry, listLog as listStoredLog } from '../store/log.ts';
import type { Deps } from './deps.ts';
import { propOf } from './find-prop.ts';
import { listChanged } from './list-changed.ts';

/**
 * A page of a prop's log, newest first.
 * @param deps what a deed needs
 * @param input.limit entries on the page, 1 or more
 * @param input.after id of the last entry of the page before
 * @param input.undone also what was undone
 * @throws Refusal 'not-found' for the prop; 'invalid' when `after` is not in its log
 */
export function listLog(
  deps: Deps,
  input: { propId: string; limit: number; after?: string; undone: boolean },
): LogEntry[] {
  const { propId, after, ...page } = input;
  const { db } = deps.store;
  propOf(db, propId);
  if (after === undefined) return listStoredLog(db, propId, page);
  const last = findEntry(db, after);
  if (last?.propId !== propId) throw listChanged(after);
  return listStoredLog(db, propId, { ...page, before: { at: last.at, id: last.id } });
}
