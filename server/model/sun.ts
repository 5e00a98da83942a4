import { check, checkFinite, checkWithin } from './check.ts';
import { searchedCrossings } from './crossing-search.ts';
import type { Evening, Instant } from './evening.ts';
import { DAY_MS, eveningSpan, HOUR_MS, localNoonAt } from './evening.ts';
import type { SunDay } from './sun-day.ts';
import { noonTurnsIn, sinDeclinationIn, sunDayOf } from './sun-day.ts';

export type Position = { latitudeDeg: number; longitudeDeg: number };
export type Place = Position & { timeZone: string };

/** What a night is like at one altitude: whether the sun sinks below it, and whether it comes back. */
export type SunState = 'normal' | 'never-dark' | 'never-light' | 'dusk-only' | 'dawn-only';

/** When the sun sinks below an altitude and when it is back, null where it does not. */
export type DarkSpell = { state: SunState; duskAt: Instant | null; dawnAt: Instant | null };

/** One night of one place, from solar noon to solar noon, ready to be asked for crossings. */
export type Night = {
  startAt: Instant;
  endAt: Instant;
  sinLatitude: number;
  cosLatitude: number;
  /** The UT day that holds its midnight, as days since 1970-01-01. */
  day: number;
  sunDay: SunDay;
  /** Hour angle in turns = days of that UT day - this + the sun's noon turns, 0 at the noon that begins the night. */
  turnsOrigin: number;
};

/** Centre of the sun at sunset: refraction at the horizon and its own radius. Source: the almanacs' 50' below. */
export const SUNSET_ALTITUDE_DEG = -0.833;

// Named here once: under a bundler or test runner an imported function is looked up anew at each call, and these two are
// called ten times a crossing.
const sinDeclinationAt = sinDeclinationIn;
const noonTurnsAt = noonTurnsIn;

const RAD_PER_DEG = Math.PI / 180;
const RAD_PER_TURN = 2 * Math.PI;
const LATITUDES_DEG = { min: -90, max: 90 };
const LONGITUDES_DEG = { min: -180, max: 180 };
// The sun's declination moves up to 0.2 deg between midnight and noon. Nights whose extreme altitude lies within
// twice that (as a sine) of the altitude asked for are searched instead of solved.
const GRAZING_SINE = 0.008;
// Nearer a pole than 0.06 deg the noon of a meridian means nothing.
const POLAR_COSINE = 0.001;
// A second of movement leaves an error of some hundredths of a second.
const SOLVED_DAYS = 1e-5;

// The date line has two names, and both must give the same night to the last bit.
function turnsEast({ longitudeDeg }: Position): number {
  return longitudeDeg === -180 ? 0.5 : longitudeDeg / 360;
}

function checkPosition(position: Position): void {
  checkWithin(position.latitudeDeg, 'latitudeDeg', LATITUDES_DEG);
  checkWithin(position.longitudeDeg, 'longitudeDeg', LONGITUDES_DEG);
}

/**
 * Altitude of the sun's centre above the horizon: geocentric, without refraction or the observer's height.
 * Source: Meeus, Astronomical Algorithms, ch. 13 (13.6), with the sun of `sun-day.ts`.
 * Valid 1900..2199; within 0.003 deg in 2015..2055.
 * @param at the instant, UT1 taken as UTC
 * @param position latitude -90..90 (geodetic), longitude -180..180 (east positive)
 * @throws ProgrammerError outside these ranges
 */
export function sunAltitudeDeg(at: Instant, position: Position): number {
  checkPosition(position);
  checkFinite(at, 'at');
  const day = Math.floor(at / DAY_MS);
  const days = at / DAY_MS - day;
  const sunDay = sunDayOf(day);
  const hourTurns = days + turnsEast(position) + noonTurnsAt(sunDay, days) - 0.5;
  const sinDeclination = sinDeclinationAt(sunDay, days);
  const latitudeRad = position.latitudeDeg * RAD_PER_DEG;
  const sinAltitude =
    Math.sin(latitudeRad) * sinDeclination +
    Math.cos(latitudeRad) *
      Math.sqrt(1 - sinDeclination * sinDeclination) *
      Math.cos(hourTurns * RAD_PER_TURN);
  return Math.asin(Math.max(-1, Math.min(1, sinAltitude))) / RAD_PER_DEG;
}

