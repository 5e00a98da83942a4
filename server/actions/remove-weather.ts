import { raiseRevision } from '../store/sites.ts';
import { removeHours, removeTypicalYear } from '../store/weather.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { Refusal } from './refusal.ts';

/**
 * Takes out what weather files brought, so that a wrong one does no more harm; what is left counts again.
 * @param deps what a deed needs
 * @param input.of the typical year, or every imported hour, whichever file it came from
 * @throws Refusal 'not-found' for the site, or when there is nothing to take out
 */
export function removeWeather(deps: Deps, input: { siteId: string; of: 'typical-year' | 'hours' }): void {
  deps.store.transact((db) => {
    siteOf(db, input.siteId);
    const isTaken = (input.of === 'hours' ? removeHours : removeTypicalYear)(db, input.siteId);
    if (!isTaken) {
      const what = input.of === 'hours' ? 'imported hours' : 'typical year';
      throw new Refusal('not-found', `This site has no ${what} to take out.`);
    }
    raiseRevision(db, input.siteId, deps.clock.now());
  });
}
