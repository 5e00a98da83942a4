// The weather of a usual year: what the air does at a site on a date, with the storms averaged away.

import { check, checkFinite, checkWithin } from './check.ts';
import type { Evening, Instant } from './evening.ts';
import { DAY_MS, HOUR_MS } from './evening.ts';
import { noonTurnsIn, sinDeclinationIn, sunDayOf } from './sun-day.ts';

/** Twelve mean daily minima and maxima, January first, °C. */
export type MonthlyExtremes = { monthlyMinC: readonly number[]; monthlyMaxC: readonly number[] };

/**
 * A typical-year file: `tempC[day * 24 + hour]` is the air at that hour of local standard time, day 0 being
 * 1 January of a year without 29 February. What a file calls hour 24 is hour 0 of the next day. NaN = missing.
 */
export type TypicalYear = { standardOffsetHours: number; tempC: Float32Array };

/** Where a day takes its course under the Sun; prepared once by `dayCourseAt`. */
export type DayCourse = { sinLatitude: number; cosLatitude: number; longitudeDeg: number };

type MonthsClimate = {
  kind: 'months';
  course: DayCourse;
  minKnotsC: Float64Array;
  maxKnotsC: Float64Array;
  monthlySigmaC: Float64Array;
};

type TypicalYearClimate = {
  kind: 'typical-year';
  standardOffsetHours: number;
  smoothC: Float64Array;
  monthlySigmaC: Float64Array;
};

/** Prepared once for a site; ask it with `climateTemperatureC` and `climateNightSigmaC`. */
export type Climate = MonthsClimate | TypicalYearClimate;

/**
 * How far a season as a whole may sit from its climate, 1 sd, K: one draw for a whole season.
 * Source: 60 stations, normals from odd years tried on even ones and the reverse; take 1.0 for old or distant normals.
 */
export const climateOffsetSigmaC = 0.7;

export const YEAR_HOURS = 8760;
const YEAR_2000_AT = Date.UTC(2000, 0, 1);
const TURN = 2 * Math.PI;
/** Largest minus smallest value of the two-harmonic day shape below. */
const SHAPE_RANGE = 2.10093;
/**
 * Days on each side of a date whose same hour is averaged with it. Measured on Fargo's typical year: 7 leave 2.2 K
 * RMS of that other year's weather in a daily mean, 22 leave 0.8 K.
 */
const SMOOTHING_DAYS = 22;

/** First day (0 = 1 January) of each month in a year of 365 days, and the year's end. */
export const MONTH_STARTS = [0, 31, 59, 90, 120, 151, 181, 212, 243, 273, 304, 334, 365] as const;

/** Where in the year (0..1) the middle of each month falls; February counts 28.25 days. */
const MONTH_MIDDLES = [31, 28.25, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31].map(
  (days, month, all) => (all.slice(0, month).reduce((sum, each) => sum + each, 0) + days / 2) / 365.25,
);

type BetweenMonths = { before: number; after: number; share: number };

/** The two month middles a moment of the year (0..1) lies between, and how far along it is, 0..1. */
function betweenMonths(yearShare: number): BetweenMonths {
  let after = 0;
  while (after < 12 && MONTH_MIDDLES[after]! <= yearShare) after++;
  const before = (after + 11) % 12;
  after %= 12;
  const gap = (MONTH_MIDDLES[after]! - MONTH_MIDDLES[before]! + 1) % 1;
  const along = (yearShare - MONTH_MIDDLES[before]! + 1) % 1;
  return { before, after, share: along / gap };
}

function curveAt(knots: Float64Array, { before, after, share }: BetweenMonths): number {
  return knots[before]! * (1 - share) + knots[after]! * share;
}

/** weights[month]: how much the knots of the month before, of it and of the month after weigh in its mean. */
const MONTH_WEIGHTS = MONTH_MIDDLES.map((_, month) => {
  const weights = [0, 0, 0] as [number, number, number];
  const start = MONTH_STARTS[month]!;
  const days = MONTH_STARTS[month + 1]! - start;
  for (let day = start; day < start + days; day++) {
    const { before, after, share } = betweenMonths((day + 0.5) / 365);
    weights[(before - month + 13) % 12] = weights[(before - month + 13) % 12]! + (1 - share) / days;
    weights[(after - month + 13) % 12] = weights[(after - month + 13) % 12]! + share / days;
  }
  return weights;
});

