import { describe, expect, test } from 'vitest';
import {
  readWeatherFile,
  WeatherFileError,
  type WeatherFileSite,
} from '../../server/exchange/weather-file.ts';

// The samples are made, by the documented layout: quoted fields, values padded with blanks in tenths of °C, attributes
// being the flags of measurement, quality and source and, from memory, the time of reading.
const HEADING =
  '"STATION","DATE","LATITUDE","LONGITUDE","ELEVATION","NAME","PRCP","PRCP_ATTRIBUTES","TMAX","TMAX_ATTRIBUTES","TMIN","TMIN_ATTRIBUTES"';
const plains: WeatherFileSite = {
  timeZone: 'America/Chicago',
  latitudeDeg: 46.93,
  longitudeDeg: -96.81,
};
const HOUR_MS = 3_600_000;

type DayRow = {
  date: string;
  max: number | string;
  min: number | string;
  maxFlags?: string;
  minFlags?: string;
};

function ghcn(days: readonly DayRow[], station = 'USW00000001'): string[] {
  return [
    HEADING,
    ...days.map(({ date, max, min, maxFlags = ',,W,2400', minFlags = ',,W,2400' }) => {
      const value = (each: number | string) => String(each).padStart(5);
      return `"${station}","${date}","46.93","-96.81","274.0","MADE UP FIELD, ND US","    0",",,W,2400","${value(max)}","${maxFlags}","${value(min)}","${minFlags}"`;
    }),
  ];
}

const COLD: DayRow[] = [
  { date: '2024-01-14', max: -156, min: -228 },
  { date: '2024-01-15', max: -172, min: -256 },
  { date: '2024-01-16', max: -83, min: -211 },
];

function read(lines: readonly string[], site: Partial<WeatherFileSite> = {}) {
  return readWeatherFile(lines.join('\n'), { ...plains, ...site });
}

function refusal(lines: readonly string[]): string {
  try {
    read(lines);
  } catch (error) {
    expect(error).toBeInstanceOf(WeatherFileError);
    return (error as Error).message;
  }
  throw new Error('the file was read');
}

function valueAt(file: ReturnType<typeof read>, at: string): number {
  const { startAt, tempC } = file.hours!;
  return tempC[(Date.parse(at) - startAt) / HOUR_MS] ?? Number.NaN;
}

