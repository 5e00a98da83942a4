import type { Site } from '../model/site.ts';
import { findSite, listSites as listStoredSites } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { listChanged } from './list-changed.ts';

/**
 * Sites by name.
 * @param deps what a deed needs
 * @param input.limit at most so many
 * @param input.after id of the last site of the page before
 * @throws Refusal 'invalid' when that site is gone
 */
export function listSites(deps: Deps, input: { limit: number; after?: string }): Site[] {
  const { db } = deps.store;
  const { after } = input;
  if (after !== undefined && !findSite(db, after)) throw listChanged(after);
  return listStoredSites(db, input);
}
