import Papa from 'papaparse';
import { HOUR_MS, type Instant, instantOnDate, isEvening, wallTimeOf } from '../model/evening.ts';
import { RejectedLines, WeatherFileError } from './weather-file-error.ts';

/** One accepted line: the air at an instant, °C. */
export type Reading = { at: Instant; tempC: number; line: number };

export type TimeTempRows = {
  readings: Reading[];
  /** Lines refused as too hot for °C that would do as °F. */
  hotRows: number;
  rejected: RejectedLines;
  warnings: string[];
};

/** Which columns a file has, how they are separated and what its header says of them. */
export type TimeTempHeader = {
  line: number;
  delimiter: string;
  columns: number;
  timeColumn: number;
  /** Time of day, where date and time stand in two columns. */
  clockColumn: number | null;
  tempColumn: number;
  isUtc: boolean;
  unit: 'C' | 'F' | null;
};

const HEADER_WITHIN_LINES = 30;
const MOST_ROWS = 600_000;
/** Air outdoors stays within these everywhere on Earth. */
export const COLDEST_C = -70;
export const HOTTEST_C = 60;
const HOTTEST_F = 140;
const TIME_NAMES = [
  'time',
  'datetime',
  'timestamp',
  'timeutc',
  'datetimeutc',
  'utc',
  'dateandtime',
  'date',
  'day',
];
const TEMP_NAME =
  /^(?:air|outdoor|dry|mean|avg)?(?:temp|temperature)(?:ature)?(?:deg)?(celsius|fahrenheit|[cf])?$/;
const MISSING = new Set([
  '',
  'nan',
  'na',
  'n/a',
  'null',
  'none',
  '-',
  '--',
  '-999',
  '-9999',
  '-999.0',
  '-9999.0',
]);
const TIME =
  /^(\d{4}-\d{2}-\d{2})(?:[T ]+(\d{2}):?(\d{2})(?::?(\d{2})(?:[.,]\d+)?)?)? ?(Z|UTC|[+-]\d{2}(?::?\d{2})?)?$/i;

/**
 * Looks for a header with a time and a temperature column in the first 30 lines.
 * @param lines of the file
 * @returns null when there is none
 */
export function findTimeTempHeader(lines: readonly string[]): TimeTempHeader | null {
  for (let index = 0; index < Math.min(lines.length, HEADER_WITHIN_LINES); index++) {
    for (const delimiter of ['\t', ';', ',']) {
      const names = lines[index]!.split(delimiter).map(plainName);
      const tempColumn = names.findIndex((name) => TEMP_NAME.test(name));
      const timeColumn = names.findIndex((name) => TIME_NAMES.includes(name));
      if (tempColumn < 0 || timeColumn < 0) continue;
      const unitName = TEMP_NAME.exec(names[tempColumn]!)?.[1]?.[0];
      const dateColumn = names.findIndex((name) => name === 'date' || name === 'day');
      const clockColumn = names.findIndex((name) => name === 'time' || name === 'timeutc');
      const isSplit = dateColumn >= 0 && clockColumn >= 0;
      return {
        line: index + 1,
        delimiter,
        columns: names.length,
        timeColumn: isSplit ? dateColumn : timeColumn,
        clockColumn: isSplit ? clockColumn : null,
        tempColumn,
        isUtc:
          names.some((name) => TIME_NAMES.includes(name) && name.endsWith('utc')) ||
          names.includes('timeutc'),
        unit: unitName === undefined ? null : unitName === 'f' ? 'F' : 'C',
      };
    }
  }
  return null;
}

function plainName(name: string): string {
  return name.toLowerCase().replace(/[^a-z]/g, '');
}

/**
 * Reads the lines below the header. A time with Z or an offset is exact; one without is the site's local wall clock,
 * where the hour a clock change repeats is told apart by the order of the lines and the hour it skips is refused.
 * @param text the whole file; decimal commas are read where the separator is a semicolon or a tab
 * @param options.timeZone IANA name of the site; `unit` of the temperatures
 * @throws WeatherFileError for more than 600,000 rows, or a quotation mark that would swallow lines
 */
export function readTimeTempRows(
  text: string,
  options: { header: TimeTempHeader; timeZone: string; unit: 'C' | 'F' },
): TimeTempRows {
  const { header, timeZone, unit } = options;
  const { data, errors } = Papa.parse<string[]>(text, { delimiter: header.delimiter });
  const quote = errors.find((error) => error.type === 'Quotes');
  if (quote) {
    throw new WeatherFileError(
      `Near line ${(quote.row ?? 0) + 1} a quotation mark is never closed, which would swallow the lines after it. ` +
        'Remove it and send the file again: times and temperatures need no quotes.',
    );
  }
  if (data.length > MOST_ROWS) {
    throw new WeatherFileError(
      `The file has ${data.length} rows, and ${MOST_ROWS} are read at most. Likely a reading every few seconds: ` +
        'keep one in ten minutes, or send one season at a time.',
    );
  }
  const rejected = new RejectedLines();
  const readings: Reading[] = [];
  let hotRows = 0;
  const clock = { timeZone, isUtc: header.isUtc, lastAt: Number.NEGATIVE_INFINITY };
  let localTimes = 0;
  let withoutTempC = 0;
  let skippedTimes = 0;
  for (let index = header.line; index < data.length; index++) {
    const row = data[index]!;
    if (row.length === 1 && row[0]!.trim() === '') continue;
    const value = writtenValue(row, header);
    const tempC = typeof value === 'number' && unit === 'F' ? (value - 32) / 1.8 : value;
    if (typeof tempC === 'string') {
      rejected.add(index + 1, tempC);
      continue;
    }
    if (tempC < COLDEST_C || tempC > HOTTEST_C) {
      if (tempC > HOTTEST_C && tempC <= HOTTEST_F) hotRows++;
      rejected.add(index + 1, `${value} °${unit} lies outside ${COLDEST_C} to ${HOTTEST_C} °C.`);
      continue;
    }
    const time = instantOf(timeText(row, header), clock);
    if (typeof time === 'string') {
      if (time.startsWith('The clock skips')) skippedTimes++;
      rejected.add(index + 1, time);
      continue;
    }
    clock.lastAt = time.at;
    if (time.isLocal) localTimes++;
    if (Number.isNaN(tempC)) withoutTempC++;
    else readings.push({ at: time.at, tempC, line: index + 1 });
  }
  const warnings = clockWarnings({ localTimes, skippedTimes, timeZone });
  if (withoutTempC > 0) warnings.push(missingWarning(withoutTempC));
  return { readings, hotRows, rejected, warnings };
}

