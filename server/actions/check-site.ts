import {
  addEvenings,
  eveningsBetween,
  isEvening,
  isTimeZone,
  standardOffsetHours,
} from '../model/evening.ts';
import type { Site } from '../model/site.ts';
import { MONTHS } from '../planning/evening-words.ts';
import { eveningFaults } from './known-years.ts';
import { didYouMean, nearNames } from './near-names.ts';
import type { Fault } from './refusal.ts';

/** The longest season, evenings: a year and a little. */
export const LONGEST_SEASON = 400;
// A zone's clock runs up to about 3.5 h off the sun where a country is wide; 5 h is a slip of sign.
const WIDEST_ZONE_HOURS = 5;

/**
 * What is wrong with a site beyond single fields: dates that do not exist, a zone nobody knows, a place and a zone
 * that cannot belong together, a month whose maximum lies below its minimum.
 * @param site the site as it would be kept
 */
export function siteFaults(site: Site): Fault[] {
  return [
    ...runOfEveningsFaults({ from: site.seasonFrom, through: site.seasonThrough }, [
      'seasonFrom',
      'seasonThrough',
    ]),
    ...zoneFaults(site),
    ...monthFaults(site),
    ...zoneNameFaults(site.zoneOffsetsC),
  ];
}

/**
 * What is wrong with a run of evenings.
 * @param run its first and last evening
 * @param fields how the asker calls the two
 */
export function runOfEveningsFaults(
  run: { from: string; through: string },
  fields: readonly [from: string, through: string],
): Fault[] {
  const faults = [...eveningFaults(run.from, fields[0]), ...eveningFaults(run.through, fields[1])];
  if (faults.length > 0) return faults;
  const evenings = eveningsBetween(run.from, run.through) + 1;
  if (evenings < 1) {
    const message = `${run.through} is before ${run.from}. Were the two swapped, or the year forgotten?`;
    return [{ field: fields[1], message }];
  }
  if (evenings > LONGEST_SEASON) {
    const latest = addEvenings(run.from, LONGEST_SEASON - 1);
    const message = `${run.from} to ${run.through} is ${evenings} evenings; at most ${LONGEST_SEASON} go together, so through ${latest} at the latest. Is the year right?`;
    return [{ field: fields[1], message }];
  }
  return [];
}

const NEAR_POLE_DEG = 85;

function zoneFaults(site: Site): Fault[] {
  if (!isTimeZone(site.timeZone)) {
    const near = nearNames(site.timeZone, Intl.supportedValuesOf('timeZone'));
    const guess = didYouMean(near) || " An IANA name is wanted, like 'Europe/London'.";
    return [
      { field: 'timeZone', message: `No time zone is called ${JSON.stringify(site.timeZone)}.${guess}` },
    ];
  }
  // Near a pole every longitude is as good as any other.
  if (!isEvening(site.seasonFrom) || Math.abs(site.latitudeDeg) > NEAR_POLE_DEG) return [];
  const zoneHours = standardOffsetHours(site.timeZone, Number(site.seasonFrom.slice(0, 4)));
  const sunHours = site.longitudeDeg / 15;
  // By the date line there are places that keep the day of those across it: 12 h ahead and more, far in the west.
  const isAcross = zoneHours >= 12 && sunHours < 0;
  const apartHours = Math.abs(zoneHours - sunHours - (isAcross ? 24 : 0));
  if (apartHours <= WIDEST_ZONE_HOURS) return [];
  const way = site.longitudeDeg < 0 ? 'east' : 'west';
  const message = `At longitude ${site.longitudeDeg} the sun is ${apartHours.toFixed(1)} h away from the clocks of ${site.timeZone}. Is the longitude ${way} (${-site.longitudeDeg}), or the zone another?`;
  return [{ field: 'longitudeDeg', message }];
}

function monthFaults(site: Site): Fault[] {
  return MONTHS.flatMap((month, index) => {
    const minC = site.monthlyMinC[index]!;
    const maxC = site.monthlyMaxC[index]!;
    if (maxC >= minC) return [];
    const message = `${month}'s maximum ${maxC} °C is below its minimum ${minC} °C. Were the two swapped?`;
    return [{ field: `monthlyMaxC.${index}`, message }];
  });
}

// Zone names are keys of an object, which a schema's text rules do not reach.
function zoneNameFaults(zoneOffsetsC: Record<string, number>): Fault[] {
  return Object.keys(zoneOffsetsC).flatMap((zone) => {
    const plain = zone.length <= 60 && /^[^\p{Cc}\p{Cs}]+$/u.test(zone) && zone.trim() !== '';
    if (plain) return [];
    const message = `${JSON.stringify(zone.slice(0, 40))} cannot be the name of a zone: 1 to 60 plain characters are wanted.`;
    return [{ field: 'zoneOffsetsC', message }];
  });
}
