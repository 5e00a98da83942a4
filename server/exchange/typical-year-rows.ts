import { hourMissingThroughout, MONTH_STARTS, type TypicalYear, YEAR_HOURS } from '../model/climate.ts';
import { numberOrNaN } from './csv-fields.ts';
import type { Station } from './station.ts';
import { COLDEST_C, HOTTEST_C } from './time-temp-csv.ts';
import { RejectedLines, WeatherFileError } from './weather-file-error.ts';

export type TypicalYearFile = {
  station: Station;
  typicalYear: TypicalYear;
  rows: number;
  rejected: RejectedLines;
  warnings: string[];
};

/** One row; `hourOfYear` is null between full hours and on 29 February, `tempC` NaN where missing. */
export type TypicalYearRow = { year: string; hourOfYear: number | null; tempC: number };

/** A row's fields as written; `minute` is the minute past the hour before, null where the hour itself is meant. */
export type WrittenRow = {
  year: string;
  month: string;
  day: string;
  hour: string;
  minute: number | null;
  temp: string;
};

const LEAST_KNOWN_SHARE = 0.9;
const SHORT_GAP_HOURS = 3;
const LONGEST_GAP_HOURS = 14 * 24;

/**
 * Gathers the rows of a typical year. Their years are ignored, since each month comes from another one; 29 February is
 * left out; up to three missing hours are bridged.
 * @param lines of the file
 * @param options.firstRow index of the first line that is a row
 * @param options.readRow the row, or why it is rejected
 * @throws WeatherFileError when a tenth of the year or two weeks in a row are missing, or one hour of the day all season
 */
export function gatherTypicalYear(
  lines: readonly string[],
  options: {
    firstRow: number;
    station: Station;
    standardOffsetHours: number;
    readRow: (line: string) => TypicalYearRow | string;
  },
): TypicalYearFile {
  const { firstRow, station, standardOffsetHours, readRow } = options;
  const rejected = new RejectedLines();
  const tempC = new Float32Array(YEAR_HOURS).fill(Number.NaN);
  const years = new Set<string>();
  const seen = new Uint8Array(YEAR_HOURS);
  let rows = 0;
  let missing = 0;
  for (let index = firstRow; index < lines.length; index++) {
    const line = lines[index]!;
    if (line.trim() === '') continue;
    const row = readRow(line);
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
  checkEveryHour(tempC);
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

/**
 * Tells what a row says: hours run from 1 to 24, local standard time, hour 24 being the next day's 0.
 * @param isMissing whether a number stands for no temperature
 * @returns the row, or a sentence why it is rejected
 */
export function typicalYearRow(
  written: WrittenRow,
  isMissing: (tempC: number) => boolean,
): TypicalYearRow | string {
  const [month, day, hour] = [written.month, written.day, written.hour].map(numberOrNaN) as [
    number,
    number,
    number,
  ];
  const days = month === 2 ? 29 : (MONTH_STARTS[month] ?? 0) - (MONTH_STARTS[month - 1] ?? 0);
  if (!(Number.isInteger(day) && day >= 1 && day <= days)) {
    return `There is no day ${written.day} in month ${written.month}.`;
  }
  if (!(Number.isInteger(hour) && hour >= 1 && hour <= 24))
    return `Hours run from 1 to 24, not ${written.hour}.`;

  const tempC = dryBulb(written.temp, isMissing);
  if (typeof tempC === 'string') return tempC;
  const hourOfDay = written.minute === null ? hour : hour - 1 + written.minute / 60;
  const isBetween = !Number.isInteger(hourOfDay) || (month === 2 && day === 29);
  const hourOfYear = isBetween ? null : ((MONTH_STARTS[month - 1]! + day - 1) * 24 + hourOfDay) % YEAR_HOURS;
  return { year: written.year.trim(), hourOfYear, tempC };
}

function dryBulb(field: string, isMissing: (tempC: number) => boolean): number | string {
  const tempC = numberOrNaN(field);
  if (field.trim() === '' || isMissing(tempC)) return Number.NaN;
  if (Number.isNaN(tempC)) return `"${field.trim().slice(0, 40)}" is not a temperature.`;
  if (tempC < COLDEST_C || tempC > HOTTEST_C)
    return `${tempC} °C lies outside ${COLDEST_C} to ${HOTTEST_C} °C.`;
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
    `This file has a temperature for ${rows} of the ${YEAR_HOURS} hours of a year, ` +
      `and up to ${longestGap} are missing in a row. Likely the file was cut: a typical year must be whole, ` +
      'so download it again, or send the hours you have as a "time,tempC" CSV.',
  );
}

/** The same hour missing for weeks would leave the climate without it, however full the file is otherwise. */
function checkEveryHour(tempC: Float32Array): void {
  const hour = hourMissingThroughout(tempC);
  if (hour === null) return;
  throw new WeatherFileError(
    `Hour ${hour} has no temperature for over six weeks running. A typical year needs every hour of the day in every season: ` +
      'download it again, or send the hours you have as a "time,tempC" CSV.',
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