function missingWarning(lines: number): string {
  return `${lines === 1 ? '1 line has' : `${lines} lines have`} no temperature; the hours around stand in.`;
}

function clockWarnings(found: { localTimes: number; skippedTimes: number; timeZone: string }): string[] {
  const warnings: string[] = [];
  if (found.localTimes > 0) {
    warnings.push(
      `${found.localTimes} times have no offset and were read as the wall clock of ${found.timeZone}. ` +
        'If the logger keeps UTC, write them with a Z.',
    );
  }
  if (found.skippedTimes > 0) {
    warnings.push(
      `${found.skippedTimes} readings fall into an hour that the wall clock of ${found.timeZone} skips, so the logger ` +
        'likely keeps standard time all year: write its times with their offset, as in 2026-10-25T18:00+01:00.',
    );
  }
  return warnings;
}

/** The temperature as written, NaN for a missing one, or why the line is rejected. */
function writtenValue(row: readonly string[], header: TimeTempHeader): number | string {
  const field = row[header.tempColumn]?.trim();
  if (field === undefined) {
    return `The line has ${row.length} fields and no temperature; likely another separator than the header's.`;
  }
  if (MISSING.has(field.toLowerCase())) return Number.NaN;
  if (header.delimiter === ',' && row.length > header.columns) {
    return `The line has ${row.length} fields under ${header.columns} headings; likely decimal commas: separate with ";".`;
  }
  const hasComma = /^[+-]?\d+,\d+$/.test(field);
  const value = hasComma ? Number(field.replace(',', '.')) : Number(field);
  if (Number.isNaN(value)) return `"${field.slice(0, 40)}" is not a temperature.`;
  return value;
}

function timeText(row: readonly string[], { timeColumn, clockColumn }: TimeTempHeader): string {
  const first = row[timeColumn]?.trim() ?? '';
  return clockColumn === null ? first : `${first}T${row[clockColumn]?.trim() ?? ''}`;
}

type Clock = { timeZone: string; isUtc: boolean; lastAt: Instant };

function instantOf(text: string, clock: Clock): { at: Instant; isLocal: boolean } | string {
  const parts = TIME.exec(text);
  const date = parts?.[1];
  if (!parts || date === undefined || !isEvening(date)) {
    return `"${text.slice(0, 40)}" is not a time: write it as 2026-10-25T18:00Z, year first.`;
  }
  const [, , hour, minute, second = '0', offset] = parts;
  if (hour === undefined) return `"${text}" is a date without a time of day; write it as 2026-10-25T18:00Z.`;
  const isMidnight = hour === '24' && minute === '00' && Number(second) === 0;
  if ((Number(hour) > 23 && !isMidnight) || Number(minute) > 59 || Number(second) > 60) {
    return `There is no time of day ${hour}:${minute}.`;
  }
  const offsetMs = offset === undefined ? (clock.isUtc ? 0 : null) : offsetOf(offset);
  if (offsetMs !== null) {
    const utcAt = Date.parse(`${date}T00:00:00Z`) + Number(hour) * HOUR_MS + Number(minute) * 60_000;
    return { at: utcAt + Number(second) * 1000 - offsetMs, isLocal: false };
  }
  return wallInstant({ date, hour, minute: minute!, second: Number(second) }, clock);
}

function offsetOf(text: string): number {
  if (!/^[+-]/.test(text)) return 0;
  const digits = text.slice(1).replace(':', '').padEnd(4, '0');
  const hours = Number(digits.slice(0, 2)) + Number(digits.slice(2)) / 60;
  return (text[0] === '-' ? -hours : hours) * HOUR_MS;
}

function wallInstant(
  wall: { date: string; hour: string; minute: string; second: number },
  { timeZone, lastAt }: Clock,
): { at: Instant; isLocal: boolean } | string {
  const isMidnight = wall.hour === '24';
  const wallTime = isMidnight ? '00:00' : `${wall.hour}:${wall.minute}`;
  const date = isMidnight ? nextDate(wall.date) : wall.date;
  let at = instantOnDate(date, wallTime, timeZone);
  if (wallTimeOf(at, timeZone) !== wallTime) {
    return `The clock skips ${wallTime} on ${date} in ${timeZone}; write the time with its offset.`;
  }
  at += wall.second * 1000;
  if (at <= lastAt) {
    const again = [HOUR_MS, HOUR_MS / 2].find(
      (laterMs) => wallTimeOf(at + laterMs, timeZone) === wallTime && at + laterMs > lastAt,
    );
    if (again !== undefined) at += again;
  }
  return { at, isLocal: true };
}

function nextDate(date: string): string {
  return new Date(Date.parse(`${date}T00:00:00Z`) + 24 * HOUR_MS).toISOString().slice(0, 10);
}
