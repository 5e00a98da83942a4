import type { Site } from '../model/site.ts';
import type { Db } from '../store/open.ts';
import { findSite } from '../store/sites.ts';
import { nothingCalled } from './refusal.ts';

/**
 * The site with an id.
 * @param db the database, or the transaction a deed is in
 * @param siteId its id
 * @throws Refusal 'not-found'
 */
export function siteOf(db: Db, siteId: string): Site {
  const site = findSite(db, siteId);
  if (!site) throw nothingCalled('site', siteId);
  return site;
}
