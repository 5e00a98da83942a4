import { HOUR_MS, type Instant } from '../model/evening.ts';

const EARLIEST_HOUR = 13;
const LATEST_HOUR = 16.5;
/** Where the warmest hour of a usual day falls, to tell how far a file is out. */
const USUAL_HOUR = 14.7;
/** A peak within this of where a slip would put it is taken for that slip, hours. Ours. */
const SLIP_HOURS = 1.5;
/** Below this range the mean day is too flat to have a warmest hour, K. Ours. */
const LEAST_RANGE_C = 1;
const LEAST_DAYS = 10;

/**
 * Checks a series by its phase: the mean day must be warmest at 13 to 16.5 solar hours. A shifted clock can leave the
 * mean of the nights nearly unchanged, so nothing else in the file gives it away.
 * Source: measured on 60 stations that were read with the wrong zone.
 * @param series hourly °C from the instant of its first value on; NaN = missing
 * @param clock where the thermometer stands, and what its local clock is ahead of UTC
 * @returns a sentence naming the hour and the likely slip, or null when right or too flat or short to tell
 */
export function phaseWarning(
  series: { startAt: Instant; tempC: Float32Array },
  clock: { longitudeDeg: number; offsetHours: number },
): string | null {
  const hour = warmestSolarHour(series, clock.longitudeDeg);
  if (hour === null || (hour >= EARLIEST_HOUR && hour <= LATEST_HOUR)) return null;
  const found = `The mean day of this file is warmest at ${clockText(hour)} by the sun, and should be so between 13:00 and 16:30.`;
  return `${found} ${likelySlip(hour - USUAL_HOUR, clock)}`;
}

function likelySlip(lateHours: number, clock: { longitudeDeg: number; offsetHours: number }): string {
  const isLateBy = (hours: number) =>
    Math.abs(hours) > 2 && Math.abs(((lateHours - hours + 36) % 24) - 12) < SLIP_HOURS;
  if (isLateBy(-clock.offsetHours)) {
    return 'Likely UTC times read as the local clock: write them with a Z, as in 2026-10-25T18:00Z.';
  }
  if (isLateBy(clock.offsetHours)) {
    return 'Likely local times marked as UTC: leave the Z out, or write the true offset.';
  }
  if (isLateBy((2 * clock.longitudeDeg) / 15)) {
    return `Likely the wrong sign on the longitude ${clock.longitudeDeg}: east is positive, west negative.`;
  }
  return 'Likely the wrong time zone, or a thermometer that stands in the sun: check both before you rely on it.';
}

function warmestSolarHour(
  series: { startAt: Instant; tempC: Float32Array },
  longitudeDeg: number,
): number | null {
  const sums = new Float64Array(24);
  const counts = new Uint32Array(24);
  const firstHour = series.startAt / HOUR_MS + longitudeDeg / 15;
  const skipped = Math.ceil(firstHour / 24) * 24 - firstHour;
  for (let day = Math.ceil(skipped); day + 24 <= series.tempC.length; day += 24) {
    const hours = series.tempC.subarray(day, day + 24);
    const meanC = hours.reduce((sum, each) => sum + each, 0) / 24;
    if (Number.isNaN(meanC)) continue;
    for (let hour = 0; hour < 24; hour++) {
      sums[hour] = sums[hour]! + hours[hour]! - meanC;
      counts[hour] = counts[hour]! + 1;
    }
  }
  if (counts[0]! < LEAST_DAYS) return null;
  const cycleC = sums.map((sum, hour) => sum / counts[hour]!);
  if (Math.max(...cycleC) - Math.min(...cycleC) < LEAST_RANGE_C) return null;
  const warmest = cycleC.indexOf(Math.max(...cycleC));
  const before = cycleC[(warmest + 23) % 24]!;
  const after = cycleC[(warmest + 1) % 24]!;
  const bend = before - 2 * cycleC[warmest]! + after;
  const summit = bend < 0 ? warmest + (before - after) / (2 * bend) : warmest;
  const firstSolarHour = Math.ceil(skipped) - skipped;
  return (summit + firstSolarHour + 24) % 24;
}

function clockText(hour: number): string {
  const minutes = Math.round(hour * 60) % 1440;
  return `${String(Math.floor(minutes / 60)).padStart(2, '0')}:${String(minutes % 60).padStart(2, '0')}`;
}
