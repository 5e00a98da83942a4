import { type Climate, climateOf, climateOfTypicalYear } from '../model/climate.ts';
import type { Evening, Instant } from '../model/evening.ts';
import type { Site } from '../model/site.ts';
import type { Place } from '../model/sun.ts';
import type { ShowNight } from '../model/switching.ts';
import { type SeasonWeather, seasonWeather } from '../model/weather.ts';
import type { Db } from '../store/open.ts';
import { findHours, findTypicalYear, listTypedNights } from '../store/weather.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { showNightsKnownAt } from './list-show-nights.ts';

/** What everything reckoned for a site starts from. */
export type SiteSeason = {
  site: Site;
  place: Place;
  weather: SeasonWeather;
  /** As known at `asOf`. */
  showNights: Map<Evening, ShowNight>;
};

/**
 * A site's place, weather and show nights for a run of evenings, as known at a moment. Typed nights count whenever
 * they were typed: people type ahead, and correct.
 * @param deps what a deed needs
 * @param siteId which site
 * @param options.asOf the moment; nights added or called off later are not known yet
 * @param options.from first evening whose weather is wanted
 * @param options.through last evening whose weather is wanted
 * @throws Refusal 'not-found'
 */
export function siteSeason(
  deps: Deps,
  siteId: string,
  options: { asOf: Instant; from: Evening; through: Evening },
): SiteSeason {
  const { db } = deps.store;
  const site = siteOf(db, siteId);
  const place: Place = {
    latitudeDeg: site.latitudeDeg,
    longitudeDeg: site.longitudeDeg,
    timeZone: site.timeZone,
  };
  const weather = seasonWeather({
    place,
    climate: climateOfSite(db, site),
    hours: findHours(db, siteId),
    typedNights: listTypedNights(db, siteId),
    ...options,
  });
  return { site, place, weather, showNights: showNightsKnownAt(db, siteId, options.asOf) };
}

function climateOfSite(db: Db, site: Site): Climate {
  const typicalYear = findTypicalYear(db, site.id);
  return typicalYear ? climateOfTypicalYear(typicalYear, site) : climateOf(site);
}