// Number of the solar noon nearest to an instant by the mean sun, which the true sun never leaves by more than 17 min.
function nearestNoon(at: Instant, position: Position): number {
  return Math.round(at / DAY_MS + turnsEast(position) - 0.5);
}

function nightAfterNoon(noon: number, position: Position): Night {
  const midnight = noon + 1 - turnsEast(position);
  const day = Math.floor(midnight);
  const sunDay = sunDayOf(day);
  const turnsOrigin = noon + 0.5 - turnsEast(position) - day;
  const startDays = turnsOrigin - noonTurnsAt(sunDay, turnsOrigin);
  const endDays = turnsOrigin + 1 - noonTurnsAt(sunDay, turnsOrigin + 1);
  const latitudeRad = position.latitudeDeg * RAD_PER_DEG;
  return {
    startAt: Math.round((day + startDays) * DAY_MS),
    endAt: Math.round((day + endDays) * DAY_MS),
    sinLatitude: Math.sin(latitudeRad),
    cosLatitude: Math.cos(latitudeRad),
    day,
    sunDay,
    turnsOrigin,
  };
}

function isPolar(position: Position): boolean {
  return Math.cos(position.latitudeDeg * RAD_PER_DEG) < POLAR_COSINE;
}

// At a pole the night is the evening itself, since every meridian's noon is as good as any other.
function polarNight(evening: Evening, place: Place): Night {
  const { startAt, endAt } = eveningSpan(evening, place.timeZone);
  const night = nightAfterNoon(nearestNoon(startAt, place), place);
  const day = Math.floor((startAt + endAt) / 2 / DAY_MS);
  return {
    ...night,
    startAt,
    endAt,
    day,
    sunDay: sunDayOf(day),
    turnsOrigin: 0.5 - turnsEast(place),
  };
}

/**
 * The night an evening is named after: from the solar noon nearest to its local noon to the solar noon after.
 * Within 0.06 deg of a pole: the evening itself. In a zone that skipped the date: the night of the date after.
 * Solar noon, not the clock's, so that dusk comes before dawn whatever zone a place keeps.
 * @param evening the evening
 * @param place latitude -90..90, longitude -180..180, IANA zone
 * @throws ProgrammerError outside these ranges
 */
export function nightOf(evening: Evening, place: Place): Night {
  checkPosition(place);
  if (isPolar(place)) return polarNight(evening, place);
  return nightAfterNoon(nearestNoon(localNoonAt(evening, place.timeZone), place), place);
}

/**
 * Every night that shares time with an evening, in order; together they cover it. Usually two, since local noon is
 * seldom solar noon.
 * @param evening the evening
 * @param place latitude -90..90, longitude -180..180, IANA zone
 * @throws ProgrammerError outside these ranges
 */
export function nightsDuring(evening: Evening, place: Place): Night[] {
  checkPosition(place);
  if (isPolar(place)) return [polarNight(evening, place)];
  const { startAt, endAt } = eveningSpan(evening, place.timeZone);
  const first = nearestNoon(startAt, place) - 1;
  const last = nearestNoon(endAt, place);
  const nights: Night[] = [];
  for (let noon = first; noon <= last; noon += 1) {
    const night = nightAfterNoon(noon, place);
    if (night.startAt < endAt && night.endAt > startAt) nights.push(night);
  }
  return nights;
}

function sinAltitudeIn(night: Night, days: number): number {
  const sinDeclination = sinDeclinationAt(night.sunDay, days);
  const hourTurns = days - night.turnsOrigin + noonTurnsAt(night.sunDay, days);
  return (
    night.sinLatitude * sinDeclination +
    night.cosLatitude * Math.sqrt(1 - sinDeclination * sinDeclination) * Math.cos(hourTurns * RAD_PER_TURN)
  );
}

