import { numberOrNaN } from './csv-fields.ts';
import { type HeaderForm, stationOfHeader } from './station.ts';
import {
  gatherTypicalYear,
  type TypicalYearFile,
  type TypicalYearRow,
  typicalYearRow,
} from './typical-year-rows.ts';
import { WeatherFileError } from './weather-file-error.ts';

const HEADER_LINES = 50;
const LEAST_MISSING_C = 99.9;

/**
 * Reads an EPW typical year: dry bulb, field 7, is the air at the end of each row's hour, in local standard time all
 * year. The years in it are ignored, since each month comes from another one; so is the minute where there is one
 * row an hour, since files write 0 or 60 there and mean the same. 99.9 and more is missing. 29 February is left out.
 * Source: the file format's own data dictionary; that the hour is an instant, not a mean, is measured on 60 stations.
 * @param lines of the file, line ends removed; text read as latin-1 or UTF-8 alike
 * @throws WeatherFileError when the header or a tenth of the year is missing
 */
export function readEpw(lines: readonly string[]): TypicalYearFile {
  const { station, standardOffsetHours } = stationOfHeader(lines[0]!, lines[0]!.split(','), LOCATION);
  const { firstRow, rowsPerHour } = readDataPeriods(lines);
  const readRow = (line: string) => epwRow(line, rowsPerHour);
  return gatherTypicalYear(lines, { firstRow, station, standardOffsetHours, readRow });
}

const LOCATION: HeaderForm = {
  leastFields: 10,
  lastFour: ['latitudeDeg', 'longitudeDeg', 'standardOffsetHours', 'elevationM'],
  lastFourWords: 'latitude, longitude, hours from UTC and elevation',
  formatName: 'EPW',
};

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

function epwRow(line: string, rowsPerHour: number): TypicalYearRow | string {
  const fields = line.split(',', 7);
  if (fields.length < 7)
    return `A row needs at least 7 fields and has ${fields.length}; likely the file was cut here.`;
  const [year = '', month = '', day = '', hour = '', minute = '', , temp = ''] = fields;
  return typicalYearRow(
    { year, month, day, hour, minute: rowsPerHour === 1 ? null : numberOrNaN(minute), temp },
    (tempC) => tempC >= LEAST_MISSING_C,
  );
}