/**
 * Mid-month knots whose straight-line curve has the given monthly means.
 * Plain lines through the means make the coldest month up to 1.4 K too warm, so the knots are moved until the
 * means come out; each knot weighs about 6/8 in its own month, so the sweeps settle to rounding in about 20.
 * Source: mean-preserving knots, months averaged over the days of a 365-day year.
 */
function meanPreservingKnots(means: readonly number[]): Float64Array {
  const knots = Float64Array.from(means);
  for (let sweep = 0; sweep < 30; sweep++) {
    for (let month = 0; month < 12; month++) {
      const [before, own, after] = MONTH_WEIGHTS[month]!;
      const rest = before * knots[(month + 11) % 12]! + after * knots[(month + 1) % 12]!;
      knots[month] = (means[month]! - rest) / own;
    }
  }
  return knots;
}

/**
 * Spread of night means about the climate, 1 sd per month, K.
 * Source: fitted alike on 60 US stations observed 2017-2020 and on 269 typical years of the world (r² 0.74 and
 * 0.49, rest 0.7 K). About twice too wide for East-Asian monsoon winters, 30-50 % too wide for desert winters.
 */
function monthlySigma({ monthlyMinC, monthlyMaxC }: MonthlyExtremes): Float64Array {
  const meansC = monthlyMinC.map((minC, month) => (minC + monthlyMaxC[month]!) / 2);
  const rangeC = Math.max(...meansC) - Math.min(...meansC);
  const yearC = meansC.reduce((sum, each) => sum + each, 0) / 12;
  return Float64Array.from(meansC, (meanC) => {
    const warmth = rangeC > 0 ? (meanC - yearC) / (rangeC / 2) : 0;
    return Math.max(1, 1.25 + (0.118 - 0.04 * warmth) * rangeC);
  });
}

function checkPosition(latitudeDeg: number, longitudeDeg: number): void {
  checkWithin(latitudeDeg, 'latitudeDeg', { min: -90, max: 90 });
  checkWithin(longitudeDeg, 'longitudeDeg', { min: -180, max: 180 });
}

/**
 * The climate of a site from its twelve mean daily minima and maxima.
 * @param options twelve °C each, January first, every maximum at least its minimum; degrees north and east
 * @throws ProgrammerError for other lengths, a maximum below its minimum or a position off the Earth
 *
 * Valid where months describe the year; the night means it gives were 0.5 K (RMSE) off 60 observed stations.
 */
export function climateOf(options: {
  monthlyMinC: readonly number[];
  monthlyMaxC: readonly number[];
  latitudeDeg: number;
  longitudeDeg: number;
}): Climate {
  const { monthlyMinC, monthlyMaxC, latitudeDeg, longitudeDeg } = options;
  check(
    monthlyMinC.length === 12 && monthlyMaxC.length === 12,
    'a climate needs twelve minima and twelve maxima',
  );
  for (let month = 0; month < 12; month++) {
    checkFinite(monthlyMinC[month]!, `monthlyMinC[${month}]`);
    checkFinite(monthlyMaxC[month]!, `monthlyMaxC[${month}]`);
    check(
      monthlyMaxC[month]! >= monthlyMinC[month]!,
      `monthlyMaxC[${month}] lies below monthlyMinC[${month}]`,
    );
  }
  return {
    kind: 'months',
    course: dayCourseAt({ latitudeDeg, longitudeDeg }),
    minKnotsC: meanPreservingKnots(monthlyMinC),
    maxKnotsC: meanPreservingKnots(monthlyMaxC),
    monthlySigmaC: monthlySigma(options),
  };
}

/**
 * The climate of a site from a typical year: each hour of a date is the mean of the same clock hour over the
 * 45 days around that date, wrapping at the year's end, because the storms in the file belong to another year.
 * Ours: the window. It still holds some of that year's weather: 2.2 K RMS of the daily mean about a smooth year at a
 * cold continental station, 1.3 K at a desert one.
 * @param typicalYear 8760 hours; missing hours are bridged by the other days of their window
 * @param position of the site, degrees north and east
 * @throws ProgrammerError when the year is not 8760 hours long or some hour is missing for 45 days running
 */
