import { csvFields } from './csv-fields.ts';
import { type HeaderForm, stationOfHeader } from './station.ts';
import {
  gatherTypicalYear,
  type TypicalYearFile,
  type TypicalYearRow,
  typicalYearRow,
} from './typical-year-rows.ts';
import { WeatherFileError } from './weather-file-error.ts';

/** Lines before the first row: the station, and the names of the columns. */
const HEADER_LINES = 2;
/** More than the station's line has. */
const MOST_FIELDS = 20;
const TEMP_NAME = 'dry-bulb (c)';
const MISSING_C = -9900;

/** Whether the lines begin as a TMY3 CSV does; its second line names the columns. */
export function isTmy3Csv(lines: readonly string[]): boolean {
  return lines.slice(0, HEADER_LINES).some((line) => /^"?Date \(MM\/DD\/YYYY\)"?,/i.test(line));
}

/**
 * Reads a TMY3 typical year: the column "Dry-bulb (C)", found by its name, is the air at the end of each row's hour,
 * 01:00 to 24:00 local standard time all year. The years are ignored, since each month comes from another one;
 * -9900 is missing.
 * Source: the files themselves; that the hour is an instant, not a mean, is measured on 60 stations.
 * @param lines of the file, line ends removed
 * @throws WeatherFileError when the header or a tenth of the year is missing
 */
export function readTmy3Csv(lines: readonly string[]): TypicalYearFile {
  const { station, standardOffsetHours } = stationOfHeader(
    lines[0]!,
    csvFields(lines[0]!, MOST_FIELDS) ?? [],
    STATION,
  );
  const tempColumn = lines[1]!.split(',').findIndex((name) => unquoted(name).toLowerCase() === TEMP_NAME);
  if (tempColumn < 2) {
    throw new WeatherFileError(
      'The second line names no column "Dry-bulb (C)". Likely columns were taken out: ' +
        'download the TMY3 file again and send it unchanged.',
    );
  }
  const readRow = (line: string) => tmy3Row(line, tempColumn);
  return gatherTypicalYear(lines, {
    firstRow: HEADER_LINES,
    station,
    standardOffsetHours,
    readRow,
  });
}

const STATION: HeaderForm = {
  leastFields: 7,
  lastFour: ['standardOffsetHours', 'latitudeDeg', 'longitudeDeg', 'elevationM'],
  lastFourWords: 'hours from UTC, latitude, longitude and elevation',
  formatName: 'TMY3',
};

function tmy3Row(line: string, tempColumn: number): TypicalYearRow | string {
  const fields = line.split(',', tempColumn + 1);
  const temp = fields[tempColumn];
  if (temp === undefined) {
    return `The row has ${fields.length} fields and ends before the temperature; likely the file was cut here.`;
  }
  const [month, day, year] = unquoted(fields[0]!).split('/');
  if (month === undefined || day === undefined || year === undefined) {
    return `"${fields[0]!.slice(0, 40)}" is not a date written MM/DD/YYYY.`;
  }
  // A spreadsheet that saved the file again writes seconds too.
  const hour = /^(\d{1,2}):00(?::00)?$/.exec(unquoted(fields[1]!))?.[1];
  if (hour === undefined) return `"${fields[1]!.slice(0, 40)}" is not a full hour from 01:00 to 24:00.`;
  return typicalYearRow({ year, month, day, hour, minute: null, temp }, (tempC) => tempC <= MISSING_C);
}

function unquoted(field: string): string {
  return field.trim().replace(/^"(.*)"$/, '$1');
}
