import { removeCalendarLink as removeStoredCalendarLink } from '../store/calendar-links.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { nothingCalled } from './refusal.ts';

/**
 * Revokes a calendar link: its address is as unknown from now on as one that never was.
 * @param deps what a deed needs
 * @param input which link of which site
 * @throws Refusal 'not-found'
 */
export function removeCalendarLink(deps: Deps, input: { siteId: string; linkId: string }): void {
  deps.store.transact((db) => {
    siteOf(db, input.siteId);
    if (!removeStoredCalendarLink(db, input.siteId, input.linkId))
      throw nothingCalled('calendar link', input.linkId);
  });
}
