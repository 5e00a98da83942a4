import type { TypicalYear } from '../model/climate.ts';
import { YEAR_HOURS } from '../model/climate.ts';
import { RejectedLines, WeatherFileError } from './weather-file-error.ts';

/** Where a file says its thermometer stands. */
export type Station = { name: string; latitudeDeg: number; longitudeDeg: number; elevationM?: number };

export type EpwYear = {
  station: Station;
  typicalYear: TypicalYear;
  rows: number;
  rejected: RejectedLines;
  warnings: string[];
};

const MONTH_STARTS = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334, 365] as const;
const HEADER_LINES = 50;
const LEAST_KNOWN_SHARE = 0.9;
const SHORT_GAP_HOURS = 3;
const LONGEST_GAP_HOURS = 14 * 24;

/**
 * Reads an EPW typical year: dry bulb, field 7, is the air at the end of each row's hour, in local standard time all
 * year. The years in it are ignored, since each month comes from another one; so is the minute where there is one
 * row an hour, since files write 0 or 60 there and mean the same. 99.9 and more is missing. 29 February is left out.
 * Source: the file format's own data dictionary; that the hour is an instant, not a mean, is measured on 60 stations.
 * @param lines of the file, line ends removed; text read as latin-1 or UTF-8 alike
 * @throws WeatherFileError when the header or a tenth of the year is missing
 */
export function readEpw(lines: readonly string[], onProgress: (share: number) => void): EpwYear {
  const { station, standardOffsetHours } = readLocation(lines[0]!);
  const { firstRow, rowsPerHour } = readDataPeriods(lines);
  const rejected = new RejectedLines();
  const tempC = new Float32Array(YEAR_HOURS).fill(Number.NaN);
  const years = new Set<string>();
  const seen = new Uint8Array(YEAR_HOURS);
  let rows = 0;
  let missing = 0;
  for (let index = firstRow; index < lines.length; index++) {
    if (index % 2000 === 0) onProgress(index / lines.length);
    const line = lines[index]!;
    if (line.trim() === '') continue;
    const row = readRow(line, rowsPerHour);
    if (typeof row === 'string') {
      rejected.add(index + 1, row);
      continue;
    }
    if (row.hourOfYear === null) continue;
    if (seen[row.hourOfYear]) {
      rejected.add(index + 1, 'This hour of the year stands in the file twice; the first is kept.');
      continue;
    }
    seen[row.hourOfYear] = 1;
    years.add(row.year);
    if (Number.isNaN(row.tempC)) missing++;
    else rows++;
    tempC[row.hourOfYear] = row.tempC;
  }
  checkComplete(tempC, rows);
  fillShortGaps(tempC);
  const warnings: string[] = [];
  if (missing > 0)
    warnings.push(`${missing} hours have no temperature; the hours and days around them stand in.`);
  if (years.size === 1) {
    warnings.push(
      `Every row is of ${[...years][0]}: this may be one real year and not a typical one, and its storms are averaged away.`,
    );
  }
  return { station, typicalYear: { standardOffsetHours, tempC }, rows, rejected, warnings };
}

function readLocation(line: string): { station: Station; standardOffsetHours: number } {
  // The name may hold commas, so the numbers are counted from the end.
  const fields = line.split(',').map((field) => field.trim());
  const [latitudeDeg, longitudeDeg, standardOffsetHours, elevationM] = fields.slice(-4).map(numberOrNaN) as [
    number,
    number,
    number,
    number,
  ];
  const isPlace =
    Math.abs(latitudeDeg) <= 90 && Math.abs(longitudeDeg) <= 180 && Math.abs(standardOffsetHours) <= 14;
  if (fields.length < 10 || !isPlace) {
    throw new WeatherFileError(
      `The first line, "${line.slice(0, 120)}", should end in latitude, longitude, hours from UTC and elevation. ` +
        'Likely the header was edited: download the EPW file again and send it unchanged.',
    );
  }
  const name = fields[1] || 'unnamed station';
  const station = { name, latitudeDeg, longitudeDeg };
  return {
    station: Number.isFinite(elevationM) ? { ...station, elevationM } : station,
    standardOffsetHours,
  };
}

