import { HOUR_MS } from '../model/evening.ts';
import { AFTER_KNOWN_AT, FIRST_KNOWN_AT, FIRST_KNOWN_YEAR, LAST_KNOWN_YEAR } from '../model/known-years.ts';
import type { ObservedHours } from '../model/weather.ts';
import type { Reading } from './time-temp-csv.ts';
import { type RejectedLines, WeatherFileError } from './weather-file-error.ts';

/** Faster than this the air does not change; a reading that leaps and comes back is the thermometer. Common practice, no source. */
const SPIKE_C_PER_HOUR = 15;
/** A leap that has not come back after this is taken for the truth, hours. */
const SPIKE_HOURS = 3;
/** The same reading for longer than this is a stuck thermometer, hours. Common practice, no source. */
const FLAT_HOURS = 12;
/** Where readings are whole degrees they may well stand still for a foggy day. Ours. */
const FLAT_WHOLE_DEGREE_HOURS = 36;
/** Two readings at most this far apart give the hour between them, hours. */
const NEIGHBOUR_HOURS = 1.5;
/** A lone reading this close to an hour is that hour's, hours. */
const NEAREST_HOURS = 0.26;
const LONGEST_YEARS = 60;

/**
 * Turns readings at any instants into one value for each whole UTC hour: the reading at the hour, else the straight
 * line between two readings at most 1.5 h apart, else a lone reading within a quarter of an hour, else missing.
 * Readings are put in order; of several at one instant the first stays; spikes and stuck stretches are left out.
 * @param readings °C, at least one
 * @param rejected takes the lines left out
 * @throws WeatherFileError when the readings span more than 60 years
 */
export function hoursOfReadings(
  readings: Reading[],
  rejected: RejectedLines,
): { hours: ObservedHours; kept: Reading[]; warnings: string[] } {
  const warnings: string[] = [];
  const unsorted = readings.some((reading, index) => index > 0 && reading.at < readings[index - 1]!.at);
  if (unsorted) {
    warnings.push('The lines are not in order of time; they were sorted.');
    readings.sort((one, other) => one.at - other.at || one.line - other.line);
  }
  const dated = withoutUnknownYears(readings, rejected);
  const single = withoutDuplicates(dated, { rejected, warnings });
  const steady = withoutSpikes(single, rejected);
  const kept = withoutFlats(steady, { rejected, warnings });
  if (kept.length === 0) {
    throw new WeatherFileError(
      `All ${readings.length} readings are the same. Likely a stuck or unplugged thermometer: send another file.`,
    );
  }
  if (kept[kept.length - 1]!.at - kept[0]!.at > LONGEST_YEARS * 8766 * HOUR_MS) {
    throw new WeatherFileError(
      `The readings span more than ${LONGEST_YEARS} years, lines ${kept[0]!.line} and ${kept[kept.length - 1]!.line} ` +
        'being the ends. Likely a mistyped year: correct it and send the file again.',
    );
  }
  return { hours: wholeHours(kept), kept, warnings };
}

const UNKNOWN_YEAR = `is dated outside the years known here, ${FIRST_KNOWN_YEAR} to ${LAST_KNOWN_YEAR}. Is the year right?`;

function withoutUnknownYears(readings: readonly Reading[], rejected: RejectedLines): Reading[] {
  const known = readings.filter(({ at, line }) => {
    if (at >= FIRST_KNOWN_AT && at < AFTER_KNOWN_AT) return true;
    rejected.add(line, `This line ${UNKNOWN_YEAR}`);
    return false;
  });
  if (known.length > 0) return known;
  throw new WeatherFileError(`Every line ${UNKNOWN_YEAR}`);
}

type Notes = { rejected: RejectedLines; warnings: string[] };

function withoutDuplicates(readings: readonly Reading[], { rejected, warnings }: Notes): Reading[] {
  let repeated = 0;
  const single: Reading[] = [];
  for (const reading of readings) {
    const last = single[single.length - 1];
    if (last?.at !== reading.at) {
      single.push(reading);
    } else if (last.tempC === reading.tempC) {
      repeated++;
    } else {
      rejected.add(
        reading.line,
        `Line ${last.line} has another temperature at the same time; that one is kept.`,
      );
    }
  }
  if (repeated > 0) warnings.push(`${repeated} lines repeat another line and were left out.`);
  return single;
}

