import { type CalendarLink, listCalendarLinks as listStoredCalendarLinks } from '../store/calendar-links.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's calendar links, oldest first, without their secrets.
 * @param deps what a deed needs
 * @param input which site
 * @throws Refusal 'not-found'
 */
export function listCalendarLinks(deps: Deps, input: { siteId: string }): CalendarLink[] {
  siteOf(deps.store.db, input.siteId);
  return listStoredCalendarLinks(deps.store.db, input.siteId);
}
