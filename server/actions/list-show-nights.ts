import type { ShowNight } from '../model/switching.ts';
import { listShowNights as listStoredShowNights } from '../store/show-nights.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's show nights as they stand, by evening.
 * @param deps what a deed needs
 * @param input which site
 * @throws Refusal 'not-found'
 */
export function listShowNights(deps: Deps, input: { siteId: string }): ShowNight[] {
  siteOf(deps.store.db, input.siteId);
  return listStoredShowNights(deps.store.db, input.siteId).map(
    ({ evening, opensAt, closesAt, calledOff }) => ({
      evening,
      opensAt,
      closesAt,
      calledOff,
    }),
  );
}
