import { WeatherFileError } from './weather-file-error.ts';

/** Formats that are known but not read here: how to tell each, and the way out. */
const STRANGERS: { sign: RegExp; found: string; wayOut: string }[] = [
  {
    sign: /^\s*<(?:!doctype|html|\?xml)/i,
    found: 'a web page or XML',
    wayOut: 'Download the data file itself: the link led to a page.',
  },
  { sign: /^\s*[[{]/, found: 'JSON', wayOut: 'Write it as "time,tempC" lines.' },
  {
    sign: /^Latitude \(decimal degrees\)|time\(UTC\),T2m/,
    found: 'a PVGIS typical-year CSV',
    wayOut: 'Choose EPW as the output where you downloaded it, and send that.',
  },
  {
    sign: /^\d{4} \d{2} \d{2} \d{2}(?: +-?\d+){3}/,
    found: 'ISD-Lite rows, in tenths of a degree and UTC',
    wayOut: 'Write them as "time,tempC": 2026-10-25T18:00Z and the fifth column divided by 10.',
  },
  {
    sign: /\bTMAX\b.*\bTMIN\b|\bTMIN\b.*\bTMAX\b|^\w{11},\d{8},[A-Z]{4},|^\w{11}\d{6}[A-Z]{4}[ \d-]/,
    found: 'daily highs and lows in another layout than the GHCN-Daily access CSV',
    wayOut:
      'Send that one: the file of a single station, with TMAX and TMIN as columns and commas between them. ' +
      'Or type the nights that matter.',
  },
  {
    sign: /TEMP_ATTRIBUTES/,
    found: 'a summary of days (GSOD), in °F',
    wayOut: 'Send the GHCN-Daily access CSV of the same station, or hourly readings as "time,tempC".',
  },
  {
    sign: /HourlyDryBulbTemperature/,
    found: 'a Local Climatological Data CSV, in local standard time',
    wayOut: 'Write its FM-15 rows as "time,tempC", each time with the offset of standard time.',
  },
  {
    sign: /MESS_DATUM/,
    found: 'a DWD station file, in UTC',
    wayOut: 'Write MESS_DATUM and TT_TU as "time,tempC" with a Z on each time, and leave out -999.',
  },
  {
    sign: /Tid \(UTC\)/,
    found: 'an SMHI station file, in UTC',
    wayOut: 'Write date, time and Lufttemperatur as "time,tempC" with a Z on each time.',
  },
  {
    sign: /HORA \(?UTC|TEMPERATURA DO AR/i,
    found: 'an INMET station file, in UTC with decimal commas',
    wayOut: 'Write it as "time;tempC", as in 2026-10-25T18:00Z;4,5.',
  },
];

/**
 * Refuses a file of a format that is known but not read here.
 * @param lines of the file
 * @throws WeatherFileError that names the format and the way out
 */
export function refuseStrangers(lines: readonly string[]): void {
  const start = lines.slice(0, 30).join('\n').slice(0, 20_000);
  const stranger = STRANGERS.find(({ sign }) => sign.test(start));
  if (stranger) {
    throw new WeatherFileError(
      `This looks like ${stranger.found}, which is not read here. ${stranger.wayOut}`,
    );
  }
}
