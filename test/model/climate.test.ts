import { describe, expect, test } from 'vitest';
import {
  climateNightSigmaC,
  climateOf,
  climateOfTypicalYear,
  climateTemperatureC,
  monthlyExtremesOf,
  type TypicalYear,
  YEAR_HOURS,
} from '../../server/model/climate.ts';
import { HOUR_MS } from '../../server/model/evening.ts';

const position = { latitudeDeg: 46.93, longitudeDeg: -96.81 };
// A cold continental year, °C; the means of the months are arithmetic on them.
const monthlyMinC = [-18.2, -14.9, -7.3, 0.1, 6.9, 12.6, 15.2, 14, 8.8, 2.1, -6, -14.2];
const monthlyMaxC = [-7.9, -4.7, 2.2, 12.5, 20.3, 25.2, 28.2, 27.4, 21.8, 13.4, 3, -5];
const cold = climateOf({ monthlyMinC, monthlyMaxC, ...position });

function meanOf(values: number[]): number {
  return values.reduce((sum, each) => sum + each, 0) / values.length;
}

function hoursBetween(from: string, until: string): number[] {
  const fromAt = Date.parse(from);
  return Array.from({ length: (Date.parse(until) - fromAt) / HOUR_MS }, (_, hour) => fromAt + hour * HOUR_MS);
}

describe('a climate from twelve months', () => {
  // By construction of mean-preserving knots: the mean of a month's hours is the middle of its two numbers. What is
  // left is the quarter day by which a 365.25-day year and the calendar differ.
  test.each(monthlyMinC.map((minC, month) => [month, (minC + monthlyMaxC[month]!) / 2] as const))(
    'keeps the mean of month %i',
    (month, meanC) => {
      const first = new Date(Date.UTC(2027, month, 1, 6)).toISOString();
      const next = new Date(Date.UTC(2027, month + 1, 1, 6)).toISOString();
      const hours = hoursBetween(first, next).map((at) => climateTemperatureC(cold, at));
      expect(meanOf(hours)).toBeCloseTo(meanC, 0);
      expect(Math.abs(meanOf(hours) - meanC)).toBeLessThan(0.12);
    },
  );

  test('is warmest in the afternoon by the sun and coldest around dawn, whatever the longitude', () => {
    for (const longitudeDeg of [-150, -30, 0, 95, 179]) {
      const climate = climateOf({ monthlyMinC, monthlyMaxC, latitudeDeg: 50, longitudeDeg });
      // 15 April: the sun is within half a minute of the clock (published equation of time: zero about 15 April).
      const solarMidnightAt = Date.parse('2026-04-15T00:00Z') - (longitudeDeg / 15) * HOUR_MS;
      const temps = Array.from({ length: 24 }, (_, hour) =>
        climateTemperatureC(climate, solarMidnightAt + hour * HOUR_MS),
      );
      const warmest = temps.indexOf(Math.max(...temps));
      expect(warmest).toBeGreaterThanOrEqual(13);
      expect(warmest).toBeLessThanOrEqual(16);
      const coldest = temps.indexOf(Math.min(...temps));
      expect(coldest).toBeGreaterThanOrEqual(3);
      expect(coldest).toBeLessThanOrEqual(6);
    }
  });

  test('knows no night at all where minimum and maximum are one', () => {
    const flat = climateOf({ monthlyMinC: Array(12).fill(20), monthlyMaxC: Array(12).fill(20), ...position });
    for (const at of hoursBetween('2026-12-30T00:00Z', '2027-01-02T00:00Z')) {
      expect(climateTemperatureC(flat, at)).toBeCloseTo(20, 9);
    }
  });

  test('works through polar night, at both poles and on the date line', () => {
    for (const latitudeDeg of [-90, 69.6, 90]) {
      const climate = climateOf({ monthlyMinC, monthlyMaxC, latitudeDeg, longitudeDeg: 180 });
      for (const at of hoursBetween('2026-12-21T00:00Z', '2026-12-22T00:00Z')) {
        const tempC = climateTemperatureC(climate, at);
        expect(tempC).toBeGreaterThan(-20);
        expect(tempC).toBeLessThan(0);
      }
    }
  });

  test('has no step at a month boundary or at the year end', () => {
    const temps = hoursBetween('2026-12-31T00:00Z', '2027-02-02T00:00Z').map((at) =>
      climateTemperatureC(cold, at),
    );
    for (let hour = 1; hour < temps.length; hour++) {
      expect(Math.abs(temps[hour]! - temps[hour - 1]!)).toBeLessThan(2);
    }
  });

  test('refuses eleven months, a maximum below its minimum, and places off the Earth', () => {
    const eleven = monthlyMinC.slice(1);
    expect(() => climateOf({ monthlyMinC: eleven, monthlyMaxC, ...position })).toThrow(/twelve/);
    const swapped = { monthlyMinC: monthlyMaxC, monthlyMaxC: monthlyMinC };
    expect(() => climateOf({ ...swapped, ...position })).toThrow(/below/);
    expect(() => climateOf({ monthlyMinC, monthlyMaxC, latitudeDeg: 91, longitudeDeg: 0 })).toThrow(
      /latitudeDeg/,
    );
    const holed = [...monthlyMinC.slice(0, 11), Number.NaN];
    expect(() => climateOf({ monthlyMinC: holed, monthlyMaxC, ...position })).toThrow(/finite/);
  });
});

