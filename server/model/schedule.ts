import { type Evening, eveningSpan, eveningsFrom, HOUR_MS, type Instant } from './evening.ts';
import type { Trips } from './load.ts';
import type { Place } from './sun.ts';
import { type LitSpell, litEvening, type ShowNight, type Switching } from './switching.ts';
import { eveningWeather, type SeasonWeather, temperatureC } from './weather.ts';

/** Everything about a site that its props share: its place, its air and its show nights. */
export type Season = {
  place: Place;
  from: Evening;
  through: Evening;
  weather: SeasonWeather;
  showNights: ReadonlyMap<Evening, ShowNight>;
};

/** When a prop is lit, evening by evening, in flat arrays: props with the same switching share one. */
export type Schedule = {
  from: Evening;
  count: number;
  litHours: number[];
  /** Hours of the evening during which the set is in. */
  poweredHours: number[];
  trips: number[];
  showNight: boolean[];
  /** Of all its evenings together. */
  total: { litHours: number; poweredHours: number; trips: number };
  /**
   * Moments at which the set must still hold: `checkFrom[n]` up to `checkFrom[n + 1]` belong to evening n.
   * With each the lit hours so far, the share of the evening gone and the air, °C.
   */
  checkFrom: number[];
  checkLitHours: number[];
  checkGoneShare: number[];
  checkAirC: number[];
  /** Mean air from sunset to sunrise, and its spread. */
  nightC: number[];
  nightSigmaC: number[];
};

/** A lit spell is looked at this often at least: air changes little within it, and the coldest hour is not missed. */
const CHECK_EVERY_HOURS = 4;

/**
 * The schedule of one prop from the evening its set went in.
 * @param of.since when the set went in, or -Infinity for a schedule to share (not with an interval timer: it counts from then); @param of.through last evening wanted, inside the season
 * A trip prop that is not lit otherwise is looked at while the gate is open.
 */
export function scheduleOf(
  season: Season,
  of: { switching: Switching; trips: Trips | undefined; from: Evening; through: Evening; since: Instant },
): Schedule {
  const schedule: Schedule = {
    from: of.from,
    count: 0,
    litHours: [],
    poweredHours: [],
    trips: [],
    showNight: [],
    total: { litHours: 0, poweredHours: 0, trips: 0 },
    checkFrom: [0],
    checkLitHours: [],
    checkGoneShare: [],
    checkAirC: [],
    nightC: [],
    nightSigmaC: [],
  };
  for (const evening of eveningsFrom(of.from, of.through)) addEvening(schedule, season, of, evening);
  return schedule;
}

function addEvening(
  schedule: Schedule,
  season: Season,
  of: { switching: Switching; trips: Trips | undefined; since: Instant },
  evening: Evening,
): void {
  const showNight = season.showNights.get(evening) ?? null;
  const on = showNight !== null && !showNight.calledOff;
  const about = { evening, place: season.place, showNight, poweredSinceAt: of.since };
  const lit = litEvening(of.switching, about);
  const { startAt, endAt } = eveningSpan(evening, season.place.timeZone);
  const poweredFrom = Math.max(startAt, of.since);
  const poweredMs = Math.max(0, endAt - poweredFrom);
  const weather = eveningWeather(season.weather, evening);
  const trips = of.trips ? (on ? of.trips.perShowNight : of.trips.perNightOff) : 0;
  const unlit = lit.spells.length === 0;
  const spells = unlit && of.trips ? litEvening({ kind: 'by-hand' }, about).spells : lit.spells;
  let litBefore = 0;
  for (const spell of spells) {
    for (const at of checkMoments(spell)) {
      schedule.checkLitHours.push(unlit ? 0 : litBefore + (at - spell.fromAt) / HOUR_MS);
      schedule.checkGoneShare.push((at - poweredFrom) / Math.max(1, poweredMs));
      schedule.checkAirC.push(temperatureC(season.weather, at));
    }
    litBefore += (spell.untilAt - spell.fromAt) / HOUR_MS;
  }
  schedule.count += 1;
  schedule.checkFrom.push(schedule.checkAirC.length);
  schedule.litHours.push(lit.litHours);
  schedule.poweredHours.push(poweredMs / HOUR_MS);
  schedule.trips.push(trips);
  schedule.showNight.push(on);
  schedule.nightC.push(weather.meanC);
  schedule.nightSigmaC.push(weather.sigmaC);
  schedule.total.litHours += lit.litHours;
  schedule.total.poweredHours += poweredMs / HOUR_MS;
  schedule.total.trips += trips;
}

function checkMoments(spell: LitSpell): Instant[] {
  const steps = Math.max(2, Math.ceil((spell.untilAt - spell.fromAt) / HOUR_MS / CHECK_EVERY_HOURS));
  return Array.from(
    { length: steps + 1 },
    (_, i) => spell.fromAt + ((spell.untilAt - spell.fromAt) * i) / steps,
  );
}
