import { describe, expect, test } from 'vitest';
import {
  readWeatherFile,
  WeatherFileError,
  type WeatherFileSite,
} from '../../server/exchange/weather-file.ts';

const HOUR_MS = 3_600_000;
const berlin: WeatherFileSite = { timeZone: 'Europe/Berlin', latitudeDeg: 52.5, longitudeDeg: 13.4 };

/** Hourly lines with Z, warmest at 14:30 by the sun of the longitude. */
function sunnyLines(options: {
  from: string;
  days: number;
  longitudeDeg: number;
  stamp?: (at: number) => string;
}) {
  const { from, days, longitudeDeg, stamp = (at) => `${new Date(at).toISOString().slice(0, 16)}Z` } = options;
  return Array.from({ length: days * 24 }, (_, hour) => {
    const at = Date.parse(from) + hour * HOUR_MS;
    const solarHour = (at / HOUR_MS + longitudeDeg / 15) % 24;
    const tempC = 8 + 5 * Math.cos((2 * Math.PI * (solarHour - 14.5)) / 24) + (hour % 7) / 100;
    return `${stamp(at)},${tempC.toFixed(2)}`;
  });
}

function epw(options: {
  temp?: (month: number, day: number, hour: number) => string;
  location?: string;
  rowsPerHour?: number;
  minute?: number;
  leapDay?: boolean;
}): string[] {
  const location = options.location ?? 'LOCATION,Anywhere, East,BB,DEU,TMY,103840,52.47,13.40,1.0,49.0';
  const lines = [location, 'DESIGN CONDITIONS,0', 'TYPICAL/EXTREME PERIODS,0', 'GROUND TEMPERATURES,0'];
  lines.push('HOLIDAYS/DAYLIGHT SAVINGS,No,0,0,0', 'COMMENTS 1,made by hand', 'COMMENTS 2,');
  const rowsPerHour = options.rowsPerHour ?? 1;
  lines.push(`DATA PERIODS,1,${rowsPerHour},Data,Sunday, 1/ 1,12/31`);
  const warmth = (hour: number) => (10 + 5 * Math.cos((2 * Math.PI * (hour - 14.6)) / 24)).toFixed(1);
  const temp = options.temp ?? ((_month, _day, hour) => warmth(hour));
  for (let month = 1; month <= 12; month++) {
    const days = month === 2 && options.leapDay ? 29 : new Date(Date.UTC(2001, month, 0)).getUTCDate();
    for (let day = 1; day <= days; day++) {
      for (let hour = 1; hour <= 24; hour++) {
        for (let part = 1; part <= rowsPerHour; part++) {
          const minute = rowsPerHour === 1 ? (options.minute ?? 0) : (60 / rowsPerHour) * part;
          const tempC = part === rowsPerHour ? temp(month, day, hour) : '-40.0';
          lines.push(`${1980 + month},${month},${day},${hour},${minute},?9?9,${tempC},1.0,80,101300`);
        }
      }
    }
  }
  return lines;
}

function refusal(text: string, site = berlin): string {
  try {
    readWeatherFile(text, site);
  } catch (error) {
    expect(error).toBeInstanceOf(WeatherFileError);
    return (error as Error).message;
  }
  throw new Error('the file was read');
}

