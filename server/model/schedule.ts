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
  /** The site's own last evening, whatever run of evenings was prepared. */
  closes: Evening;
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
  /** Warmest air at any look from evening n on, °C; -Infinity where nothing is lit any more. */
  warmestFromC: number[];
};

/** A lit spell is looked at this often at least: air changes little within it, and the coldest hour is not missed. */
const CHECK_EVERY_HOURS = 4;

/**
 * The schedule of one prop from the evening its set went in.
 * @param of.since when the set went in, or -Infinity for a schedule to share (not with an interval timer: it counts from then); @param of.through last evening wanted, inside the season
 * A trip prop that is not lit otherwise is looked at while visitors set it off.
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
    checkFrom: [0],
    checkLitHours: [],
    checkGoneShare: [],
    checkAirC: [],
    nightC: [],
    nightSigmaC: [],
    warmestFromC: [],
  };
  for (const evening of eveningsFrom(of.from, of.through)) addEvening(schedule, season, of, evening);
  schedule.warmestFromC = warmestFrom(schedule);
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
  const trips = of.trips ? tripsOf(of.trips, about) : { count: 0, spells: [] };
  const unlit = lit.spells.length === 0;
  const spells = unlit ? trips.spells : lit.spells;
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
  schedule.trips.push(trips.count);
  schedule.showNight.push(on);
  schedule.nightC.push(weather.meanC);
  schedule.nightSigmaC.push(weather.sigmaC);
}

type About = { evening: Evening; place: Place; showNight: ShowNight | null; poweredSinceAt: Instant };

/**
 * Trips of an evening and when they happen: at a show while the gate is open, else through the dark. A set that goes
 * in half way takes its share of them.
 */
function tripsOf(trips: Trips, about: About): { count: number; spells: LitSpell[] } {
  const on = about.showNight !== null && !about.showNight.calledOff;
  const wanted: Switching = on ? { kind: 'by-hand' } : { kind: 'light-sensor' };
  const whole = litEvening(wanted, { ...about, poweredSinceAt: Number.NEGATIVE_INFINITY });
  const left = litEvening(wanted, about);
  const share = whole.litHours > 0 ? left.litHours / whole.litHours : 0;
  const count = (on ? trips.perShowNight : trips.perNightOff) * share;
  return { count, spells: count > 0 ? left.spells : [] };
}

function warmestFrom(schedule: Schedule): number[] {
  const warmest = Array<number>(schedule.count + 1).fill(Number.NEGATIVE_INFINITY);
  for (let n = schedule.count - 1; n >= 0; n -= 1) {
    const looks = schedule.checkAirC.slice(schedule.checkFrom[n], schedule.checkFrom[n + 1]);
    warmest[n] = Math.max(warmest[n + 1]!, ...looks);
  }
  return warmest;
}

function checkMoments(spell: LitSpell): Instant[] {
  const steps = Math.max(2, Math.ceil((spell.untilAt - spell.fromAt) / HOUR_MS / CHECK_EVERY_HOURS));
  return Array.from(
    { length: steps + 1 },
    (_, i) => spell.fromAt + ((spell.untilAt - spell.fromAt) * i) / steps,
  );
}
