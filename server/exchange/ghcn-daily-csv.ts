import { type DayCourse, dayCourseAt, dayTemperatureC } from '../model/climate.ts';
import {
  addEvenings,
  type Evening,
  eveningsFrom,
  HOUR_MS,
  isEvening,
  latestOf,
  localNoonAt,
} from '../model/evening.ts';
import { FIRST_KNOWN_YEAR, LAST_KNOWN_YEAR } from '../model/known-years.ts';
import type { ObservedHours } from '../model/weather.ts';
import { csvFields, numberOrNaN } from './csv-fields.ts';
import { type DailyUnit, dailyUnitOf, toC } from './daily-unit.ts';
import type { Station } from './station.ts';
import { COLDEST_C, HOTTEST_C } from './time-temp-csv.ts';
import { RejectedLines, WeatherFileError } from './weather-file-error.ts';

export type GhcnDailyFile = {
  station: Station | null;
  hours: ObservedHours;
  /** Days that have a low and a high. */
  rows: number;
  rejected: RejectedLines;
  warnings: string[];
  from: Evening;
  through: Evening;
};

type GhcnDailySite = {
  timeZone: string;
  latitudeDeg: number;
  longitudeDeg: number;
  unit?: 'C' | 'F';
};

/** An extreme as written, in the file's own unit, and the day it belongs to. */
type Extreme = { value: number; date: Evening; line: number };
type Written = { lows: Extreme[]; highs: Extreme[] };
type Day = { minC: number; maxC: number };

const USED_NAMES = [
  ...['STATION', 'DATE', 'LATITUDE', 'LONGITUDE', 'ELEVATION', 'NAME'],
  ...['TMAX', 'TMAX_ATTRIBUTES', 'TMIN', 'TMIN_ATTRIBUTES'],
];
/** Older days help no season to come. Ours. */
const LONGEST_YEARS = 20;
const MISSING = -9999;
/** A high read up to this time of day, hhmm, is that of the afternoon before. Common practice, no source. */
const LATEST_MORNING = 1200;

/** Whether the lines begin as a GHCN-Daily access CSV or daily summaries do: a row a day, a column an element. */
export function isGhcnDailyCsv(lines: readonly string[]): boolean {
  const names = columnNames((lines.find((line) => line.trim() !== '') ?? '').split(','));
  return (
    names.includes('STATION') && names.includes('DATE') && (names.includes('TMAX') || names.includes('TMIN'))
  );
}

function columnNames(fields: readonly string[]): string[] {
  return fields.map((field) => field.trim().replaceAll('"', '').toUpperCase());
}

/**
 * Reads the daily highs and lows of one GHCN-Daily station and draws hours through them. Values are tenths of °C and a
 * day is the station's local one. A value with a quality flag (the second attribute) is left out. Where the fourth
 * attribute says that the high was read before noon it belongs to the day before. Each day's mid and range stand at
 * its local noon, with straight lines between noons, and the hours follow `dayTemperatureC`; so a day that is missing
 * takes the evening before it and its own along. Days more than 20 years older than the last, or before
 * 2000, are left out.
 * Source: the data set's own documentation of columns, units and flags; the attribute with the time from memory of it.
 * @param lines of the file, line ends removed
 * @param site IANA zone of the local days; position that stands in where the file has none; unit of daily summaries,
 * which are in °F or °C as they were ordered
 * @throws WeatherFileError for several stations, a missing column, a unit that cannot be told, or no two days in a row
 */
export function readGhcnDailyCsv(lines: readonly string[], site: GhcnDailySite): GhcnDailyFile {
  const first = lines.findIndex((line) => line.trim() !== '');
  const names = columnNames(lines[first]!.split(','));
  checkColumns(names);
  const rejected = new RejectedLines();
  const { station, written } = readRows(lines, { first, names, rejected });
  checkNotEmpty(written, rejected);
  const { unit, warnings } = dailyUnitOf(
    written.lows.map(({ value }) => value),
    { highs: written.highs.map(({ value }) => value), asked: site.unit },
  );
  const { days, older } = daysOf(written, { unit, rejected });
  const span = spanOf(days);
  const course = dayCourseAt(station ?? site);
  return {
    station,
    hours: hoursOfDays(days, { ...span, timeZone: site.timeZone, course }),
    rows: days.size,
    rejected,
    warnings: [...warnings, ...daysWarnings(days, { ...span, older })],
    ...span,
  };
}

function checkColumns(names: readonly string[]): void {
  const missing = ['TMAX', 'TMIN'].find((name) => !names.includes(name));
  if (missing === undefined) return;
  throw new WeatherFileError(
    `The heading has no column ${missing}, and a night needs the day's high and its low. ` +
      'Likely the station measures no temperature, or the column was not ordered: choose TMAX and TMIN.',
  );
}