describe('an EPW file', () => {
  test('is a typical year, each row being the end of its hour in standard time', () => {
    const file = readWeatherFile(epw({ temp: (_m, _d, hour) => `${hour}` }).join('\r\n'), berlin);
    expect(file).toMatchObject({ format: 'epw', rows: 8760, rejected: [], hours: null });
    expect([file.from, file.through]).toEqual(['01-01', '12-31']);
    expect(file.station).toEqual({
      name: 'Anywhere',
      latitudeDeg: 52.47,
      longitudeDeg: 13.4,
      elevationM: 49,
    });
    expect(file.typicalYear?.standardOffsetHours).toBe(1);
    const { tempC } = file.typicalYear!;
    expect([tempC[1], tempC[23], tempC[24], tempC[0]]).toEqual([1, 23, 24, 24]);
  });

  test('means the same with minute 0 and with minute 60, and with a 29 February', () => {
    const plain = readWeatherFile(epw({}).join('\n'), berlin);
    const leap = epw({ leapDay: true }).map((line) => line.replace(/^(1982,2,29,.*9,)[^,]+/, '$133.0'));
    expect(leap.filter((line) => line.includes(',33.0,'))).toHaveLength(24);
    for (const other of [epw({ minute: 60 }), leap]) {
      expect(readWeatherFile(other.join('\n'), berlin).typicalYear).toEqual(plain.typicalYear);
    }
  });

  test('with several rows an hour is read at the full hours', () => {
    const plain = readWeatherFile(epw({}).join('\n'), berlin);
    const quarters = readWeatherFile(epw({ rowsPerHour: 4 }).join('\n'), berlin);
    expect(quarters.typicalYear).toEqual(plain.typicalYear);
    expect(quarters.rows).toBe(8760);
  });

  test('bridges up to three missing hours and says how many are missing', () => {
    const missing = epw({
      temp: (m, d, h) => (m === 3 && d === 5 && h >= 10 && h <= 12 ? '99.9' : `${d % 2}`),
    });
    const file = readWeatherFile(missing.join('\n'), berlin);
    expect(file.rows).toBe(8757);
    expect(file.warnings.join(' ')).toMatch(/3 hours have no temperature/);
    // 5 March is day 63 of the year, day 5 being odd: 1 °C on both sides.
    expect(file.typicalYear!.tempC[63 * 24 + 11]).toBe(1);
  });

  test('that lacks the same hours for weeks is refused, however full it is otherwise', () => {
    const lines = epw({ temp: (m, _d, h) => (m <= 2 && h <= 5 ? '99.9' : '5.0') });
    expect(refusal(lines.join('\n'))).toMatch(/Hour [1-5] has no temperature for over six weeks/);
    // Three hours a night are bridged, for however long.
    const bridged = readWeatherFile(
      epw({ temp: (m, _d, h) => (m <= 2 && h <= 3 ? '99.9' : '5.0') }).join('\n'),
      berlin,
    );
    expect(bridged.typicalYear!.tempC[1]).toBe(5);
  });

  test('rejects by line what is no temperature, no hour or no day', () => {
    const lines = epw({});
    lines[10] = lines[10]!.replace(/,\?9\?9,[^,]+/, ',?9?9,81.0');
    lines[11] = '1981,1,1,25,0,?9?9,4.0';
    lines[12] = '1981,2,30,4,0,?9?9,4.0';
    lines[13] = '1981,1,1';
    const { rejected } = readWeatherFile(lines.join('\n'), berlin);
    expect(rejected.map(({ line }) => line)).toEqual([11, 12, 13, 14]);
    expect(rejected.map(({ message }) => message).join('\n')).toMatch(/81 °C.*\n.*25.*\n.*30.*\n.*cut/);
  });

  test('lists a hundred rejected lines and counts the rest', () => {
    const file = readWeatherFile([...epw({}), ...Array(150).fill('1981,13,1,1,0,?,4')].join('\n'), berlin);
    expect(file.rejected).toHaveLength(100);
    expect(file.warnings.join(' ')).toMatch(/^.*50 more lines/);
  });

  test('warns of another place, a mirrored longitude, another zone and one single year', () => {
    const text = epw({}).join('\n');
    expect(readWeatherFile(text, berlin).warnings).toEqual([]);
    expect(readWeatherFile(text, { ...berlin, latitudeDeg: 48 }).warnings.join(' ')).toMatch(/more than 1°/);
    expect(readWeatherFile(text, { ...berlin, longitudeDeg: -13.4 }).warnings.join(' ')).toMatch(/sign/);
    const london = readWeatherFile(text, { ...berlin, timeZone: 'Europe/London' }).warnings.join(' ');
    expect(london).toMatch(/UTC\+1 .*UTC\+0/);
    const oneYear = epw({}).map((line) => line.replace(/^19\d\d/, '2019'));
    expect(readWeatherFile(oneYear.join('\n'), berlin).warnings.join(' ')).toMatch(/2019/);
  });

  test('is refused when it is cut, has no DATA PERIODS or no place', () => {
    expect(refusal(epw({}).slice(0, 5000).join('\n'))).toMatch(/4992 of the 8760.*time,tempC/);
    expect(refusal(epw({}).slice(0, 5).join('\n'))).toMatch(/DATA PERIODS/);
    expect(refusal(epw({ location: 'LOCATION,Anywhere' }).join('\n'))).toMatch(/latitude/);
    expect(refusal(epw({ location: 'LOCATION,A,B,C,D,1,95,13,1,49' }).join('\n'))).toMatch(/latitude/);
  });
});

