import { WeatherFileError } from './weather-file-error.ts';

/** What daily highs and lows are written in: tenths of °C in the data set itself, °C or °F where ordered so. */
export type DailyUnit = 'tenths' | 'C' | 'F';

/** No air is hotter than this in °F or in °C, nor colder than its opposite in °C. */
const BEYOND_AIR = 140;
/** From this share of values beyond any air on, they are tenths; fewer may be mistakes. Ours. */
const BEYOND_SHARE = 0.01;
/** Nowhere do days usually range over 45 °F (25 K); in tenths that is 4.5 K, less than most places have. Ours. */
const LEAST_TENTHS_RANGE = 45;
/** Air in °C stays below. */
const HOTTEST_C = 60;

/**
 * Tells the unit of daily lows and highs by their range. Tenths are whole numbers that soon leave what air can be in °F;
 * what stays within it is not guessed at.
 * @param lows as written; `highs` too
 * @param options.asked the unit somebody gave; tenths that are plainly tenths stay tenths
 * @throws WeatherFileError when they are no plain tenths and nobody gave the unit
 */
export function dailyUnitOf(
  lows: readonly number[],
  { highs, asked }: { highs: readonly number[]; asked: 'C' | 'F' | undefined },
): { unit: DailyUnit; warnings: string[] } {
  const values = [...lows, ...highs];
  const isWhole = values.every(Number.isInteger);
  const beyond = values.filter((value) => Math.abs(value) > BEYOND_AIR).length;
  const usualRange = middle(highs) - middle(lows);
  if (isWhole && (beyond >= BEYOND_SHARE * values.length || usualRange >= LEAST_TENTHS_RANGE)) {
    const isOverruled = asked !== undefined;
    return {
      unit: 'tenths',
      warnings: isOverruled
        ? [`TMAX and TMIN are plainly tenths of °C, so unit=${asked} was not followed.`]
        : [],
    };
  }
  if (asked !== undefined) return { unit: asked, warnings: [] };
  const [coldest, hottest] = values.reduce(
    ([low, high], value) => [Math.min(low, value), Math.max(high, value)] as const,
    [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY] as const,
  );
  const likely = isWhole || hottest > HOTTEST_C ? '°F' : '°C';
  throw new WeatherFileError(
    `TMIN and TMAX run from ${coldest} to ${hottest}, which are no plain tenths of °C as GHCN-Daily has them. ` +
      `Likely daily summaries ordered in ${likely}: send the file again with unit=F if they are °F, unit=C if °C, ` +
      'or send the whole access CSV of the station.',
  );
}

/** The value in °C. */
export function toC(value: number, unit: DailyUnit): number {
  if (unit === 'tenths') return value / 10;
  return unit === 'F' ? (value - 32) / 1.8 : value;
}

function middle(values: readonly number[]): number {
  const sorted = values.toSorted((one, other) => one - other);
  return sorted[Math.floor(sorted.length / 2)] ?? Number.NaN;
}