function withoutSpikes(readings: readonly Reading[], rejected: RejectedLines): Reading[] {
  const steady: Reading[] = [];
  for (let index = 0; index < readings.length; index++) {
    const reading = readings[index]!;
    const last = steady[steady.length - 1];
    if (!last || !leaps(last, reading)) {
      steady.push(reading);
      continue;
    }
    const back = comesBack(readings, { last, from: index });
    for (let spike = index; spike < back; spike++) {
      rejected.add(readings[spike]!.line, spikeMessage(readings[spike]!, last));
    }
    if (back === index) steady.push(reading);
    else index = back - 1;
  }
  return steady;
}

function leaps(one: Reading, other: Reading): boolean {
  const hours = Math.max(1, (other.at - one.at) / HOUR_MS);
  return Math.abs(other.tempC - one.tempC) > SPIKE_C_PER_HOUR * hours;
}

/** Where the readings are back in line with the last good one; `from` itself when they stay where they leapt to. */
function comesBack(readings: readonly Reading[], { last, from }: { last: Reading; from: number }): number {
  for (let index = from + 1; index < Math.min(readings.length, from + 40); index++) {
    const reading = readings[index]!;
    if (reading.at - readings[from]!.at > SPIKE_HOURS * HOUR_MS) break;
    if (Math.abs(reading.tempC - last.tempC) <= SPIKE_C_PER_HOUR) return index;
  }
  return from;
}

function spikeMessage(spike: Reading, last: Reading): string {
  return (
    `${rounded(spike.tempC)} °C leaps from ${rounded(last.tempC)} °C on line ${last.line} and comes back: ` +
    'more than 15 K an hour is the thermometer, likely in the sun or badly plugged.'
  );
}

function withoutFlats(readings: readonly Reading[], { rejected, warnings }: Notes): Reading[] {
  const isWholeDegree = readings.every((reading) => Number.isInteger(reading.tempC));
  const longest = (isWholeDegree ? FLAT_WHOLE_DEGREE_HOURS : FLAT_HOURS) * HOUR_MS;
  const kept: Reading[] = [];
  let first = 0;
  let stuck = 0;
  for (let index = 1; index <= readings.length; index++) {
    const start = readings[first]!;
    if (index < readings.length && readings[index]!.tempC === start.tempC) continue;
    const end = readings[index - 1]!;
    if (end.at - start.at > longest) {
      stuck++;
      const hours = Math.round((end.at - start.at) / HOUR_MS);
      rejected.add(
        start.line,
        `From here through line ${end.line} the reading stays ${rounded(start.tempC)} °C for ${hours} h.`,
      );
    } else {
      for (let place = first; place < index; place++) kept.push(readings[place]!);
    }
    first = index;
  }
  if (stuck > 0) {
    warnings.push(
      `${stuck} stretches stand still for more than ${longest / HOUR_MS} h and were left out: likely a stuck thermometer.`,
    );
  }
  return kept;
}

function wholeHours(kept: readonly Reading[]): ObservedHours {
  const startAt = Math.floor(kept[0]!.at / HOUR_MS) * HOUR_MS;
  const count = Math.ceil((kept[kept.length - 1]!.at - startAt) / HOUR_MS) + 1;
  const tempC = new Float32Array(count).fill(Number.NaN);
  let after = 0;
  for (let hour = 0; hour < count; hour++) {
    const at = startAt + hour * HOUR_MS;
    while (after < kept.length && kept[after]!.at < at) after++;
    tempC[hour] = betweenReadings(at, kept[after - 1], kept[after]);
  }
  // The ends are whole hours only where a reading is close enough to them.
  let first = 0;
  while (first < count - 1 && Number.isNaN(tempC[first]!)) first++;
  let last = count - 1;
  while (last > first && Number.isNaN(tempC[last]!)) last--;
  return { startAt: startAt + first * HOUR_MS, tempC: tempC.slice(first, last + 1) };
}

function betweenReadings(at: number, before: Reading | undefined, after: Reading | undefined): number {
  if (after && after.at === at) return after.tempC;
  if (before && after && after.at - before.at <= NEIGHBOUR_HOURS * HOUR_MS) {
    return before.tempC + ((after.tempC - before.tempC) * (at - before.at)) / (after.at - before.at);
  }
  const toBefore = before ? at - before.at : Number.POSITIVE_INFINITY;
  const toAfter = after ? after.at - at : Number.POSITIVE_INFINITY;
  if (Math.min(toBefore, toAfter) > NEAREST_HOURS * HOUR_MS) return Number.NaN;
  return toBefore <= toAfter ? before!.tempC : after!.tempC;
}

function rounded(value: number): string {
  return String(Math.round(value * 10) / 10);
}
