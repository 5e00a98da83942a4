import type { TypicalYear } from '../model/climate.ts';
import { HOUR_MS, localDateOf } from '../model/evening.ts';
import type { ObservedHours } from '../model/weather.ts';
import { readEpw } from './epw.ts';
import { isGhcnDailyCsv, readGhcnDailyCsv } from './ghcn-daily-csv.ts';
import { hoursOfReadings } from './hourly-readings.ts';
import { offsetWarning, placeWarning, type Station, siteOffsetHours } from './station.ts';
import {
  findTimeTempHeader,
  HOTTEST_C,
  type Reading,
  readTimeTempRows,
  type TimeTempHeader,
} from './time-temp-csv.ts';
import { isTmy3Csv, readTmy3Csv } from './tmy3-csv.ts';
import { type RejectedLine, type RejectedLines, WeatherFileError } from './weather-file-error.ts';
import { phaseWarning } from './weather-phase.ts';
import { refuseStrangers } from './weather-strangers.ts';

export { WeatherFileError };

/** What a weather file holds; exactly one of `typicalYear` and `hours` is there. */
export type WeatherFile = {
  format: 'epw' | 'tmy3' | 'ghcn-daily' | 'time-temp';
  /** Lines whose temperature is used; days with a low and a high where the file has days. */
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
  /** What the temperatures are in where the file does not say; asked for when they look like °F. */
  unit?: 'C' | 'F';
};

const LONGEST_LINE = 20_000;
/** From this share of readings above 60 on, they are not taken for °C. Ours. */
const HOT_SHARE = 0.01;
/** No place on Earth has half its readings above this, °C. */
const HOTTEST_MEDIAN_C = 42;

/**
 * Reads a weather file; the format is told by what is in it, never by its name. EPW and TMY3 give a typical year;
 * GHCN-Daily and a CSV with a time and a temperature column give hours. See `readEpw`, `readTmy3Csv`,
 * `readGhcnDailyCsv` and `readTimeTempRows` for how each is read.
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
  if (/^LOCATION,/i.test(lines[0]!)) return typicalYearFile('epw', { lines, site });
  if (isTmy3Csv(lines)) return typicalYearFile('tmy3', { lines, site });
  if (isGhcnDailyCsv(lines)) return ghcnDailyFile(lines, site);
  refuseStrangers(lines);
  const header = findTimeTempHeader(lines);
  if (header) return timeTempFile(plain, { header, site });
  const first = lines.find((line) => line.trim() !== '')!;
  throw new WeatherFileError(
    `The file starts with "${first.trim().slice(0, 80)}", which is no heading of EPW, TMY3 or GHCN-Daily, nor one with ` +
      'a time and a temperature column. Put a first line "time,tempC" above lines such as "2026-10-25T18:00Z,4.5".',
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

function typicalYearFile(
  format: 'epw' | 'tmy3',
  { lines, site }: { lines: readonly string[]; site: WeatherFileSite },
): WeatherFile {
  const read = format === 'epw' ? readEpw : readTmy3Csv;
  const { station, typicalYear, rows, rejected, warnings } = read(lines);
  const offsetHours = typicalYear.standardOffsetHours;
  const phase = phaseWarning(
    { startAt: -offsetHours * HOUR_MS, tempC: typicalYear.tempC },
    { longitudeDeg: station.longitudeDeg, offsetHours },
  );
  return {
    format,
    rows,
    rejected: rejected.listed,
    station,
    warnings: [
      ...warnings,
      ...present(placeWarning(station, site)),
      ...present(offsetWarning(offsetHours, site.timeZone)),
      ...present(phase),
      ...rejected.warnings(),
    ],
    typicalYear,
    hours: null,
    from: '01-01',
    through: '12-31',
  };
}

function ghcnDailyFile(lines: readonly string[], site: WeatherFileSite): WeatherFile {
  const { station, hours, rows, rejected, warnings, from, through } = readGhcnDailyCsv(lines, site);
  return {
    format: 'ghcn-daily',
    rows,
    rejected: rejected.listed,
    ...(station ? { station } : {}),
    warnings: [...warnings, ...present(station && placeWarning(station, site)), ...rejected.warnings()],
    typicalYear: null,
    hours,
    from,
    through,
  };
}

function timeTempFile(
  text: string,
  { header, site }: { header: TimeTempHeader; site: WeatherFileSite },
): WeatherFile {
  const { timeZone, longitudeDeg } = site;
  const unit = site.unit ?? header.unit ?? 'C';
  const { readings, hotRows, rejected, warnings } = readTimeTempRows(text, {
    header,
    timeZone,
    unit,
  });
  if (site.unit === undefined && header.unit === null) refuseFahrenheit(readings, hotRows);
  if (readings.length === 0) throw new WeatherFileError(nothingReadable(rejected));
  const { hours, kept, warnings: more } = hoursOfReadings(readings, rejected);
  const offsetHours = siteOffsetHours(timeZone);
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
    from: localDateOf(kept[0]!.at, timeZone),
    through: localDateOf(kept[kept.length - 1]!.at, timeZone),
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

function present(warning: string | null): string[] {
  return warning === null ? [] : [warning];
}
