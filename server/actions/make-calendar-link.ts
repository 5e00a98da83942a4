import { createHash } from 'node:crypto';
import type { CalendarLink } from '../store/calendar-links.ts';
import { insertCalendarLink, listCalendarLinks } from '../store/calendar-links.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { Refusal } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

export const MOST_CALENDAR_LINKS = 100;

/**
 * What is kept of a calendar link's secret: whoever reads the database still cannot read the calendar.
 * @param secret the part of the address nobody can guess
 * @returns SHA-256, hexadecimal
 */
export function hashOfSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('hex');
}

/**
 * Makes a secret address for a site's calendar.
 * @param deps what a deed needs
 * @param input.label whose it is
 * @param input.alarms whether events ring
 * @returns the link and its secret, which nobody can be told again
 * @throws Refusal 'not-found'; 'conflict' when the site has too many
 */
export function makeCalendarLink(
  deps: Deps,
  input: { siteId: string; label?: string; alarms?: boolean },
): { link: CalendarLink; secret: string } {
  return deps.store.transact((db) => {
    const site = siteOf(db, input.siteId);
    if (listCalendarLinks(db, site.id).length >= MOST_CALENDAR_LINKS)
      throw new Refusal(
        'conflict',
        `This site has ${MOST_CALENDAR_LINKS} calendar links. Revoke one that nobody reads any more first.`,
      );
    const secret = deps.newSecret();
    const link = {
      id: deps.newId(),
      siteId: site.id,
      label: input.label === undefined ? null : tidyText(input.label),
      alarms: input.alarms ?? false,
      createdAt: deps.clock.now(),
    };
    insertCalendarLink(db, { ...link, secretHash: hashOfSecret(secret) });
    return { link: { ...link, secretHash: hashOfSecret(secret), lastReadAt: null }, secret };
  });
}