function instantIn(night: Night, days: number): Instant {
  return Math.round((night.day + days) * DAY_MS);
}

// Turns from the nearer noon at which the sun stands at an altitude, were its declination that of `days`.
function hourTurnsAt(night: Night, days: number, sinAltitude: number): number {
  const sinDeclination = sinDeclinationAt(night.sunDay, days);
  const swing = night.cosLatitude * Math.sqrt(1 - sinDeclination * sinDeclination);
  return Math.acos((sinAltitude - night.sinLatitude * sinDeclination) / swing) / RAD_PER_TURN;
}

// Days of the crossing on one side of midnight, from a guess: the hour angle is solved again with the declination of each
// answer. One Newton step would be as quick but goes astray where the sun grazes the altitude. Each round shrinks the
// error at least fifty times.
function solvedDays(night: Night, sinAltitude: number, guess: { days: number; side: 1 | -1 }): number {
  const noonDays = night.turnsOrigin + (guess.side === 1 ? 0 : 1);
  let days = guess.days;
  for (let movedDays = 1; movedDays > SOLVED_DAYS; ) {
    const hourTurns = guess.side * hourTurnsAt(night, days, sinAltitude);
    const nextDays = noonDays + hourTurns - noonTurnsAt(night.sunDay, days);
    movedDays = Math.abs(nextDays - days);
    days = nextDays;
  }
  return days;
}

// Starts from midnight's hour angle, corrected by its slope for the declination of dusk and of dawn; that saves a round.
function solvedSpell(night: Night, sinAltitude: number): DarkSpell {
  const { turnsOrigin, sunDay, sinLatitude, cosLatitude } = night;
  const midnightDays = turnsOrigin + 0.5;
  const sinDeclination = sinDeclinationAt(sunDay, midnightDays);
  const cosDeclination = Math.sqrt(1 - sinDeclination * sinDeclination);
  const cosHour = (sinAltitude - sinLatitude * sinDeclination) / (cosLatitude * cosDeclination);
  const hourTurns = Math.acos(cosHour) / RAD_PER_TURN;
  const slopeTurns =
    (sinLatitude / cosLatitude - (cosHour * sinDeclination) / cosDeclination) /
    (cosDeclination * Math.sqrt(1 - cosHour * cosHour) * RAD_PER_TURN);
  const noonTurns = noonTurnsAt(sunDay, midnightDays);
  const duskDays = turnsOrigin + hourTurns - noonTurns;
  const dawnDays = turnsOrigin + 1 - hourTurns - noonTurns;
  const laterTurns = slopeTurns * (sinDeclinationAt(sunDay, duskDays) - sinDeclination);
  const earlierTurns = slopeTurns * (sinDeclinationAt(sunDay, dawnDays) - sinDeclination);
  const dusk = solvedDays(night, sinAltitude, {
    days: duskDays + laterTurns + noonTurns - noonTurnsAt(sunDay, duskDays),
    side: 1,
  });
  const dawn = solvedDays(night, sinAltitude, {
    days: dawnDays - earlierTurns + noonTurns - noonTurnsAt(sunDay, dawnDays),
    side: -1,
  });
  return { state: 'normal', duskAt: instantIn(night, dusk), dawnAt: instantIn(night, dawn) };
}

function searchedSpell(night: Night, sinAltitude: number): DarkSpell {
  const course = {
    from: night.startAt / DAY_MS - night.day,
    until: night.endAt / DAY_MS - night.day,
    heightAt: (days: number) => sinAltitudeIn(night, days),
  };
  const { firstDown, lastUp, startsBelow } = searchedCrossings(course, sinAltitude);
  const duskAt = firstDown === null ? null : instantIn(night, firstDown);
  // Light only in the middle happens next to a pole alone; what counts is that it ends dark.
  const endsDark = firstDown !== null && lastUp !== null && lastUp < firstDown;
  const dawnAt = lastUp === null || endsDark ? null : instantIn(night, lastUp);
  if (duskAt !== null) return { state: dawnAt === null ? 'dusk-only' : 'normal', duskAt, dawnAt };
  if (dawnAt !== null) return { state: 'dawn-only', duskAt, dawnAt };
  return { state: startsBelow ? 'never-light' : 'never-dark', duskAt, dawnAt };
}

