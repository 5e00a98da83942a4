import type { Evening, Instant } from '../model/evening.ts';
import type { ShowNight } from '../model/switching.ts';
import type { Db } from '../store/open.ts';
import { listShowNights as listStoredShowNights } from '../store/show-nights.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's show nights as known at a moment, by evening.
 * @param deps what a deed needs
 * @param input which site, and the moment; now when absent
 * @throws Refusal 'not-found'
 */
export function listShowNights(deps: Deps, input: { siteId: string; asOf?: Instant }): ShowNight[] {
  siteOf(deps.store.db, input.siteId);
  return [...showNightsKnownAt(deps.store.db, input.siteId, input.asOf ?? deps.clock.now()).values()];
}

/**
 * Show nights by evening as known at a moment: one added later is not there yet, one called off later is still on.
 * @param db the database, or the transaction a deed is in
 * @param siteId which site
 * @param asOf the moment
 */
export function showNightsKnownAt(db: Db, siteId: string, asOf: Instant): Map<Evening, ShowNight> {
  const known = new Map<Evening, ShowNight>();
  for (const { evening, opensAt, closesAt, ...night } of listStoredShowNights(db, siteId)) {
    if (night.addedAt > asOf) continue;
    const calledOff = night.calledOff && (night.calledOffAt ?? 0) <= asOf;
    known.set(evening, { evening, opensAt, closesAt, calledOff });
  }
  return known;
}
