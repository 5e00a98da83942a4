import { check, checkFinite } from './check.ts';
import type { Evening, Instant } from './evening.ts';
import {
  addEvenings,
  DAY_MS,
  eveningSpan,
  HOUR_MS,
  instantInEvening,
  instantOnDate,
  minutesOfWallTime,
} from './evening.ts';
import { luxOfAltitude, thresholdAltitudeDeg } from './light-threshold.ts';
import type { Night, Place } from './sun.ts';
import { darkSpellIn, darkStretch, nightsDuring } from './sun.ts';

export type LightSensor = {
  kind: 'light-sensor';
  onLux?: number;
  onAltitudeDeg?: number;
  offLux?: number;
  offAltitudeDeg?: number;
  skyShare?: number;
  cutOffHours?: number;
};
export type ClockSwitch = { kind: 'clock'; onAt: string; offAt: string };
export type IntervalTimer = { kind: 'interval-timer'; onHours: number; setAt?: Instant };

/** What turns a prop on and off. */
export type Switching = LightSensor | ClockSwitch | IntervalTimer | { kind: 'by-hand' } | { kind: 'always' };

/** An evening with visitors; the gate's wall times lie within the evening, '00:30' after its midnight. */
export type ShowNight = { evening: Evening; opensAt: string; closesAt: string; calledOff: boolean };

export type LitSpell = { fromAt: Instant; untilAt: Instant };

/** When a prop is lit in one evening; `reason` is a sentence where the answer wants one. */
export type LitEvening = { spells: LitSpell[]; litHours: number; reason: string | null };

type Circumstances = {
  evening: Evening;
  place: Place;
  showNight: ShowNight | null;
  /** When the prop last got its cells; nothing is lit before. */
  poweredSinceAt: Instant;
};
type Lighting = { spells: LitSpell[]; reason: string | null };

/** Civil dusk: what a light sensor is taken to answer to when nothing else is known of it. */
export const DEFAULT_ON_ALTITUDE_DEG = -6;

/** Altitudes at which a sensor turns on in the evening and off in the morning. */
export type Thresholds = { onDeg: number; offDeg: number };

/**
 * The sun altitudes a light sensor answers to.
 * An altitude is taken as it stands, as seen where the prop stands; a threshold in lux, and the civil dusk taken when
 * nothing is known, move with the share of sky the sensor sees. Off is the same as on unless given.
 * @param sensor its thresholds: lux 0 or more, altitudes in degrees, skyShare 0..1
 */
export function thresholdsOf(sensor: LightSensor): Thresholds {
  const skyShare = sensor.skyShare ?? 1;
  const shadedDeg = (lux: number) => thresholdAltitudeDeg({ lux, skyShare });
  const defaultDeg = () =>
    skyShare === 1 ? DEFAULT_ON_ALTITUDE_DEG : shadedDeg(luxOfAltitude(DEFAULT_ON_ALTITUDE_DEG));
  const onDeg = sensor.onAltitudeDeg ?? (sensor.onLux === undefined ? defaultDeg() : shadedDeg(sensor.onLux));
  const offDeg = sensor.offAltitudeDeg ?? (sensor.offLux === undefined ? onDeg : shadedDeg(sensor.offLux));
  return { onDeg, offDeg };
}

function sensorSpell(night: Night, thresholds: Thresholds, cutOffHours: number | undefined): Lighting {
  const on = darkSpellIn(night, thresholds.onDeg);
  const off = thresholds.offDeg === thresholds.onDeg ? on : darkSpellIn(night, thresholds.offDeg);
  const onStretch = darkStretch(night, on);
  if (onStretch === null) {
    return { spells: [], reason: 'The sun never sinks low enough this evening to switch it on.' };
  }
  const offStretch = darkStretch(night, off);
  if (offStretch === null || offStretch.untilAt <= onStretch.fromAt) {
    return { spells: [], reason: 'It never gets dark enough this evening to keep it on.' };
  }
  let untilAt = offStretch.untilAt;
  if (cutOffHours !== undefined) {
    if (on.duskAt === null) {
      return {
        spells: [],
        reason: 'It never gets light enough before this evening to set its cut-off again, so it stays off.',
      };
    }
    untilAt = Math.min(untilAt, on.duskAt + cutOffHours * HOUR_MS);
  }
  const staysDark = on.state === 'never-light' && off.dawnAt === null;
  return {
    spells: [{ fromAt: onStretch.fromAt, untilAt }],
    reason: staysDark ? 'The sun never rises high enough this evening to switch it off.' : null,
  };
}

// A night that shares only minutes with the evening has a say in its hours but not in its reason.
function sensorLighting(sensor: LightSensor, { evening, place }: Circumstances): Lighting {
  const thresholds = thresholdsOf(sensor);
  const { startAt, endAt } = eveningSpan(evening, place.timeZone);
  const spells: LitSpell[] = [];
  let reason: string | null = null;
  let longestMs = 0;
  for (const night of nightsDuring(evening, place)) {
    const lighting = sensorSpell(night, thresholds, sensor.cutOffHours);
    spells.push(...lighting.spells);
    const sharedMs = Math.min(night.endAt, endAt) - Math.max(night.startAt, startAt);
    if (sharedMs > longestMs) {
      longestMs = sharedMs;
      reason = lighting.reason;
    }
  }
  return { spells, reason };
}