/**
 * When in one night the sun first sinks below an altitude, and when it last rises above it.
 * Ours: hour angle of the altitude re-solved at the sun's place of each answer; a search where the sun grazes it.
 * Within 5 s where the sun crosses at 5 deg/h or faster, else within 0.01 deg of altitude (2015..2055); presence is
 * right when the extreme altitude misses by more than 0.05 deg. Terrain, and weather beyond the mean refraction that
 * is part of an altitude like -0.833, are not in it.
 * @param night from `nightOf` or `nightsDuring`
 * @param altitudeDeg altitude of the sun's centre; Infinity is always dark, -Infinity never
 */
export function darkSpellIn(night: Night, altitudeDeg: number): DarkSpell {
  check(!Number.isNaN(altitudeDeg), 'altitudeDeg must be a number, but is NaN.');
  if (altitudeDeg >= 90) return { state: 'never-light', duskAt: null, dawnAt: null };
  if (altitudeDeg <= -90) return { state: 'never-dark', duskAt: null, dawnAt: null };
  const sinAltitude = Math.sin(altitudeDeg * RAD_PER_DEG);
  const sinDeclination = sinDeclinationAt(night.sunDay, night.turnsOrigin + 0.5);
  const middle = night.sinLatitude * sinDeclination;
  const swing = night.cosLatitude * Math.sqrt(1 - sinDeclination * sinDeclination);
  if (sinAltitude < middle - swing - GRAZING_SINE) return { state: 'never-dark', duskAt: null, dawnAt: null };
  if (sinAltitude > middle + swing + GRAZING_SINE)
    return { state: 'never-light', duskAt: null, dawnAt: null };
  if (sinAltitude < middle - swing + GRAZING_SINE || sinAltitude > middle + swing - GRAZING_SINE) {
    return searchedSpell(night, sinAltitude);
  }
  return solvedSpell(night, sinAltitude);
}

/**
 * Dusk and dawn of an evening at an altitude: `darkSpellIn` the night of `nightOf`.
 * @param evening the evening
 * @param place latitude -90..90, longitude -180..180, IANA zone
 * @param altitudeDeg altitude of the sun's centre: -0.833 sunset and sunrise, -6 civil dusk and dawn
 * @throws ProgrammerError outside these ranges
 */
export function darkSpell(evening: Evening, place: Place, altitudeDeg: number): DarkSpell {
  return darkSpellIn(nightOf(evening, place), altitudeDeg);
}

/**
 * From when until when a night is dark, by its spell: edges of the night stand in for a missing dusk or dawn.
 * @param night the night
 * @param spell its spell at some altitude
 * @returns null where it never gets dark
 */
export function darkStretch(night: Night, spell: DarkSpell): { fromAt: Instant; untilAt: Instant } | null {
  if (spell.state === 'never-dark') return null;
  return { fromAt: spell.duskAt ?? night.startAt, untilAt: spell.dawnAt ?? night.endAt };
}

/**
 * Hours of an evening, local noon to local noon, with the sun below an altitude.
 * @param evening the evening
 * @param place latitude -90..90, longitude -180..180, IANA zone
 * @param altitudeDeg altitude of the sun's centre
 * @throws ProgrammerError outside these ranges
 */
export function darkHoursOf(evening: Evening, place: Place, altitudeDeg: number): number {
  const { startAt, endAt } = eveningSpan(evening, place.timeZone);
  let darkMs = 0;
  for (const night of nightsDuring(evening, place)) {
    const dark = darkStretch(night, darkSpellIn(night, altitudeDeg));
    if (dark === null) continue;
    darkMs += Math.max(0, Math.min(dark.untilAt, endAt) - Math.max(dark.fromAt, startAt));
  }
  return darkMs / HOUR_MS;
}