describe('a time,temp CSV', () => {
  const read = (lines: string[], site: Partial<WeatherFileSite> = {}) =>
    readWeatherFile(lines.join('\n'), { ...berlin, ...site });

  test('with Z or an offset is exact', () => {
    const file = read([
      'time,tempC',
      '2026-10-25T00:00Z,4.5',
      '2026-10-25T03:00+02:00,5',
      '2026-10-25T02:00:00Z,6',
    ]);
    expect(file).toMatchObject({ format: 'time-temp', rows: 3, from: '2026-10-25', through: '2026-10-25' });
    expect(file.hours).toEqual({
      startAt: Date.parse('2026-10-25T00:00Z'),
      tempC: Float32Array.from([4.5, 5, 6]),
    });
    expect(file.warnings).toEqual([]);
  });

  test.each([
    [
      'semicolons and decimal commas',
      ['Time;Temperature (°C)', '2026-10-25 00:00Z;4,5', '2026-10-25 01:00Z;-5,25'],
    ],
    ['tabs', ['timestamp\ttemp', '2026-10-25T00:00Z\t4,5', '2026-10-25T01:00Z\t-5.25']],
    [
      'two columns for date and time',
      ['date,time,temp_c', '2026-10-25,00:00Z,4.5', '2026-10-25,01:00Z,-5.25'],
    ],
    [
      'quotes and more columns',
      ['"Humidity","Time (UTC)","Temp"', '80,"2026-10-25T00:00","4.5"', '80,2026-10-25T01:00,-5.25'],
    ],
    ['a preamble', ['logger 7', '', 'time,tempC', '2026-10-25T00:00Z,4.5', '2026-10-25T01:00Z,-5.25']],
    ['°F in the heading', ['time,temp (°F)', '2026-10-25T00:00Z,40.1', '2026-10-25T01:00Z,22.55']],
  ])('is read with %s', (_, lines) => {
    const { hours, rejected } = read(lines);
    expect(rejected).toEqual([]);
    expect(hours?.startAt).toBe(Date.parse('2026-10-25T00:00Z'));
    // 40.1 °F = 8.1 / 1.8 = 4.5 °C, 22.55 °F = -9.45 / 1.8 = -5.25 °C.
    expect(hours?.tempC[0]).toBeCloseTo(4.5, 5);
    expect(hours?.tempC[1]).toBeCloseTo(-5.25, 5);
  });

  test('without an offset is the wall clock of the site, and says so', () => {
    const { hours, warnings } = read(['time,temp', '2026-07-01T12:00,20', '2026-07-01T13:00,21']);
    expect(hours?.startAt).toBe(Date.parse('2026-07-01T10:00Z'));
    expect(warnings.join(' ')).toMatch(/2 times have no offset .*Europe\/Berlin/);
  });

  test('tells the two passes of a repeated hour apart by their order', () => {
    // Berlin goes from UTC+2 to UTC+1 on 25 October 2026 at 03:00: 02:00 comes twice.
    const clock = ['01:00', '02:00', '02:00', '03:00'].map((time, place) => `2026-10-25T${time},${place}`);
    const { hours, rejected } = read(['time,temp', ...clock]);
    expect(rejected).toEqual([]);
    expect(hours).toEqual({
      startAt: Date.parse('2026-10-24T23:00Z'),
      tempC: Float32Array.from([0, 1, 2, 3]),
    });
  });

  test('refuses the hour that the clock skips, and guesses why it is there', () => {
    // Berlin skips 02:00 to 03:00 on 28 March 2027.
    const clock = ['01:00', '02:00', '03:00'].map((time, place) => `2027-03-28T${time},${place}`);
    const { rejected, warnings } = read(['time,temp', ...clock]);
    expect(rejected).toMatchObject([{ line: 3 }]);
    expect(rejected[0]!.message).toMatch(/skips 02:00/);
    expect(warnings.join(' ')).toMatch(/standard time all year/);
  });

  test('takes 24:00 for the next midnight', () => {
    const { hours } = read(['time,temp', '2026-12-31T24:00Z,3']);
    expect(hours?.startAt).toBe(Date.parse('2027-01-01T00:00Z'));
  });

  test('of ten-minute readings gives the value at the hour, on the line between two readings', () => {
    const lines = ['time,temp'];
    for (let minute = 5; minute < 180; minute += 10) {
      lines.push(
        `2026-10-25T0${Math.floor(minute / 60)}:${String(minute % 60).padStart(2, '0')}Z,${minute / 10}`,
      );
    }
    const { hours } = read(lines);
    // Temperature = minutes / 10, so 6 and 12 at 01:00 and 02:00; midnight has the reading five minutes later.
    expect(hours?.startAt).toBe(Date.parse('2026-10-25T00:00Z'));
    expect([...hours!.tempC].map((value) => Math.round(value * 100) / 100)).toEqual([0.5, 6, 12, 17.5]);
  });

  test('leaves missing values and absent lines out', () => {
    const gaps = ['4', '', 'NaN', '-9999', '8'].map((value, hour) => `2026-10-25T0${hour}:00Z,${value}`);
    const { hours, rows } = read(['time,temp', ...gaps, '2026-10-25T07:00Z,9']);
    expect(rows).toBe(3);
    expect([...hours!.tempC]).toEqual([4, Number.NaN, Number.NaN, Number.NaN, 8, Number.NaN, Number.NaN, 9]);
  });

  test('is sorted, and of two readings at one time the first stays', () => {
    const file = read([
      'time,temp',
      '2026-10-25T02:00Z,6',
      '2026-10-25T00:00Z,4',
      '2026-10-25T01:00Z,5',
      '2026-10-25T01:00Z,5',
      '2026-10-25T02:00Z,7',
    ]);
    expect([...file.hours!.tempC]).toEqual([4, 5, 6]);
    expect(file.rejected).toMatchObject([{ line: 6 }]);
    expect(file.warnings.join(' ')).toMatch(/sorted.*1 lines repeat/);
  });

  test('loses its spikes but keeps a step and a slow rise', () => {
    const temps = [5, 5.1, 40, 41, 5.2, 5.3, 22, 22.1, 22.2, 22.3, 22.4, 22.5, 5.4];
    const lines = temps.map((temp, hour) => `2026-10-25T${String(hour).padStart(2, '0')}:00Z,${temp}`);
    const { rejected, rows } = read(['time,temp', ...lines]);
    expect(rejected.map(({ line }) => line)).toEqual([4, 5]);
    expect(rejected[0]!.message).toMatch(/leaps from 5.1/);
    expect(rows).toBe(11);
  });

  test('loses a stretch that stands still for more than twelve hours, and warns', () => {
    const lines = sunnyLines({ from: '2026-10-01T00:00Z', days: 3, longitudeDeg: 13.4 });
    for (let hour = 30; hour < 44; hour++) lines[hour] = lines[hour]!.replace(/,.*/, ',6.35');
    const { rejected, warnings, rows } = read(['time,temp', ...lines]);
    expect(rejected).toMatchObject([{ line: 32 }]);
    expect(rejected[0]!.message).toMatch(/line 45 .*6.4 °C for 13 h/);
    expect(warnings.join(' ')).toMatch(/stand still/);
    expect(rows).toBe(72 - 14);
  });

  test('rejects by line what is no time, no temperature, or colder and hotter than air', () => {
    const { rejected } = read([
      'time,temp',
      '2026-10-25T00:00Z,4',
      '25.10.2026 01:00,4',
      '2026-02-30T00:00Z,4',
      '2026-10-25,4',
      '2026-10-25T25:00Z,4',
      '2026-10-25T04:00Z,warm',
      '2026-10-25T05:00Z,-71',
      '2026-10-25T06:00Z',
      '2026-10-25T07:00Z,4,5',
      ...Array.from({ length: 3 }, (_, hour) => `2026-10-25T1${hour}:00Z,${hour}`),
    ]);
    expect(rejected.map(({ line }) => line)).toEqual([3, 4, 5, 6, 7, 8, 9, 10]);
    expect(rejected[0]!.message).toMatch(/2026-10-25T18:00Z/);
    expect(rejected[2]!.message).toMatch(/without a time of day/);
    expect(rejected[7]!.message).toMatch(/decimal commas/);
  });

  test('in °F is refused until somebody says so', () => {
    const lines = sunnyLines({ from: '2026-07-01T00:00Z', days: 4, longitudeDeg: 13.4 });
    const hot = lines.map((line) =>
      line.replace(/,(.*)/, (_, temp) => `,${(Number(temp) * 1.8 + 52).toFixed(1)}`),
    );
    expect(refusal(['time,temp', ...hot].join('\n'))).toMatch(/°F.*unit=F.*unit=C/);
    const { hours, rejected } = read(['time,temp', ...hot], { unit: 'F' });
    expect(rejected).toEqual([]);
    // °F - 52 was 1.8 times a temperature, so °C is that temperature + 20 / 1.8; all within 8 ± 5 + 11.1.
    expect(Math.max(...hours!.tempC)).toBeLessThan(25);
    const mild = ['time,temp', ...[44, 45, 46, 47].map((temp, hour) => `2026-12-01T0${hour}:00Z,${temp}`)];
    expect(refusal(mild.join('\n'))).toMatch(/°F/);
    expect(read(mild, { unit: 'F' }).hours?.tempC[0]).toBeCloseTo(12 / 1.8, 5);
  });

  test('warns when readings come too seldom for a night', () => {
    const lines = ['00', '06', '12', '18'].map((hour, place) => `2026-10-25T${hour}:00Z,${place}`);
    expect(read(['time,temp', ...lines]).warnings.join(' ')).toMatch(/every 6 h/);
  });

  test('with a quotation mark left open is refused before it swallows the lines below', () => {
    const lines = ['time,temp', '2026-10-25T00:00Z,4', '2026-10-25T01:00Z,"5', '2026-10-25T02:00Z,6'];
    expect(refusal(lines.join('\n'))).toMatch(/line 3 .*never closed/);
  });

  test('with a year mistyped by a century is refused', () => {
    const lines = ['time,temp', '2126-10-25T00:00Z,4', '2026-10-25T01:00Z,5'];
    expect(refusal(lines.join('\n'))).toMatch(/60 years.*mistyped year/);
  });

  test('outside the years anybody lights a display in are left out, line by line', () => {
    const lines = ['time,temp', '1900-01-01T00:00+05:00,5', '2026-10-25T00:00Z,4', '2026-10-25T01:00Z,5'];
    const file = read(lines);
    expect(file.rejected).toEqual([{ line: 2, message: expect.stringContaining('2000 to 2150') }]);
    expect(refusal(lines.slice(0, 2).join('\n'))).toMatch(/2000 to 2150/);
  });

  test('counts the lines that have a time and no temperature', () => {
    const lines = ['time,temp', '2026-10-25T00:00Z,4', '2026-10-25T01:00Z,', '2026-10-25T02:00Z,NaN'];
    const file = read([...lines, '2026-10-25T03:00Z,5']);
    expect(file).toMatchObject({ rows: 2, rejected: [] });
    expect(file.warnings.join(' ')).toMatch(/2 lines have no temperature/);
  });
});

