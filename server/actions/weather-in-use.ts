import { type Evening, HOUR_MS, localDateOf } from '../model/evening.ts';
import type { ObservedHours } from '../model/weather.ts';
import { findHours, findTypicalYear, listTypedNights } from '../store/weather.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/** What is known of a site's weather beside its twelve months. */
export type WeatherInUse = {
  typicalYear: { stationName: string } | null;
  /** Imported hours: first and last local date, and how many hours are known. */
  hours: { from: string; through: string; count: number } | null;
  typedNights: Evening[];
};

/**
 * Tells which weather files and typed nights a site's forecasts rest on.
 * @param deps what a deed needs
 * @param input which site
 * @throws Refusal 'not-found'
 */
export function weatherInUse(deps: Deps, input: { siteId: string }): WeatherInUse {
  const { db } = deps.store;
  const { id, timeZone } = siteOf(db, input.siteId);
  const typicalYear = findTypicalYear(db, id);
  const hours = findHours(db, id);
  return {
    typicalYear: typicalYear && { stationName: typicalYear.stationName },
    hours: hours && hoursInUse(hours, timeZone),
    typedNights: [...listTypedNights(db, id).keys()],
  };
}

function hoursInUse({ startAt, tempC }: ObservedHours, timeZone: string): WeatherInUse['hours'] {
  return {
    from: localDateOf(startAt, timeZone),
    through: localDateOf(startAt + (tempC.length - 1) * HOUR_MS, timeZone),
    count: tempC.filter((each) => !Number.isNaN(each)).length,
  };
}
