import type { RoundHabits, Site } from '../model/site.ts';
import { insertSite, listSites, raiseRevision } from '../store/sites.ts';
import { siteFaults } from './check-site.ts';
import type { Deps } from './deps.ts';
import { Refusal, refuseFaults } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

/** Left out, these are filled in; pages mark them as ours until somebody says otherwise. */
export type NewSite = Omit<Site, 'id' | 'confidence' | 'marginNights' | 'rounds' | 'zoneOffsetsC'> &
  Partial<Pick<Site, 'confidence' | 'marginNights' | 'rounds' | 'zoneOffsetsC'>>;

export const MOST_SITES = 1000;

// Once a week, an hour and a half, a few minutes a stop: common practice, no source.
const USUAL_ROUNDS: RoundHabits = {
  weekdays: [6],
  startsAt: '18:30',
  minutesFree: 90,
  minutesPerStop: 4,
  walkMinutes: 15,
  cost: 10,
};

/**
 * Makes a site.
 * @param deps what a deed needs
 * @param input the site without its id
 * @returns the site as kept
 * @throws Refusal 'invalid' naming every fault; 'conflict' when there are too many sites
 */
export function createSite(deps: Deps, input: NewSite): Site {
  const site: Site = {
    confidence: 0.9,
    marginNights: 1,
    rounds: USUAL_ROUNDS,
    zoneOffsetsC: {},
    ...input,
    name: tidyText(input.name),
    id: deps.newId(),
  };
  refuseFaults(siteFaults(site));
  return deps.store.transact((db) => {
    if (listSites(db, { limit: MOST_SITES }).length >= MOST_SITES)
      throw new Refusal(
        'conflict',
        `There are ${MOST_SITES} sites already, the most kept in one place. Remove one first.`,
      );
    insertSite(db, site);
    raiseRevision(db, site.id, deps.clock.now());
    return site;
  });
}
