import { standardOffsetHours } from '../model/evening.ts';
import { numberOrNaN } from './csv-fields.ts';
import { WeatherFileError } from './weather-file-error.ts';

/** Where a file says its thermometer stands. */
export type Station = { name: string; latitudeDeg: number; longitudeDeg: number; elevationM?: number };

/** How a format writes its first line: how many fields at least, in what order the last four, and what it is called. */
export type HeaderForm = {
  leastFields: number;
  lastFour: readonly ('latitudeDeg' | 'longitudeDeg' | 'standardOffsetHours' | 'elevationM')[];
  lastFourWords: string;
  formatName: string;
};

/**
 * The station of a typical-year file from the fields of its first line. Its name may hold commas, so the numbers are
 * counted from the end.
 * @throws WeatherFileError when they are not those of a place
 */
export function stationOfHeader(
  line: string,
  written: readonly string[],
  form: HeaderForm,
): { station: Station; standardOffsetHours: number } {
  const fields = written.map((field) => field.trim());
  const numbers = fields.slice(-4).map(numberOrNaN);
  const numberOf = (name: HeaderForm['lastFour'][number]) =>
    numbers[form.lastFour.indexOf(name)] ?? Number.NaN;
  const [latitudeDeg, longitudeDeg] = [numberOf('latitudeDeg'), numberOf('longitudeDeg')];
  const [standardOffsetHours, elevationM] = [numberOf('standardOffsetHours'), numberOf('elevationM')];
  const isPlace =
    Math.abs(latitudeDeg) <= 90 && Math.abs(longitudeDeg) <= 180 && Math.abs(standardOffsetHours) <= 14;
  if (fields.length < form.leastFields || !isPlace) {
    throw new WeatherFileError(
      `The first line, "${line.slice(0, 120)}", should end in ${form.lastFourWords}. ` +
        `Likely the header was edited: download the ${form.formatName} file again and send it unchanged.`,
    );
  }
  const station = { name: fields[1] || 'unnamed station', latitudeDeg, longitudeDeg };
  return {
    station: Number.isFinite(elevationM) ? { ...station, elevationM } : station,
    standardOffsetHours,
  };
}

/** Any recent year does: zones seldom change their standard time. */
const OFFSET_YEAR = 2025;

/** The zone's hours ahead of UTC, without summer time. */
export function siteOffsetHours(timeZone: string): number {
  return standardOffsetHours(timeZone, OFFSET_YEAR);
}

/** A sentence when the station stands more than 1° from the site, else null. */
export function placeWarning(
  station: Station,
  site: { latitudeDeg: number; longitudeDeg: number },
): string | null {
  const { name, latitudeDeg, longitudeDeg } = station;
  const apartDeg = Math.abs(((longitudeDeg - site.longitudeDeg + 540) % 360) - 180);
  if (Math.abs(latitudeDeg - site.latitudeDeg) <= 1 && apartDeg <= 1) return null;
  const isMirrored = Math.abs(longitudeDeg + site.longitudeDeg) < 1 && Math.abs(longitudeDeg) > 1;
  return (
    `The station ${name} stands at ${latitudeDeg}, ${longitudeDeg}, more than 1° from the site at ` +
    `${site.latitudeDeg}, ${site.longitudeDeg}. ` +
    (isMirrored
      ? 'Likely the sign of a longitude: east is positive, west negative.'
      : 'Choose a nearer station, or check the site.')
  );
}

/** A sentence when the file keeps another standard time than the site, else null. */
export function offsetWarning(offsetHours: number, timeZone: string): string | null {
  const ownHours = siteOffsetHours(timeZone);
  if (Math.abs(offsetHours - ownHours) <= 0.01) return null;
  return (
    `The file keeps UTC${signed(offsetHours)} and ${timeZone} has UTC${signed(ownHours)} as standard time. ` +
    'The hours are read by the file; check that it is for this site.'
  );
}

function signed(hours: number): string {
  return `${hours < 0 ? '-' : '+'}${Math.abs(hours)}`;
}
