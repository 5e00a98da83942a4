import type { TypicalYear } from '../model/climate.ts';
import {
  addEvenings,
  eveningOf,
  HOUR_MS,
  type Instant,
  standardOffsetHours,
  wallTimeOf,
} from '../model/evening.ts';
import type { ObservedHours } from '../model/weather.ts';
import { readEpw, type Station } from './epw.ts';
import { hoursOfReadings } from './hourly-readings.ts';
import {
  findTimeTempHeader,
  HOTTEST_C,
  type Reading,
  readTimeTempRows,
  type TimeTempHeader,
} from './time-temp-csv.ts';
import { type RejectedLine, type RejectedLines, WeatherFileError } from './weather-file-error.ts';
import { phaseWarning } from './weather-phase.ts';

export { WeatherFileError };

/** What a weather file holds; exactly one of `typicalYear` and `hours` is there. */
export type WeatherFile = {
  format: 'epw' | 'time-temp';
  /** Lines whose temperature is used. */
  rows: number;
  /** Lines left out, at most the first hundred. */
  rejected: RejectedLine[];
  station?: Station;
  warnings: string[];
  typicalYear: TypicalYear | null;
  hours: ObservedHours | null;
  /** First and last local date, 'YYYY-MM-DD'; '01-01' and '12-31' for a typical year, which belongs to none. */
  from: string;
  through: string;
};

export type WeatherFileSite = {
  timeZone: string;
  latitudeDeg: number;
  longitudeDeg: number;
  /** What the temperatures of a time,temp CSV are in; asked for when they look like °F. */
  unit?: 'C' | 'F';
  /** Called now and then with the share done, 0..1. */
  onProgress?: (share: number) => void;
};

const LONGEST_LINE = 20_000;
/** Any recent year does: zones seldom change their standard time. */
const OFFSET_YEAR = 2025;
/** From this share of readings above 60 on, they are not taken for °C. Ours. */
const HOT_SHARE = 0.01;
/** No place on Earth has half its readings above this, °C. */
const HOTTEST_MEDIAN_C = 42;

/**
 * Reads a weather file; the format is told by what is in it, never by its name. EPW gives a typical year, a CSV with a
 * time and a temperature column gives hours. See `readEpw` and `readTimeTempRows` for how each is read.
 * @param text the whole file, UTF-8 or latin-1
 * @param site where it is meant for: IANA zone, degrees north and east
 * @throws WeatherFileError with a sentence for a person, when the file is of no known format or not usable
 */
export function readWeatherFile(text: string, site: WeatherFileSite): WeatherFile {
  const plain = text.charCodeAt(0) === 0xfeff ? text.slice(1) : text;
  checkIsText(plain);
  const lines = plain.split(/\r\n|\n|\r/);
  const tooLong = lines.findIndex((line) => line.length > LONGEST_LINE);
  if (tooLong >= 0) {
    throw new WeatherFileError(
      `Line ${tooLong + 1} is ${lines[tooLong]!.length} characters long, and a weather file's lines are short. ` +
        'Likely the line ends were lost, or it is another kind of file: save it again as plain CSV or EPW.',
    );
  }
  if (/^LOCATION,/i.test(lines[0]!)) return epwFile(lines, site);
  refuseKnownStrangers(lines);
  const header = findTimeTempHeader(lines);
  if (header) return timeTempFile(plain, { header, site });
  const first = lines.find((line) => line.trim() !== '')!;
  throw new WeatherFileError(
    `The file starts with "${first.trim().slice(0, 80)}", which is neither an EPW header nor a heading with a time and a ` +
      'temperature column. Put a first line "time,tempC" above lines such as "2026-10-25T18:00Z,4.5".',
  );
}

function checkIsText(text: string): void {
  if (text.trim() === '') {
    throw new WeatherFileError('The file is empty. Likely the export failed or the wrong file was chosen.');
  }
  const start = text.slice(0, 4000);
  if (
    start.startsWith('PK') ||
    start.charCodeAt(0) === 0x1f ||
    start.includes('\0') ||
    start.startsWith('%PDF')
  ) {
    throw new WeatherFileError(
      'The file is packed or a workbook, not text. Unpack it, or save the sheet as CSV, and send that.',
    );
  }
}

