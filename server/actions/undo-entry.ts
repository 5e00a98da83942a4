import type { LogEntry } from '../model/log-entry.ts';
import { undoEntry as undoStoredEntry } from '../store/log.ts';
import { raiseRevision } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { entryOf } from './find-entry.ts';
import { propOf } from './find-prop.ts';

/**
 * Takes an entry of a prop's log back. The entry stays, marked with the moment of the first undo.
 * @param deps what a deed needs
 * @param input which entry of which prop
 * @returns the entry as it stands
 * @throws Refusal 'not-found'
 */
export function undoEntry(deps: Deps, input: { propId: string; entryId: string }): LogEntry {
  return deps.store.transact((db) => {
    const prop = propOf(db, input.propId);
    entryOf(db, input);
    const now = deps.clock.now();
    if (undoStoredEntry(db, input.entryId, now)) raiseRevision(db, prop.siteId, now);
    return entryOf(db, input);
  });
}