function checkNotEmpty({ lows, highs }: Written, rejected: RejectedLines): void {
  if (lows.length > 0 && highs.length > 0) return;
  const first = rejected.listed[0];
  throw new WeatherFileError(
    `No row has a ${lows.length === 0 ? 'low (TMIN)' : 'high (TMAX)'} that can be used. ` +
      (first
        ? `The first line left out, ${first.line}: ${first.message}`
        : 'Likely the station measures rain only: choose another one near it.'),
  );
}

function readRows(
  lines: readonly string[],
  options: {
    first: number;
    names: readonly string[];
    rejected: RejectedLines;
  },
): { station: Station | null; written: Written } {
  const { first, names, rejected } = options;
  const [dateColumn, stationColumn] = [names.indexOf('DATE'), names.indexOf('STATION')];
  const usedColumns = 1 + Math.max(...USED_NAMES.map((name) => names.indexOf(name)));
  const readLow = extremeReader(names, 'TMIN');
  const readHigh = extremeReader(names, 'TMAX');
  const written: Written = { lows: [], highs: [] };
  let stationRow: string[] | null = null;
  for (let index = first + 1; index < lines.length; index++) {
    const line = lines[index]!;
    if (line.trim() === '') continue;
    const row = csvFields(line, usedColumns);
    if (row === null) {
      rejected.add(index + 1, 'A quotation mark is never closed; likely the file was cut here.');
      continue;
    }
    stationRow ??= row;
    const id = row[stationColumn]?.trim();
    if (id !== stationRow[stationColumn]?.trim()) {
      throw new WeatherFileError(
        `Line ${index + 1} is of the station ${id || '(none)'} and the lines before are of ${stationRow[stationColumn]}. ` +
          'Likely a download of several stations: send the file of the one nearest to the site.',
      );
    }
    const date = row[dateColumn]?.trim() ?? '';
    if (!isEvening(date) || Number(date.slice(0, 4)) > LAST_KNOWN_YEAR) {
      rejected.add(
        index + 1,
        `"${date.slice(0, 40)}" is not a day from 1900 to ${LAST_KNOWN_YEAR}, written like 2026-10-25.`,
      );
      continue;
    }
    const at = { date, line: index + 1 };
    const low = readLow(row, at);
    const high = readHigh(row, at);
    if (low && typeof low !== 'string') written.lows.push(low);
    if (high && typeof high !== 'string') {
      written.highs.push(high.isMorning ? { ...high, date: addEvenings(date, -1) } : high);
    }
    const faults = [high, low].filter((each) => typeof each === 'string');
    if (faults.length > 0) rejected.add(index + 1, faults.join(' '));
  }
  return { station: stationRow && stationOf(stationRow, names), written };
}

type ExtremeRead = Extreme & { isMorning: boolean };

/** What reads one element of a row: the extreme, null where it is missing, or why it is left out. */
function extremeReader(names: readonly string[], name: 'TMIN' | 'TMAX') {
  const column = names.indexOf(name);
  const attributesColumn = names.indexOf(`${name}_ATTRIBUTES`);
  return (row: readonly string[], at: { date: Evening; line: number }): ExtremeRead | string | null => {
    const field = row[column]?.trim() ?? '';
    const value = numberOrNaN(field);
    if (field === '' || value === MISSING) return null;
    if (Number.isNaN(value)) return `${name} "${field.slice(0, 40)}" is not a temperature.`;
    const [, quality = '', , time = ''] = row[attributesColumn]?.split(',') ?? [];
    if (quality.trim() !== '') return `${name} ${field} failed the data set's quality check "${quality}".`;
    const isMorning = /^\d{4}$/.test(time) && Number(time) > 0 && Number(time) <= LATEST_MORNING;
    return { value, ...at, isMorning };
  };
}

function stationOf(row: readonly string[], names: readonly string[]): Station | null {
  const field = (name: string) => row[names.indexOf(name)]?.trim() ?? '';
  const [latitudeDeg, longitudeDeg, elevationM] = ['LATITUDE', 'LONGITUDE', 'ELEVATION'].map((name) =>
    numberOrNaN(field(name)),
  ) as [number, number, number];
  if (!(Math.abs(latitudeDeg) <= 90 && Math.abs(longitudeDeg) <= 180)) return null;
  const station = { name: field('NAME') || field('STATION'), latitudeDeg, longitudeDeg };
  // Unknown heights are written as -999.9.
  return elevationM > -900 ? { ...station, elevationM } : station;
}

