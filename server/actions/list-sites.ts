import type { Site } from '../model/site.ts';
import { listSites as listStoredSites } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * Sites by name.
 * @param deps what a deed needs
 * @param input.limit at most so many
 * @param input.after id of the last site of the page before
 * @throws Refusal 'not-found' when that site is gone
 */
export function listSites(deps: Deps, input: { limit: number; after?: string }): Site[] {
  const { db } = deps.store;
  if (input.after === undefined) return listStoredSites(db, { limit: input.limit });
  return listStoredSites(db, { limit: input.limit, after: siteOf(db, input.after).id });
}
