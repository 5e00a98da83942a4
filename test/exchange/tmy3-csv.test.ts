import { describe, expect, test } from 'vitest';
import {
  readWeatherFile,
  WeatherFileError,
  type WeatherFileSite,
} from '../../server/exchange/weather-file.ts';

const greensboro: WeatherFileSite = {
  timeZone: 'America/New_York',
  latitudeDeg: 36.1,
  longitudeDeg: -79.95,
};
const NAMES =
  'Date (MM/DD/YYYY),Time (HH:MM),GHI (W/m^2),Dry-bulb (C),Dry-bulb source,Dry-bulb uncert (code),Dew-point (C)';

/** A made year by the published layout, fewer columns: the month's year differs, hours run 01:00 to 24:00. */
function tmy3(options: {
  temp?: (month: number, day: number, hour: number) => string;
  first?: string;
  names?: string;
}): string[] {
  const { first = '723170,"GREENSBORO, PIEDMONT",NC,-5.0,36.100,-79.950,273', names = NAMES } = options;
  const warmth = (hour: number) => (10 + 5 * Math.cos((2 * Math.PI * (hour - 15)) / 24)).toFixed(1);
  const temp = options.temp ?? ((_month, _day, hour) => warmth(hour));
  const lines = [first, names];
  for (let month = 1; month <= 12; month++) {
    const days = new Date(Date.UTC(2001, month, 0)).getUTCDate();
    for (let day = 1; day <= days; day++) {
      for (let hour = 1; hour <= 24; hour++) {
        const date = `${padded(month)}/${padded(day)}/${1980 + month}`;
        lines.push(`${date},${padded(hour)}:00,0,${temp(month, day, hour)},A,7,-33.0`);
      }
    }
  }
  return lines;
}

function padded(value: number): string {
  return String(value).padStart(2, '0');
}

function refusal(text: string): string {
  try {
    readWeatherFile(text, greensboro);
  } catch (error) {
    expect(error).toBeInstanceOf(WeatherFileError);
    return (error as Error).message;
  }
  throw new Error('the file was read');
}

describe('a TMY3 CSV', () => {
  test('is a typical year, each row being the end of its hour in standard time', () => {
    const file = readWeatherFile(tmy3({ temp: (_m, _d, hour) => `${hour}` }).join('\r\n'), greensboro);
    expect(file).toMatchObject({ format: 'tmy3', rows: 8760, rejected: [], hours: null });
    expect([file.from, file.through]).toEqual(['01-01', '12-31']);
    expect(file.station).toEqual({
      name: 'GREENSBORO, PIEDMONT',
      latitudeDeg: 36.1,
      longitudeDeg: -79.95,
      elevationM: 273,
    });
    const { tempC, standardOffsetHours } = file.typicalYear!;
    expect(standardOffsetHours).toBe(-5);
    // 24:00 is the next day's midnight, on 31 December the year's first.
    expect([tempC[1], tempC[23], tempC[24], tempC[8759], tempC[0]]).toEqual([1, 23, 24, 23, 24]);
  });

  test('says nothing where all is well, and finds its column by name', () => {
    const plain = readWeatherFile(tmy3({}).join('\n'), greensboro);
    expect(plain.warnings).toEqual([]);
    const moved = tmy3({}).map((line, index) => {
      if (index === 0) return line;
      const [date, time, sun, temp, ...rest] = line.split(',');
      return [date, time, temp, sun, ...rest].join(',');
    });
    expect(readWeatherFile(moved.join('\n'), greensboro).typicalYear).toEqual(plain.typicalYear);
  });

  test('takes -9900 for missing and bridges up to three such hours', () => {
    const gaps = tmy3({ temp: (m, d, h) => (m === 3 && d === 5 && h >= 10 && h <= 12 ? '-9900' : `${h}`) });
    const file = readWeatherFile(gaps.join('\n'), greensboro);
    expect(file).toMatchObject({ rows: 8757, rejected: [] });
    expect(file.warnings.join(' ')).toMatch(/3 hours have no temperature/);
    // 5 March is day 63 of the year; 9 °C at 09:00 and 13 °C at 13:00.
    expect([10, 11, 12].map((hour) => file.typicalYear!.tempC[63 * 24 + hour])).toEqual([10, 11, 12]);
  });

  test('saved again by a spreadsheet is the same year', () => {
    const saved = tmy3({}).map((line) =>
      line.replace(/^0?(\d+)\/0?(\d+)\/(\d+),0?(\d+):00/, '$1/$2/$3,$4:00:00'),
    );
    expect(saved[2]).toMatch(/^1\/1\/1981,1:00:00,/);
    expect(readWeatherFile(saved.join('\n'), greensboro).typicalYear).toEqual(
      readWeatherFile(tmy3({}).join('\n'), greensboro).typicalYear,
    );
  });

  test('rejects by line what is no temperature, no hour, no day, or cut', () => {
    const lines = tmy3({});
    lines[10] = '01/01/1981,09:00,0,81.0,A,7,-33.0';
    lines[11] = '01/01/1981,09:30,0,4.0,A,7,-33.0';
    lines[12] = '01/01/1981,25:00,0,4.0,A,7,-33.0';
    lines[13] = '02/30/1982,12:00,0,4.0,A,7,-33.0';
    lines[14] = '1981-01-01,13:00,0,4.0,A,7,-33.0';
    lines[15] = '01/01/1981,14';
    const { rejected } = readWeatherFile(lines.join('\n'), greensboro);
    expect(rejected.map(({ line }) => line)).toEqual([11, 12, 13, 14, 15, 16]);
    expect(rejected.map(({ message }) => message).join('\n')).toMatch(
      /81 °C.*\n.*09:30.*\n.*25.*\n.*day 30.*\n.*MM\/DD\/YYYY.*\n.*cut/,
    );
  });

  test('warns of another place and zone', () => {
    const { warnings } = readWeatherFile(tmy3({}).join('\n'), {
      timeZone: 'America/Chicago',
      latitudeDeg: 41.9,
      longitudeDeg: -87.6,
    });
    expect(warnings.join(' ')).toMatch(/more than 1°.*UTC-5 .*UTC-6/);
  });

  test('is refused when it is cut, or without its station or its column', () => {
    expect(refusal(tmy3({}).slice(0, 5002).join('\n'))).toMatch(/5000 of the 8760.*time,tempC/);
    expect(refusal(tmy3({}).slice(1).join('\n'))).toMatch(/latitude, longitude and elevation/);
    expect(refusal(tmy3({ first: '723170,"A",NC,-5.0,96,-79.9,273' }).join('\n'))).toMatch(/latitude/);
    const names = NAMES.replace('Dry-bulb (C)', 'Dry-bulb (F)');
    expect(refusal(tmy3({ names }).join('\n'))).toMatch(/no column "Dry-bulb \(C\)"/);
  });
});