describe('the spread of nights', () => {
  // The rule's own arithmetic: max(1, 1.25 + (0.118 - 0.04 z) R), with R = 0 here.
  test('is 1.25 K where all months are alike', () => {
    const flat = climateOf({ monthlyMinC: Array(12).fill(15), monthlyMaxC: Array(12).fill(25), ...position });
    expect(climateNightSigmaC(flat, '2026-07-04')).toBeCloseTo(1.25, 9);
  });

  test('is widest in the cold months and changes from evening to evening without a step', () => {
    expect(climateNightSigmaC(cold, '2027-01-16')).toBeGreaterThan(climateNightSigmaC(cold, '2026-07-16'));
    expect(
      Math.abs(climateNightSigmaC(cold, '2026-12-31') - climateNightSigmaC(cold, '2027-01-01')),
    ).toBeLessThan(0.05);
    expect(climateNightSigmaC(cold, '2028-02-29')).toBeCloseTo(climateNightSigmaC(cold, '2028-02-28'), 9);
  });
});

describe('a climate from a typical year', () => {
  const year = (fill: (day: number, hour: number) => number): TypicalYear => ({
    standardOffsetHours: -6,
    tempC: Float32Array.from({ length: YEAR_HOURS }, (_, index) => fill(Math.floor(index / 24), index % 24)),
  });
  const at = (text: string) => Date.parse(`${text}-06:00`);

  test('gives each clock hour of local standard time its own value, half way between on the half hour', () => {
    const climate = climateOfTypicalYear(
      year((_, hour) => hour),
      position,
    );
    expect(climateTemperatureC(climate, at('2026-07-04T05:00'))).toBeCloseTo(5, 5);
    expect(climateTemperatureC(climate, at('2026-07-04T05:30'))).toBeCloseTo(5.5, 5);
    expect(climateTemperatureC(climate, at('2026-12-31T23:30'))).toBeCloseTo(11.5, 5);
  });

  test('spreads one hour of one day over the 45 days around it, round the year end too', () => {
    // 45 K in one of 45 days are 1 K in their mean.
    const climate = climateOfTypicalYear(
      year((day, hour) => (day === 0 && hour === 5 ? 45 : 0)),
      position,
    );
    for (const date of ['2026-12-10', '2026-12-31', '2027-01-01', '2027-01-23']) {
      expect(climateTemperatureC(climate, at(`${date}T05:00`))).toBeCloseTo(1, 5);
    }
    for (const date of ['2026-12-09', '2027-01-24']) {
      expect(climateTemperatureC(climate, at(`${date}T05:00`))).toBeCloseTo(0, 5);
    }
    expect(climateTemperatureC(climate, at('2027-01-01T06:00'))).toBeCloseTo(0, 5);
  });

  test('takes 28 February for the 29th and goes on with 1 March', () => {
    const climate = climateOfTypicalYear(
      year((day) => day),
      position,
    );
    const hour = (date: string) => climateTemperatureC(climate, at(`${date}T12:00`));
    expect(hour('2028-02-29')).toBeCloseTo(hour('2028-02-28'), 9);
    expect(hour('2028-03-01')).toBeCloseTo(59, 4);
    expect(hour('2027-03-01')).toBeCloseTo(59, 4);
  });

  test('leaves a missing hour to the days around it, and refuses one missing for 45 days', () => {
    const holed = year((_, hour) => hour);
    holed.tempC[100 * 24 + 5] = Number.NaN;
    const climate = climateOfTypicalYear(holed, position);
    expect(climateTemperatureC(climate, at('2026-04-11T05:00'))).toBeCloseTo(5, 5);
    for (let day = 100; day < 145; day++) holed.tempC[day * 24 + 5] = Number.NaN;
    expect(() => climateOfTypicalYear(holed, position)).toThrow(/hour 5 is missing/);
  });

  test('has monthly extremes that are the means of daily ones', () => {
    // Every day runs from its day number up by its hour, hour 24 being the next day's hour 0 and left flat here.
    const { monthlyMinC: minC, monthlyMaxC: maxC } = monthlyExtremesOf(
      year((day, hour) => (hour === 0 ? day + 4 : day + hour)),
    );
    // Days 0..30: minimum day + 1, maximum day + 23; the mean day is 15.
    expect(minC[0]).toBeCloseTo(16, 6);
    expect(maxC[0]).toBeCloseTo(38, 6);
    expect(minC).toHaveLength(12);
  });
});