function readDataPeriods(lines: readonly string[]): { firstRow: number; rowsPerHour: number } {
  const index = lines.slice(0, HEADER_LINES).findIndex((line) => /^DATA PERIODS,/i.test(line));
  const rowsPerHour = index < 0 ? Number.NaN : numberOrNaN(lines[index]!.split(',')[2] ?? '');
  if (!(rowsPerHour >= 1 && rowsPerHour <= 60 && 60 % rowsPerHour === 0)) {
    throw new WeatherFileError(
      'The header has no "DATA PERIODS" line that says how many rows an hour has. ' +
        'Likely the file was cut or edited: download the EPW file again and send it unchanged.',
    );
  }
  return { firstRow: index + 1, rowsPerHour };
}

type EpwRow = { year: string; hourOfYear: number | null; tempC: number };

/** The row, with `hourOfYear` null for a row that falls between hours or on 29 February; or why it is rejected. */
function readRow(line: string, rowsPerHour: number): EpwRow | string {
  const fields = line.split(',', 7);
  if (fields.length < 7)
    return `A row needs at least 7 fields and has ${fields.length}; likely the file was cut here.`;
  const [month, day, hour, minute] = fields.slice(1, 5).map(numberOrNaN) as [number, number, number, number];
  const days = month === 2 ? 29 : (MONTH_STARTS[month] ?? 0) - (MONTH_STARTS[month - 1] ?? 0);
  if (!(Number.isInteger(day) && day >= 1 && day <= days)) {
    return `There is no day ${fields[2]} in month ${fields[1]}.`;
  }
  if (!(Number.isInteger(hour) && hour >= 1 && hour <= 24))
    return `Hours run from 1 to 24, not ${fields[3]}.`;

  const tempC = dryBulb(fields[6]!);
  if (typeof tempC === 'string') return tempC;
  const hourOfDay = rowsPerHour === 1 ? hour : hour - 1 + minute / 60;
  const isBetween = !Number.isInteger(hourOfDay) || (month === 2 && day === 29);
  const hourOfYear = isBetween ? null : ((MONTH_STARTS[month - 1]! + day - 1) * 24 + hourOfDay) % YEAR_HOURS;
  return { year: fields[0]!.trim(), hourOfYear, tempC };
}

function dryBulb(field: string): number | string {
  const tempC = numberOrNaN(field);
  if (tempC >= 99.9 || field.trim() === '') return Number.NaN;
  if (Number.isNaN(tempC)) return `"${field.trim().slice(0, 40)}" is not a temperature.`;
  if (tempC < -70 || tempC > 60) return `${tempC} °C lies outside -70 to 60 °C.`;
  return tempC;
}

function checkComplete(tempC: Float32Array, rows: number): void {
  let gap = 0;
  let longestGap = 0;
  for (let index = 0; index < 2 * YEAR_HOURS; index++) {
    gap = Number.isNaN(tempC[index % YEAR_HOURS]!) ? gap + 1 : 0;
    longestGap = Math.max(longestGap, Math.min(gap, YEAR_HOURS));
  }
  if (rows >= LEAST_KNOWN_SHARE * YEAR_HOURS && longestGap < LONGEST_GAP_HOURS) return;
  throw new WeatherFileError(
    `This EPW file has a temperature for ${rows} of the ${YEAR_HOURS} hours of a year, ` +
      `and up to ${longestGap} are missing in a row. Likely the file was cut: a typical year must be whole, ` +
      'so download it again, or send the hours you have as a "time,tempC" CSV.',
  );
}

/** Straight lines over at most three missing hours, round the year's end too. */
function fillShortGaps(tempC: Float32Array): void {
  const known = tempC.slice();
  for (let index = 0; index < YEAR_HOURS; index++) {
    const leftC = known[index]!;
    if (Number.isNaN(leftC)) continue;
    let width = 1;
    while (width <= SHORT_GAP_HOURS + 1 && Number.isNaN(known[(index + width) % YEAR_HOURS]!)) width++;
    if (width > SHORT_GAP_HOURS + 1) continue;
    const rightC = known[(index + width) % YEAR_HOURS]!;
    for (let step = 1; step < width; step++) {
      tempC[(index + step) % YEAR_HOURS] = leftC + ((rightC - leftC) * step) / width;
    }
  }
}

function numberOrNaN(text: string): number {
  return text.trim() === '' ? Number.NaN : Number(text);
}