describe('a GHCN-Daily access CSV', () => {
  test('becomes the hours from the first local noon to the last', () => {
    const file = read(ghcn(COLD));
    expect(file).toMatchObject({ format: 'ghcn-daily', rows: 3, rejected: [], typicalYear: null });
    expect([file.from, file.through]).toEqual(['2024-01-14', '2024-01-16']);
    expect(file.station).toEqual({
      name: 'MADE UP FIELD, ND US',
      latitudeDeg: 46.93,
      longitudeDeg: -96.81,
      elevationM: 274,
    });
    // Noon in Chicago is 18:00Z; two days lie between the first noon and the last, both included.
    expect(file.hours?.startAt).toBe(Date.parse('2024-01-14T18:00Z'));
    expect(file.hours?.tempC).toHaveLength(49);
    expect(file.warnings).toEqual([expect.stringMatching(/low and high.*1\.6 K/)]);
  });

  // Source: the recipe (low and high on straight lines between local noons, two harmonics in true solar time, reduced
  // amplitude) worked in Python with the low-precision almanac's Sun, which it was fitted with.
  test.each([
    ['2024-01-14T18:00Z', -17.337],
    ['2024-01-15T06:00Z', -21.648],
    ['2024-01-15T13:00Z', -23.18],
    ['2024-01-15T21:00Z', -16.861],
    ['2024-01-16T18:00Z', -10.817],
  ])('has the air of the recipe at %s', (at, tempC) => {
    expect(Math.abs(valueAt(read(ghcn(COLD)), at) - tempC)).toBeLessThan(0.005);
  });

  // Source: the same in Python. Chicago's clocks go forward on 10 March 2024, so its noons are 18:00Z and 17:00Z.
  test.each([
    ['2024-03-10T06:00Z', -1.193],
    ['2024-03-10T13:00Z', -1.741],
    ['2024-03-10T17:00Z', 7.669],
  ])('has the air of the recipe at %s, in an evening of 23 hours', (at, tempC) => {
    const file = read(
      ghcn([...COLD, { date: '2024-03-09', max: 39, min: -67 }, { date: '2024-03-10', max: 128, min: -39 }]),
    );
    expect(Math.abs(valueAt(file, at) - tempC)).toBeLessThan(0.005);
    expect(valueAt(file, '2024-03-10T18:00Z')).toBeNaN();
  });

  test('stays at the temperature of days that have no range', () => {
    // With the low as high as the high nothing is left to swing: 15.0 °C by hand, at every hour.
    const flat = ['2026-06-01', '2026-06-02', '2026-06-03'].map((date) => ({ date, max: 150, min: 150 }));
    expect([...new Set(read(ghcn(flat)).hours!.tempC)]).toEqual([15]);
  });

  test('leaves the evenings beside a missing day open', () => {
    const dates = ['10', '11', '12', '13', '14', '15'].map((day) => `2026-01-${day}`);
    const days: DayRow[] = dates.map((date) => ({ date, max: -150, min: -250 }));
    days[2] = { date: '2026-01-12', max: '', min: -250 };
    for (const gap of [ghcn(days), ghcn(days.filter(({ date }) => date !== '2026-01-12'))]) {
      const file = read(gap);
      expect(file).toMatchObject({ rows: 5, rejected: [], from: '2026-01-10', through: '2026-01-15' });
      expect(file.warnings.join(' ')).toMatch(/1 days between/);
      const known = [...file.hours!.tempC].map((tempC) => !Number.isNaN(tempC));
      // Noon of the 10th to noon of the 11th, then 47 open hours, then noon of the 13th to noon of the 15th.
      expect(known).toEqual([...Array(25).fill(true), ...Array(47).fill(false), ...Array(49).fill(true)]);
    }
  });

  test('takes -9999 for missing', () => {
    const days = [...COLD, { date: '2024-01-17', max: -9999, min: -200 }];
    expect(read(ghcn(days))).toMatchObject({ rows: 3, rejected: [], through: '2024-01-16' });
  });

  test('leaves out values that failed a quality check, by line', () => {
    const days: DayRow[] = [
      ...COLD,
      { date: '2024-01-17', max: 389, min: -180, maxFlags: ',S,W,2400' },
      { date: '2024-01-18', max: -90, min: -180, minFlags: ',I,W' },
      { date: '2024-01-19', max: -90, min: -180, minFlags: 'H,,S,2400' },
      { date: '2024-01-20', max: -90, min: -180, minFlags: 'T, ,S' },
    ];
    const file = read(ghcn(days));
    expect(file.rows).toBe(5);
    expect(file.rejected.map(({ line }) => line)).toEqual([5, 6]);
    expect(file.rejected[0]!.message).toMatch(/TMAX 389 failed.*"S"/);
    expect(file.rejected[1]!.message).toMatch(/TMIN -180 failed.*"I"/);
  });

  test('gives a high that was read in the morning to the day before', () => {
    // The same weather, written down at 07:00: each high stands a day later.
    const early: DayRow[] = COLD.map(({ date, min }, index) => ({
      date,
      min,
      max: COLD[index - 1]?.max ?? '',
      maxFlags: ',,7,0700',
      minFlags: ',,7,0700',
    }));
    early.push({ date: '2024-01-17', max: COLD[2]!.max, min: '', maxFlags: ',,7,0700' });
    expect(read(ghcn(early)).hours).toEqual(read(ghcn(COLD)).hours);
    const late = COLD.map((day) => ({ ...day, maxFlags: ',,7,1800', minFlags: ',,7,1800' }));
    expect(read(ghcn(late)).hours).toEqual(read(ghcn(COLD)).hours);
  });

  test('rejects by line what is no day, no temperature, too hot or upside down', () => {
    const days: DayRow[] = [
      { date: '01/13/2024', max: -156, min: -228 },
      ...COLD,
      { date: '2024-01-16', max: -156, min: -228 },
      { date: '2024-01-17', max: 'warm', min: -180 },
      { date: '2024-01-18', max: 700, min: -180 },
      { date: '2024-01-19', max: -200, min: -100 },
    ];
    const { rejected, rows } = read([...ghcn(days), '"USW00000001","2024-01']);
    expect(rows).toBe(3);
    const byLine = rejected.toSorted((one, other) => one.line - other.line).map(({ line }) => line);
    expect([...new Set(byLine)]).toEqual([2, 6, 7, 8, 9, 10]);
    const messages = rejected.map(({ message }) => message).join('\n');
    for (const part of [/2026-10-25/, /"warm"/, /never closed/, /twice/, /70 °C/, /above its high/]) {
      expect(messages).toMatch(part);
    }
  });

  test('keeps the last twenty years and says how many days are older', () => {
    const days = ['1990-01-14', '1990-01-15'].map((date) => ({ date, max: -150, min: -250 }));
    const file = read(ghcn([...days, ...COLD]));
    expect(file).toMatchObject({ rows: 3, from: '2024-01-14' });
    expect(file.warnings.join(' ')).toMatch(/2 days before 2024-01-14 were left out/);
  });

  test('warns of a station far from the site, and stands at the site where it says no place', () => {
    expect(read(ghcn(COLD), { latitudeDeg: 41.9 }).warnings.join(' ')).toMatch(/FIELD.*more than 1°/);
    const placeless = ghcn(COLD).map((line) => line.replace('"46.93","-96.81","274.0"', '"","",""'));
    const file = read(placeless);
    expect(file.station).toBeUndefined();
    expect(file.hours).toEqual(read(ghcn(COLD)).hours);
  });

  test.each([
    ['rows of another station', [...ghcn(COLD), ghcn(COLD, 'USW00000002')[1]!], /USW00000002.*nearest/],
    ['no column for the low', ghcn(COLD).map((line) => line.replace('TMIN', 'TOBS')), /TMIN.*choose/],
    ['rain only', ghcn(COLD.map((day) => ({ ...day, max: '', min: '' }))), /No row.*rain only/],
    ['no two days in a row', ghcn([COLD[0]!, COLD[2]!]), /2 days.*follow/],
  ])('with %s is refused with the way out', (_, lines, message) => {
    expect(refusal(lines)).toMatch(message);
  });
});