export function climateOfTypicalYear(
  typicalYear: TypicalYear,
  position: { latitudeDeg: number; longitudeDeg: number },
): Climate {
  const { tempC, standardOffsetHours } = typicalYear;
  checkPosition(position.latitudeDeg, position.longitudeDeg);
  checkWithin(standardOffsetHours, 'standardOffsetHours', { min: -14, max: 14 });
  check(tempC.length === YEAR_HOURS, `a typical year needs ${YEAR_HOURS} hours`);
  const smoothC = new Float64Array(YEAR_HOURS);
  for (let index = 0; index < YEAR_HOURS; index++) {
    let sum = 0;
    let count = 0;
    for (let day = -SMOOTHING_DAYS; day <= SMOOTHING_DAYS; day++) {
      const value = tempC[(index + day * 24 + YEAR_HOURS) % YEAR_HOURS]!;
      if (Number.isNaN(value)) continue;
      sum += value;
      count++;
    }
    check(count > 0, `hour ${index % 24} is missing on all 45 days around day ${Math.floor(index / 24) + 1}`);
    smoothC[index] = sum / count;
  }
  return {
    kind: 'typical-year',
    standardOffsetHours,
    smoothC,
    monthlySigmaC: monthlySigma(monthlyExtremesOf(typicalYear)),
  };
}

/** An hour of the day that some date's window of 45 days lacks altogether; null when there is none. */
export function hourMissingThroughout(tempC: Float32Array): number | null {
  const window = 2 * SMOOTHING_DAYS + 1;
  for (let hour = 0; hour < 24; hour++) {
    let gap = 0;
    for (let day = 0; day < 2 * 365; day++) {
      gap = Number.isNaN(tempC[((day % 365) * 24 + hour) % YEAR_HOURS]!) ? gap + 1 : 0;
      if (gap >= window) return hour;
    }
  }
  return null;
}

/**
 * Mean daily minimum and maximum of each month of a typical year, °C; a day is its hours 1 to 24.
 * @param typicalYear 8760 hours; a day with no value at all is left out
 * @throws ProgrammerError when a whole month is missing
 */
export function monthlyExtremesOf(typicalYear: TypicalYear): {
  monthlyMinC: number[];
  monthlyMaxC: number[];
} {
  const { tempC } = typicalYear;
  check(tempC.length === YEAR_HOURS, `a typical year needs ${YEAR_HOURS} hours`);
  const monthlyMinC: number[] = [];
  const monthlyMaxC: number[] = [];
  for (let month = 0; month < 12; month++) {
    let minSum = 0;
    let maxSum = 0;
    let count = 0;
    for (let day = MONTH_STARTS[month]!; day < MONTH_STARTS[month + 1]!; day++) {
      let minC = Number.POSITIVE_INFINITY;
      let maxC = Number.NEGATIVE_INFINITY;
      for (let hour = 1; hour <= 24; hour++) {
        const value = tempC[(day * 24 + hour) % YEAR_HOURS]!;
        if (value < minC) minC = value;
        if (value > maxC) maxC = value;
      }
      if (minC > maxC) continue;
      minSum += minC;
      maxSum += maxC;
      count++;
    }
    check(count > 0, `month ${month + 1} of the typical year is empty`);
    monthlyMinC.push(minSum / count);
    monthlyMaxC.push(maxSum / count);
  }
  return { monthlyMinC, monthlyMaxC };
}

/**
 * Air temperature of the usual year at an instant, °C.
 * From twelve months: two harmonics in true solar time, whose range is less than maximum - minimum because mean
 * daily extremes hold weather as well as sun; it asks for no sunrise and so holds in polar night. A typical year is read
 * off its smoothed hours. Never report a coldest night from it: it misses the cold tail by 4 to 12 K.
 * Source: shape and amplitude fitted on 60 US stations and 269 typical years; the Sun of `sun-day.ts`.
 * @param climate from `climateOf` or `climateOfTypicalYear`
 * @param at epoch milliseconds, 1900..2199
 */
export function climateTemperatureC(climate: Climate, at: Instant): number {
  return climate.kind === 'months' ? monthsTemperature(climate, at) : typicalYearTemperature(climate, at);
}