/** The days with a low and a high, °C, and how many older ones were left out. */
function daysOf(
  { lows, highs }: Written,
  { unit, rejected }: { unit: DailyUnit; rejected: RejectedLines },
): { days: Map<Evening, Day>; older: number } {
  const lowsC = byDate(lows, { name: 'TMIN', unit, rejected });
  const highsC = byDate(highs, { name: 'TMAX', unit, rejected });
  const newest = [...lowsC.keys()].reduce((one, other) => (other > one ? other : one), '');
  const oldest = latestOf(
    newest === '' ? '' : `${Number(newest.slice(0, 4)) - LONGEST_YEARS}${newest.slice(4)}`,
    `${FIRST_KNOWN_YEAR - 1}-12-31`,
  );
  const days = new Map<Evening, Day>();
  let older = 0;
  for (const [date, low] of lowsC) {
    const high = highsC.get(date);
    if (!high) continue;
    if (date <= oldest) older++;
    else if (high.tempC < low.tempC) {
      rejected.add(
        low.line,
        `The low of ${date}, ${rounded(low.tempC)} °C, lies above its high, ${rounded(high.tempC)} °C.`,
      );
    } else {
      days.set(date, { minC: low.tempC, maxC: high.tempC });
    }
  }
  if (days.size === 0 && older > 0) {
    throw new WeatherFileError(
      `All ${older} days lie before ${FIRST_KNOWN_YEAR}, too long ago to say anything of a season to come. ` +
        'Likely a station that measures no more: choose one that still does.',
    );
  }
  return { days, older };
}

function byDate(
  extremes: readonly Extreme[],
  options: { name: string; unit: DailyUnit; rejected: RejectedLines },
): Map<Evening, { tempC: number; line: number }> {
  const { name, unit, rejected } = options;
  const found = new Map<Evening, { tempC: number; line: number }>();
  for (const { value, date, line } of extremes) {
    const tempC = toC(value, unit);
    if (tempC < COLDEST_C || tempC > HOTTEST_C) {
      rejected.add(line, `${name} ${rounded(tempC)} °C lies outside ${COLDEST_C} to ${HOTTEST_C} °C.`);
    } else if (found.has(date)) {
      rejected.add(line, `${name} of ${date} stands in the file twice; the first is kept.`);
    } else {
      found.set(date, { tempC, line });
    }
  }
  return found;
}

/** First and last day of those that have a neighbour; only between two days is there an evening. */
function spanOf(days: ReadonlyMap<Evening, Day>): { from: Evening; through: Evening } {
  const opening = [...days.keys()].filter((date) => days.has(addEvenings(date, 1))).sort();
  const [from, last] = [opening[0], opening[opening.length - 1]];
  if (from === undefined || last === undefined) {
    throw new WeatherFileError(
      `${days.size} days have a low and a high and no two of them follow each other, so no night lies between them. ` +
        'Likely days were left out: send the whole file of the station.',
    );
  }
  return { from, through: addEvenings(last, 1) };
}

function hoursOfDays(
  days: ReadonlyMap<Evening, Day>,
  options: { from: Evening; through: Evening; timeZone: string; course: DayCourse },
): ObservedHours {
  const { from, through, timeZone, course } = options;
  const startAt = Math.ceil(localNoonAt(from, timeZone) / HOUR_MS) * HOUR_MS;
  const endAt = localNoonAt(through, timeZone);
  const tempC = new Float32Array(Math.floor((endAt - startAt) / HOUR_MS) + 1).fill(Number.NaN);
  let noonAt = localNoonAt(from, timeZone);
  for (const evening of eveningsFrom(from, addEvenings(through, -1))) {
    const nextDate = addEvenings(evening, 1);
    const nextNoonAt = localNoonAt(nextDate, timeZone);
    const [day, next] = [days.get(evening), days.get(nextDate)];
    for (let at = Math.ceil(noonAt / HOUR_MS) * HOUR_MS; day && next && at <= nextNoonAt; at += HOUR_MS) {
      const share = nextNoonAt > noonAt ? (at - noonAt) / (nextNoonAt - noonAt) : 0;
      const minC = day.minC + (next.minC - day.minC) * share;
      const maxC = day.maxC + (next.maxC - day.maxC) * share;
      tempC[(at - startAt) / HOUR_MS] = dayTemperatureC(course, { minC, maxC }, at);
    }
    noonAt = nextNoonAt;
  }
  return { startAt, tempC };
}

function daysWarnings(
  days: ReadonlyMap<Evening, Day>,
  { from, through, older }: { from: Evening; through: Evening; older: number },
): string[] {
  const warnings = [
    "The hours are drawn through each day's low and high: the mean of a single night may be 1.6 K off, of a month 0.5 K.",
  ];
  const missing = eveningsFrom(from, through).filter((date) => !days.has(date)).length;
  if (missing > 0) {
    warnings.push(
      `${missing} days between ${from} and ${through} have no low and high; the nights beside them stay open.`,
    );
  }
  if (older > 0)
    warnings.push(
      `${older} days before ${from} were left out: of the last ${LONGEST_YEARS} years those since ${FIRST_KNOWN_YEAR} are kept.`,
    );
  return warnings;
}

function rounded(tempC: number): number {
  return Math.round(tempC * 10) / 10;
}