describe('the phase of a file', () => {
  const chicago: WeatherFileSite = { timeZone: 'America/Chicago', latitudeDeg: 41.9, longitudeDeg: -87.6 };
  const wall =
    (shiftHours: number, end = '') =>
    (at: number) =>
      `${new Date(at + shiftHours * HOUR_MS).toISOString().slice(0, 16)}${end}`;
  const phaseOf = (
    options: { longitudeDeg: number; stamp?: (at: number) => string },
    site: WeatherFileSite,
  ) => {
    const lines = sunnyLines({ from: '2026-01-01T00:00Z', days: 20, ...options });
    return readWeatherFile(['time,temp', ...lines].join('\n'), site).warnings.filter((text) =>
      text.includes('sun'),
    );
  };

  test('is no matter where it is right', () => {
    expect(phaseOf({ longitudeDeg: -87.6 }, chicago)).toEqual([]);
    expect(phaseOf({ longitudeDeg: -87.6, stamp: wall(-6) }, chicago)).toEqual([]);
  });

  test('gives away UTC read as the local clock, with the hour it found', () => {
    // 14:30 by the sun, 6 h late: about 20:30.
    expect(phaseOf({ longitudeDeg: -87.6, stamp: wall(0) }, chicago).join()).toMatch(
      /20:[23]\d.*UTC times read as/,
    );
  });

  test('gives away local times marked as UTC', () => {
    expect(phaseOf({ longitudeDeg: -87.6, stamp: wall(-6, 'Z') }, chicago).join()).toMatch(/marked as UTC/);
  });

  test('gives away a longitude of the wrong sign', () => {
    expect(phaseOf({ longitudeDeg: -87.6 }, { ...chicago, longitudeDeg: 87.6 }).join()).toMatch(/wrong sign/);
  });

  test('is not judged where the days are flat', () => {
    const flat = Array.from({ length: 20 * 24 }, (_, hour) => {
      const stamp = new Date(Date.UTC(2026, 0, 1, hour)).toISOString();
      return `${stamp},${(5 + (hour % 5) / 10).toFixed(1)}`;
    });
    expect(readWeatherFile(['time,temp', ...flat].join('\n'), chicago).warnings).toEqual([]);
  });
});