function monthsTemperature(climate: MonthsClimate, at: Instant): number {
  const localDays = (at - YEAR_2000_AT) / DAY_MS + climate.course.longitudeDeg / 360;
  const months = betweenMonths(positiveShare(localDays / 365.25));
  const minC = curveAt(climate.minKnotsC, months);
  const maxC = curveAt(climate.maxKnotsC, months);
  return dayTemperatureC(climate.course, { minC, maxC }, at);
}

/**
 * Prepares a place for `dayTemperatureC`.
 * @param position degrees north and east
 * @throws ProgrammerError for a position off the Earth
 */
export function dayCourseAt(position: { latitudeDeg: number; longitudeDeg: number }): DayCourse {
  const { latitudeDeg, longitudeDeg } = position;
  checkPosition(latitudeDeg, longitudeDeg);
  return {
    sinLatitude: Math.sin((latitudeDeg / 360) * TURN),
    cosLatitude: Math.cos((latitudeDeg / 360) * TURN),
    longitudeDeg,
  };
}

/**
 * Air temperature at an instant of a day whose low and high are known, °C: two harmonics in true solar time.
 * Their range is less than high - low, because daily extremes hold weather as well as sun; so the curve reaches
 * neither of them. A high below its low counts as equal to it.
 * Source: shape and amplitude fitted on 60 US stations and 269 typical years; with the low and the high of every day
 * the mean of one night was 1.57 K (RMSE) off 62 stations, of a month 0.53 K.
 * @param course from `dayCourseAt`
 * @param extremes low and high about that instant, °C: mean daily ones of the season, or those of the days around it
 * @param at epoch milliseconds, 1900..2199
 */
export function dayTemperatureC(
  course: DayCourse,
  { minC, maxC }: { minC: number; maxC: number },
  at: Instant,
): number {
  const localDays = (at - YEAR_2000_AT) / DAY_MS + course.longitudeDeg / 360;
  const day = Math.floor(at / DAY_MS);
  const days = at / DAY_MS - day;
  const sunDay = sunDayOf(day);
  const solarTurns = localDays + noonTurnsIn(sunDay, days);
  const shape =
    Math.cos(TURN * (solarTurns - 14.8 / 24)) + 0.19 * Math.cos(2 * TURN * (solarTurns - 0.9 / 24));

  const sinDeclination = sinDeclinationIn(sunDay, days);
  const noonSine =
    course.sinLatitude * sinDeclination + course.cosLatitude * Math.sqrt(1 - sinDeclination ** 2);
  const rangeC = Math.max(0, maxC - minC);
  const cycleC = Math.max(0.35 * rangeC, rangeC - (2.7 - 1.7 * Math.max(0, noonSine)));
  return (minC + maxC) / 2 + (cycleC * shape) / SHAPE_RANGE;
}

function typicalYearTemperature(climate: TypicalYearClimate, at: Instant): number {
  const localAt = at + climate.standardOffsetHours * HOUR_MS;
  const hourOfDay = positiveShare(localAt / DAY_MS) * 24;
  const hour = Math.floor(hourOfDay);
  const index = dayOfYear(new Date(localAt)) * 24 + hour;
  const share = hourOfDay - hour;
  return climate.smoothC[index]! * (1 - share) + climate.smoothC[(index + 1) % YEAR_HOURS]! * share;
}

/** 0 = 1 January .. 364 = 31 December, read off the UTC fields; 29 February counts as the 28th. */
function dayOfYear(date: Date): number {
  const month = date.getUTCMonth();
  const day = month === 1 ? Math.min(date.getUTCDate(), 28) : date.getUTCDate();
  return MONTH_STARTS[month]! + day - 1;
}

function positiveShare(value: number): number {
  return value - Math.floor(value);
}

/**
 * Spread of that night's mean about the climate, 1 sd, K: the monthly value in the middle of each month and
 * straight lines between, so no step falls on the first of a month.
 * Source: the rule of the monthly values; Ours: the lines between them.
 * @param climate from `climateOf` or `climateOfTypicalYear`
 * @param evening its midnight is meant
 */
export function climateNightSigmaC(climate: Climate, evening: Evening): number {
  const midnightDay = dayOfYear(new Date(`${evening}T00:00:00Z`)) + 1;
  return curveAt(climate.monthlySigmaC, betweenMonths(positiveShare(midnightDay / 365)));
}