function clockLighting({ onAt, offAt }: ClockSwitch, { evening, place }: Circumstances): Lighting {
  const [onMinutes, offMinutes] = [minutesOfWallTime(onAt), minutesOfWallTime(offAt)];
  check(
    onMinutes !== null && offMinutes !== null,
    `A clock switches at times like 18:30, not ${onAt}, ${offAt}.`,
  );
  const offDays = offMinutes <= onMinutes ? 1 : 0;
  // Yesterday's spell can reach over midnight into this evening's noon; tomorrow's morning belongs to this evening.
  const dates = [-1, 0, 1].map((days) => addEvenings(evening, days));
  const spells = dates.map((date) => ({
    fromAt: instantOnDate(date, onAt, place.timeZone),
    untilAt: instantOnDate(addEvenings(date, offDays), offAt, place.timeZone),
  }));
  return { spells, reason: null };
}

// Set again since it got its cells, a timer ran from when they went in until then, and from then on by its new count.
function timerLighting(timer: IntervalTimer, circumstances: Circumstances): Lighting {
  const { evening, place, poweredSinceAt } = circumstances;
  const setAt = Math.max(timer.setAt ?? -Infinity, poweredSinceAt);
  checkFinite(setAt, 'setAt or poweredSinceAt');
  const span = eveningSpan(evening, place.timeZone);
  if (Math.min(setAt, poweredSinceAt) >= span.endAt) {
    return { spells: [], reason: 'Its timer is not set yet this evening.' };
  }
  const counted = (startedAt: Instant, untilAt: Instant): LitSpell[] => {
    const spells: LitSpell[] = [];
    const firstTurn = Math.max(0, Math.floor((span.startAt - startedAt) / DAY_MS));
    for (let fromAt = startedAt + firstTurn * DAY_MS; fromAt < untilAt; fromAt += DAY_MS) {
      spells.push({ fromAt, untilAt: Math.min(fromAt + timer.onHours * HOUR_MS, untilAt) });
    }
    return spells;
  };
  const before = Number.isFinite(poweredSinceAt) ? counted(poweredSinceAt, Math.min(setAt, span.endAt)) : [];
  return { spells: [...before, ...counted(setAt, span.endAt + DAY_MS)], reason: null };
}

function handLighting({ evening, place, showNight }: Circumstances): Lighting {
  if (showNight === null) return { spells: [], reason: 'No show this evening, so nobody switches it on.' };
  if (showNight.calledOff) {
    return { spells: [], reason: 'The show is called off this evening, so nobody switches it on.' };
  }
  const fromAt = instantInEvening(evening, showNight.opensAt, place.timeZone);
  const untilAt = instantInEvening(evening, showNight.closesAt, place.timeZone);
  if (untilAt > fromAt) return { spells: [{ fromAt, untilAt }], reason: null };
  return { spells: [], reason: 'The gate closes before it opens within this evening, noon to noon.' };
}

function lightingOf(switching: Switching, circumstances: Circumstances): Lighting {
  switch (switching.kind) {
    case 'light-sensor':
      return sensorLighting(switching, circumstances);
    case 'clock':
      return clockLighting(switching, circumstances);
    case 'interval-timer':
      return timerLighting(switching, circumstances);
    case 'by-hand':
      return handLighting(circumstances);
    case 'always': {
      const { startAt, endAt } = eveningSpan(circumstances.evening, circumstances.place.timeZone);
      return { spells: [{ fromAt: startAt, untilAt: endAt }], reason: null };
    }
  }
}

// In order, within the limits, and joined where they touch or overlap.
function tidied(spells: LitSpell[], limits: LitSpell): LitSpell[] {
  const inside = spells
    .map((spell) => ({
      fromAt: Math.max(spell.fromAt, limits.fromAt),
      untilAt: Math.min(spell.untilAt, limits.untilAt),
    }))
    .filter((spell) => spell.untilAt > spell.fromAt)
    .sort((a, b) => a.fromAt - b.fromAt);
  const joined: LitSpell[] = [];
  for (const spell of inside) {
    const last = joined.at(-1);
    if (last !== undefined && spell.fromAt <= last.untilAt)
      last.untilAt = Math.max(last.untilAt, spell.untilAt);
    else joined.push(spell);
  }
  return joined;
}

/**
 * When a prop is lit in one evening, local noon to local noon.
 * - light sensor: from the dusk of its on-altitude to the dawn of its off-altitude, or for cutOffHours after dusk; in
 *   polar night the whole evening, in midnight sun nothing. With a cut-off and no dusk it never sets itself again.
 * - clock: daily wall times; off at or before on means past midnight; a skipped time moves forward, a repeated one is
 *   the first.
 * - interval timer: onHours in every 86,400 s since it was set or last powered, whatever the clocks do.
 * - by hand: the gate hours of a show night that is not called off. - always: the whole evening.
 * Lengths are differences of instants, so a night with a clock change counts its true hours.
 * @param switching how it is switched; hours 0..24, altitudes in degrees, lux 0 or more, skyShare 0..1
 * @param circumstances the evening, where, its show night if any, and since when the prop has its cells (-Infinity for
 *   ever, except for an interval timer that was never set)
 * @throws ProgrammerError for values outside these ranges
 */
export function litEvening(switching: Switching, circumstances: Circumstances): LitEvening {
  const { evening, place, showNight, poweredSinceAt } = circumstances;
  check(!Number.isNaN(poweredSinceAt), 'poweredSinceAt must be an instant, but is NaN.');
  check(
    showNight === null || showNight.evening === evening,
    `The show night of ${showNight?.evening} says nothing about ${evening}.`,
  );
  const { startAt, endAt } = eveningSpan(evening, place.timeZone);
  if (poweredSinceAt >= endAt) {
    return { spells: [], litHours: 0, reason: 'It has no cells yet this evening.' };
  }
  const { spells, reason } = lightingOf(switching, circumstances);
  const lit = tidied(spells, { fromAt: Math.max(startAt, poweredSinceAt), untilAt: endAt });
  const litMs = lit.reduce((sum, spell) => sum + spell.untilAt - spell.fromAt, 0);
  return { spells: lit, litHours: litMs / HOUR_MS, reason };
}
