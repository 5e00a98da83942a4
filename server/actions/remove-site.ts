import { removeSite as removeStoredSite } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { nothingCalled } from './refusal.ts';

/**
 * Removes a site with its props, their log, its weather and its calendar links. There is no way back.
 * @param deps what a deed needs
 * @param input which site
 * @throws Refusal 'not-found'
 */
export function removeSite(deps: Deps, input: { siteId: string }): void {
  deps.store.transact((db) => {
    if (!removeStoredSite(db, input.siteId)) throw nothingCalled('site', input.siteId);
  });
}