describe('what is no weather file', () => {
  test.each([
    ['', /empty/],
    ['\n \n', /empty/],
    ['PK\u0003\u0004', /packed/],
    ['\u001f\u008b\u0008', /packed/],
    ['<!DOCTYPE html><html>', /web page/],
    ['{"hourly":{"time":[]}}', /JSON/],
    ['name,colour\nlantern,amber', /starts with "name,colour".*time,tempC/],
    ['time,tempC', /no reading below/],
    ['time,tempC\nx,y', /line 2/],
    ['USW00014914,20260101,TMAX,-56,,,W,2400', /another layout.*access CSV/],
    ['USW00014914202601TMAX  -56  W  -61  W', /another layout.*access CSV/],
    ['STATION;DATE;TMAX;TMIN', /another layout.*commas/],
    ['"STATION","DATE","LATITUDE","TEMP","TEMP_ATTRIBUTES","MAX","MIN"', /GSOD.*GHCN-Daily/],
    ['2018 01 01 00  -211  -250 10300   280    41     0     0 -9999', /ISD-Lite.*10/],
    ['STATION,DATE,REPORT_TYPE,HourlyDryBulbTemperature', /FM-15/],
    ['STATIONS_ID;MESS_DATUM;QN_9;TT_TU;RF_TU;eor', /DWD/],
    ['Datum;Tid (UTC);Lufttemperatur;Kvalitet', /SMHI/],
    ['Data;Hora UTC;TEMPERATURA DO AR - BULBO SECO', /INMET/],
    ['Latitude (decimal degrees): 45.000\nLongitude (decimal degrees): 8.000', /PVGIS.*EPW/],
  ])('is refused with the way out: %j', (text, message) => {
    expect(refusal(text)).toMatch(message);
  });

  test('is refused at once, however long its lines', () => {
    const startedAt = performance.now();
    expect(refusal('x'.repeat(1_000_000))).toMatch(/1000000 characters/);
    expect(refusal(`time,temp\n"${'"a,'.repeat(300_000)}`)).toMatch(/Line 2/);
    expect(refusal(`time,temp\n${'"a\n'.repeat(300_000)}`)).toMatch(/line 2 a quot/);
    expect(refusal(`LOCATION,a,b,c,d,e,1,2,3,4\n${'\n'.repeat(1_000_000)}`)).toMatch(/DATA PERIODS/);
    // Generous for a busy machine; it takes a few tenths of a second.
    expect(performance.now() - startedAt).toBeLessThan(5000);
  });

  test('may start with a byte order mark and be read all the same', () => {
    const file = readWeatherFile('\uFEFFtime,tempC\r\n2026-10-25T00:00Z,4\r\n', berlin);
    expect([...file.hours!.tempC]).toEqual([4]);
  });
});
