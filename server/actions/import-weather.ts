import { readWeatherFile, type WeatherFile, WeatherFileError } from '../exchange/weather-file.ts';
import type { Site } from '../model/site.ts';
import { raiseRevision } from '../store/sites.ts';
import { saveHours, saveTypicalYear } from '../store/weather.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { Refusal } from './refusal.ts';

/**
 * Takes a weather file in: hours join those already there, a typical year replaces the one before.
 * @param deps what a deed needs
 * @param input.text the file's text
 * @param input.unit what its temperatures are in, when the file does not say
 * @returns what was read and what was not
 * @throws Refusal 'not-found'; 'invalid' when nothing in it can be used
 */
export function importWeather(
  deps: Deps,
  input: { siteId: string; text: string; unit?: 'C' | 'F' },
): WeatherFile {
  const site = siteOf(deps.store.db, input.siteId);
  const file = readFor(site, input);
  return deps.store.transact((db) => {
    siteOf(db, site.id);
    if (file.hours) saveHours(db, site.id, file.hours);
    if (file.typicalYear) {
      const stationName = file.station?.name ?? 'typical year';
      saveTypicalYear(db, site.id, { ...file.typicalYear, stationName });
    }
    raiseRevision(db, site.id, deps.clock.now());
    return file;
  });
}

function readFor(site: Site, input: { text: string; unit?: 'C' | 'F' }): WeatherFile {
  const { timeZone, latitudeDeg, longitudeDeg } = site;
  const unit = input.unit === undefined ? {} : { unit: input.unit };
  try {
    return readWeatherFile(input.text, { timeZone, latitudeDeg, longitudeDeg, ...unit });
  } catch (error) {
    if (error instanceof WeatherFileError)
      throw new Refusal('invalid', [{ field: 'file', message: error.message }]);
    throw error;
  }
}