describe('daily summaries in other units', () => {
  // 14, 15 and 16 January as above, rounded to whole °F as they are delivered.
  const fahrenheit = ghcn([
    { date: '2024-01-14', max: 4, min: -9 },
    { date: '2024-01-15', max: 1, min: -14 },
    { date: '2024-01-16', max: 17, min: -6 },
  ]);
  const celsius = ghcn([
    { date: '2024-01-14', max: '-15.6', min: '-22.8' },
    { date: '2024-01-15', max: '-17.2', min: '-25.6' },
    { date: '2024-01-16', max: '-8.3', min: '-21.1' },
  ]);

  test('are refused while nobody says which', () => {
    expect(refusal(fahrenheit)).toMatch(/run from -14 to 17.*ordered in °F.*unit=F.*unit=C/);
    expect(refusal(celsius)).toMatch(/ordered in °C.*unit=F.*unit=C/);
    const summer = ghcn([
      { date: '2024-07-14', max: 96, min: 71 },
      { date: '2024-07-15', max: 101, min: 74 },
    ]);
    expect(refusal(summer)).toMatch(/from 71 to 101.*ordered in °F/);
  });

  test('are read once somebody says so', () => {
    const known = read(ghcn(COLD)).hours!;
    expect(read(celsius, { unit: 'C' }).hours).toEqual(known);
    const { startAt, tempC } = read(fahrenheit, { unit: 'F' }).hours!;
    expect(startAt).toBe(known.startAt);
    // Whole °F are at most half of one off: 0.28 K, a little more through the amplitude.
    for (const [hour, value] of tempC.entries())
      expect(Math.abs(value - known.tempC[hour]!)).toBeLessThan(0.4);
  });

  test('never overrule plain tenths', () => {
    const file = read(ghcn(COLD), { unit: 'F' });
    expect(file.hours).toEqual(read(ghcn(COLD)).hours);
    expect(file.warnings.join(' ')).toMatch(/unit=F was not followed/);
  });

  test('takes nothing from before 2000, nor from after 2150', () => {
    const old = [
      { date: '1999-12-30', max: 10, min: -10 },
      { date: '1999-12-31', max: 10, min: -200 },
    ];
    expect(refusal(ghcn(old.map((day) => ({ ...day, date: day.date.replace('1999', '1900') }))))).toMatch(
      /before 2000.*choose one/,
    );
    const file = read(
      ghcn([...old, ...COLD.map((day) => ({ ...day, date: day.date.replace('2024', '2001') }))]),
    );
    expect([file.rows, file.from]).toEqual([3, '2001-01-14']);
    expect(file.warnings.join(' ')).toMatch(/2 days before 2001-01-14 were left out/);
    const late = read(ghcn([...COLD, { date: '2151-01-01', max: 10, min: -200 }]));
    expect(late.rejected).toEqual([{ line: 5, message: expect.stringContaining('2150') }]);
  });
});
