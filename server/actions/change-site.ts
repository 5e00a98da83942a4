import type { Site } from '../model/site.ts';
import { raiseRevision, updateSite } from '../store/sites.ts';
import { siteFaults } from './check-site.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { refuseFaults } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

/**
 * Changes a site: what is given replaces what was there, lists and objects whole.
 * @param deps what a deed needs
 * @param input the site's id and the fields to replace
 * @returns the site as kept now
 * @throws Refusal 'not-found'; 'invalid' when the site as a whole would not make sense
 */
export function changeSite(deps: Deps, input: { siteId: string; changes: Partial<Omit<Site, 'id'>> }): Site {
  return deps.store.transact((db) => {
    const before = siteOf(db, input.siteId);
    const site: Site = { ...before, ...input.changes, id: before.id };
    site.name = tidyText(site.name);
    refuseFaults(siteFaults(site));
    updateSite(db, site);
    raiseRevision(db, site.id, deps.clock.now());
    return site;
  });
}
