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
  litHours: Float64Array;
  /** Hours of the evening during which the set is in. */
  poweredHours: Float64Array;
  trips: Float64Array;
  showNight: Uint8Array;
  /**
   * Moments at which the set must still hold: `checkFrom[n]` up to `checkFrom[n + 1]` belong to evening n.
   * With each the lit hours so far, the share of the evening gone and the air, °C.
   */
  checkFrom: Uint32Array;
  checkLitHours: Float64Array;
  checkGoneShare: Float64Array;
  checkAirC: Float64Array;
  /** Mean air from sunset to sunrise, and its spread. */
  nightC: Float64Array;
  nightSigmaC: Float64Array;
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
  const evenings = eveningsFrom(of.from, of.through);
  const checkFrom = new Uint32Array(evenings.length + 1);
  const checkLitHours: number[] = [];
  const checkGoneShare: number[] = [];
  const checkAirC: number[] = [];
  const perEvening = () => new Float64Array(evenings.length);
  const schedule = {
    litHours: perEvening(),
    poweredHours: perEvening(),
    trips: perEvening(),
    showNight: new Uint8Array(evenings.length),
    nightC: perEvening(),
    nightSigmaC: perEvening(),
  };
  evenings.forEach((evening, n) => {
    const showNight = season.showNights.get(evening) ?? null;
    const on = showNight !== null && !showNight.calledOff;
    const about = { evening, place: season.place, showNight, poweredSinceAt: of.since };
    const lit = litEvening(of.switching, about);
    const span = eveningSpan(evening, season.place.timeZone);
    const poweredFrom = Math.max(span.startAt, of.since);
    const weather = eveningWeather(season.weather, evening);
    schedule.litHours[n] = lit.litHours;
    schedule.poweredHours[n] = Math.max(0, span.endAt - poweredFrom) / HOUR_MS;
    schedule.trips[n] = of.trips ? (on ? of.trips.perShowNight : of.trips.perNightOff) : 0;
    schedule.showNight[n] = on ? 1 : 0;
    schedule.nightC[n] = weather.meanC;
    schedule.nightSigmaC[n] = weather.sigmaC;
    const spells =
      lit.spells.length === 0 && of.trips ? litEvening({ kind: 'by-hand' }, about).spells : lit.spells;
    let litSoFar = 0;
    for (const spell of spells) {
      for (const at of checkMoments(spell)) {
        checkLitHours.push(lit.spells.length === 0 ? 0 : litSoFar + (at - spell.fromAt) / HOUR_MS);
        checkGoneShare.push((at - poweredFrom) / Math.max(1, span.endAt - poweredFrom));
        checkAirC.push(temperatureC(season.weather, at));
      }
      litSoFar += (spell.untilAt - spell.fromAt) / HOUR_MS;
    }
    checkFrom[n + 1] = checkAirC.length;
  });
  return {
    from: of.from,
    count: evenings.length,
    ...schedule,
    checkFrom,
    checkLitHours: Float64Array.from(checkLitHours),
    checkGoneShare: Float64Array.from(checkGoneShare),
    checkAirC: Float64Array.from(checkAirC),
  };
}

function checkMoments(spell: LitSpell): Instant[] {
  const steps = Math.max(2, Math.ceil((spell.untilAt - spell.fromAt) / HOUR_MS / CHECK_EVERY_HOURS));
  return Array.from(
    { length: steps + 1 },
    (_, i) => spell.fromAt + ((spell.untilAt - spell.fromAt) * i) / steps,
  );
}