/** Formats that are known but not read here: how to tell each, and the way out. */
const STRANGERS: { sign: RegExp; found: string; wayOut: string }[] = [
  {
    sign: /^\s*<(?:!doctype|html|\?xml)/i,
    found: 'a web page or XML',
    wayOut: 'Download the data file itself: the link led to a page.',
  },
  { sign: /^\s*[[{]/, found: 'JSON', wayOut: 'Write it as "time,tempC" lines.' },
  {
    sign: /^[^\n]*\n?[^\n]*Date \(MM\/DD\/YYYY\),Time \(HH:MM\)/,
    found: 'a TMY3 CSV',
    wayOut: 'Send the EPW file of the same station, which holds the same year.',
  },
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
    sign: /\bTMAX\b.*\bTMIN\b|\bTMIN\b.*\bTMAX\b|^\w{11},\d{8},(?:TMAX|TMIN|PRCP)/,
    found: 'daily highs and lows (GHCN-Daily)',
    wayOut: 'Type the nights that matter, or send hourly readings as "time,tempC".',
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

function refuseKnownStrangers(lines: readonly string[]): void {
  const start = lines.slice(0, 30).join('\n').slice(0, 20_000);
  const stranger = STRANGERS.find(({ sign }) => sign.test(start));
  if (stranger) {
    throw new WeatherFileError(
      `This looks like ${stranger.found}, which is not read here. ${stranger.wayOut}`,
    );
  }
}

function epwFile(lines: readonly string[], site: WeatherFileSite): WeatherFile {
  const { station, typicalYear, rows, rejected, warnings } = readEpw(lines, site.onProgress ?? ignore);
  const offsetHours = typicalYear.standardOffsetHours;
  const phase = phaseWarning(
    { startAt: -offsetHours * HOUR_MS, tempC: typicalYear.tempC },
    { longitudeDeg: station.longitudeDeg, offsetHours },
  );
  return {
    format: 'epw',
    rows,
    rejected: rejected.listed,
    station,
    warnings: [
      ...warnings,
      ...stationWarnings(station, { offsetHours, site }),
      ...present(phase),
      ...rejected.warnings(),
    ],
    typicalYear,
    hours: null,
    from: '01-01',
    through: '12-31',
  };
}

function stationWarnings(
  station: Station,
  { offsetHours, site }: { offsetHours: number; site: WeatherFileSite },
): string[] {
  const warnings: string[] = [];
  const { latitudeDeg, longitudeDeg } = station;
  const apartDeg = Math.abs(((longitudeDeg - site.longitudeDeg + 540) % 360) - 180);
  if (Math.abs(latitudeDeg - site.latitudeDeg) > 1 || apartDeg > 1) {
    const isMirrored = Math.abs(longitudeDeg + site.longitudeDeg) < 1 && Math.abs(longitudeDeg) > 1;
    warnings.push(
      `The station ${station.name} stands at ${latitudeDeg}, ${longitudeDeg}, more than 1° from the site at ` +
        `${site.latitudeDeg}, ${site.longitudeDeg}. ` +
        (isMirrored
          ? 'Likely the sign of a longitude: east is positive, west negative.'
          : 'Choose a nearer station, or check the site.'),
    );
  }
  const siteOffsetHours = standardOffsetHours(site.timeZone, OFFSET_YEAR);
  if (Math.abs(offsetHours - siteOffsetHours) > 0.01) {
    warnings.push(
      `The file keeps UTC${signed(offsetHours)} and ${site.timeZone} has UTC${signed(siteOffsetHours)} as standard time. ` +
        'The hours are read by the file; check that it is for this site.',
    );
  }
  return warnings;
}

function timeTempFile(
  text: string,
  { header, site }: { header: TimeTempHeader; site: WeatherFileSite },
): WeatherFile {
  const { timeZone, longitudeDeg, onProgress = ignore } = site;
  const unit = site.unit ?? header.unit ?? 'C';
  const { readings, hotRows, rejected, warnings } = readTimeTempRows(text, {
    header,
    timeZone,
    unit,
    onProgress,
  });
  if (site.unit === undefined && header.unit === null) refuseFahrenheit(readings, hotRows);
  if (readings.length === 0) throw new WeatherFileError(nothingReadable(rejected));
  const { hours, kept, warnings: more } = hoursOfReadings(readings, rejected);
  const offsetHours = standardOffsetHours(timeZone, OFFSET_YEAR);
  return {
    format: 'time-temp',
    rows: kept.length,
    rejected: rejected.listed,
    warnings: [
      ...warnings,
      ...more,
      ...present(seldomWarning(kept)),
      ...present(phaseWarning(hours, { longitudeDeg, offsetHours })),
      ...rejected.warnings(),
    ],
    typicalYear: null,
    hours,
    from: localDate(kept[0]!.at, timeZone),
    through: localDate(kept[kept.length - 1]!.at, timeZone),
  };
}

/** A winter in °F may pass for a summer in °C, so this catches what cannot be °C and no more. */
function refuseFahrenheit(readings: readonly Reading[], hotRows: number): void {
  const values = readings.map((reading) => reading.tempC).sort((one, other) => one - other);
  const median = values[Math.floor(values.length / 2)] ?? Number.NEGATIVE_INFINITY;
  const isHot = hotRows > 0 && hotRows >= HOT_SHARE * (readings.length + hotRows);
  if (!isHot && median <= HOTTEST_MEDIAN_C) return;
  const found = isHot
    ? `${hotRows} readings lie above ${HOTTEST_C}`
    : `Half of the readings lie above ${median}`;
  throw new WeatherFileError(
    `${found}, which is no air in °C. Likely °F: send the file again with unit=F, or with unit=C if they are °C after all.`,
  );
}

function nothingReadable(rejected: RejectedLines): string {
  const first = rejected.listed[0];
  if (!first)
    return 'There is a heading and no reading below it. Likely the export failed: send another file.';
  return `None of the ${rejected.count} lines could be read. The first of them, line ${first.line}: ${first.message}`;
}

function seldomWarning(kept: readonly Reading[]): string | null {
  if (kept.length < 3) return null;
  const hours = kept.slice(1).map((reading, index) => (reading.at - kept[index]!.at) / HOUR_MS);
  const usual = hours.sort((one, other) => one - other)[Math.floor(hours.length / 2)]!;
  if (usual <= 4) return null;
  return `Readings come every ${Math.round(usual)} h, too seldom for the course of a night: hourly ones are needed.`;
}

function localDate(at: Instant, timeZone: string): string {
  const evening = eveningOf(at, timeZone);
  return wallTimeOf(at, timeZone) < '12:00' ? addEvenings(evening, 1) : evening;
}

function present(warning: string | null): string[] {
  return warning === null ? [] : [warning];
}

function signed(hours: number): string {
  return `${hours < 0 ? '-' : '+'}${Math.abs(hours)}`;
}

function ignore(): void {}
