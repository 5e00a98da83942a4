import { checkWithin } from './check.ts';

/**
 * The sun through one UT day and half a day to either side, as two cubics in days since 0h UT: the sine of its
 * declination, and its noon turns (how far the true sun runs ahead of the clock, in turns of 24 h).
 */
export type SunDay = { sinDeclination: Cubic; noonTurns: Cubic };
type Cubic = { c0: number; c1: number; c2: number; c3: number };
type SunAtMidnight = { sinDeclination: number; noonTurns: number };

const RAD_PER_DEG = Math.PI / 180;
const ARCSEC_PER_DEG = 3600;
const DAYS_PER_CENTURY = 36_525;
// Days from 1970-01-01 0h UT to 2000-01-01 12h.
const J2000_DAYS = 10_957.5;
// TT - UTC since 2017; a few seconds more or less move the sun by less than 0.3".
const TT_AHEAD_DAYS = 69.184 / 86_400;
// 1899-09 to 2200-04 as days since 1970-01-01.
const TABLE_DAYS = { min: -25_700, max: 84_150 };

// Ours: least-squares fit of what the short theory leaves out, arcseconds of longitude: degrees per century, then the
// cosine's and the sine's share. Fitted to a full ephemeris over 2015..2055; leaves 3.3" rms.
const FITTED_TERMS = [
  [445_267.1, -5.72, 3.019],
  [32_964.4, -7.251, -2.36],
  [45_036.9, -1.653, 5.335],
  [22_518.4, 4.801, 0.839],
  [65_928.7, 2.048, -1.755],
  [9037.5, 0.841, -2.264],
] as const;

function fittedCorrectionDeg(centuries: number): number {
  let arcsec = -8.458 - 2.383 * centuries;
  for (const [degPerCentury, cosArcsec, sinArcsec] of FITTED_TERMS) {
    const angleRad = degPerCentury * centuries * RAD_PER_DEG;
    arcsec += cosArcsec * Math.cos(angleRad) + sinArcsec * Math.sin(angleRad);
  }
  return arcsec / ARCSEC_PER_DEG;
}

/**
 * The sun's apparent place by Meeus, Astronomical Algorithms (2nd ed.), ch. 25 "low accuracy": about 10" in longitude.
 * @param centuries Julian centuries of terrestrial time since J2000
 * @param correctionDeg added to the longitude
 */
export function apparentSun(centuries: number, correctionDeg: number) {
  const t = centuries;
  const meanLongitudeDeg = 280.46646 + t * (36_000.76983 + t * 0.0003032);
  const anomalyRad = (357.52911 + t * (35_999.05029 - t * 0.0001537)) * RAD_PER_DEG;
  const centreDeg =
    (1.914602 - t * (0.004817 + t * 0.000014)) * Math.sin(anomalyRad) +
    (0.019993 - t * 0.000101) * Math.sin(2 * anomalyRad) +
    0.000289 * Math.sin(3 * anomalyRad);
  const nodeRad = (125.04 - 1934.136 * t) * RAD_PER_DEG;
  const nutationDeg = -0.00478 * Math.sin(nodeRad);
  const longitudeDeg = meanLongitudeDeg + centreDeg - 0.00569 + nutationDeg + correctionDeg;
  const obliquityDeg =
    23.439291 - t * (0.0130042 + t * (0.00000016 - t * 0.000000504)) + 0.00256 * Math.cos(nodeRad);
  const longitudeRad = longitudeDeg * RAD_PER_DEG;
  const obliquityRad = obliquityDeg * RAD_PER_DEG;
  return {
    longitudeDeg,
    rightAscensionDeg:
      Math.atan2(Math.cos(obliquityRad) * Math.sin(longitudeRad), Math.cos(longitudeRad)) / RAD_PER_DEG,
    sinDeclination: Math.sin(obliquityRad) * Math.sin(longitudeRad),
    // Equation of the equinoxes: what nutation adds to sidereal time.
    equinoxesDeg: nutationDeg * Math.cos(obliquityRad),
  };
}

function sunAtMidnight(day: number): SunAtMidnight {
  const ut = day - J2000_DAYS;
  const centuries = (ut + TT_AHEAD_DAYS) / DAYS_PER_CENTURY;
  const sun = apparentSun(centuries, fittedCorrectionDeg(centuries));
  // Source: Meeus (12.4), mean sidereal time at Greenwich.
  const siderealDeg = 280.46061837 + 360.98564736629 * ut + 0.000387933 * (ut / DAYS_PER_CENTURY) ** 2;
  const turns = (siderealDeg + sun.equinoxesDeg - sun.rightAscensionDeg) / 360 - 0.5;
  return { sinDeclination: sun.sinDeclination, noonTurns: turns - Math.round(turns) };
}

// The cubic through values at -1, 0, 1 and 2 days (Newton's differences, gathered by powers).
function cubicThrough(values: [number, number, number, number]): Cubic {
  const [before, here, next, after] = values;
  return {
    c0: here,
    c1: next - before / 3 - here / 2 - after / 6,
    c2: (before + next) / 2 - here,
    c3: (after - before) / 6 + (here - next) / 2,
  };
}

// Shared by every place and prop: filled once for each day that is asked about.
const midnights = new Map<number, SunAtMidnight>();
const sunDays = new Map<number, SunDay>();

function keptMidnight(day: number): SunAtMidnight {
  let midnight = midnights.get(day);
  if (midnight === undefined) {
    midnight = sunAtMidnight(day);
    midnights.set(day, midnight);
  }
  return midnight;
}

/**
 * The sun of one UT day. Source: Meeus ch. 25 and ch. 12 with our fitted terms, at four midnights, joined by a cubic.
 * Hour angle good to 1.3 s in 2015..2055, a few seconds elsewhere.
 * @param day days since 1970-01-01, whole, 1899-09 to 2200-04
 * @throws ProgrammerError outside the table
 */
export function sunDayOf(day: number): SunDay {
  let sunDay = sunDays.get(day);
  if (sunDay === undefined) {
    checkWithin(day, 'day', TABLE_DAYS);
    const around = [day - 1, day, day + 1, day + 2].map(keptMidnight);
    sunDay = {
      sinDeclination: cubicThrough(
        around.map((each) => each.sinDeclination) as [number, number, number, number],
      ),
      noonTurns: cubicThrough(around.map((each) => each.noonTurns) as [number, number, number, number]),
    };
    sunDays.set(day, sunDay);
  }
  return sunDay;
}

/** Sine of the declination, `days` (-0.5..1.5) after the day's 0h UT. */
export function sinDeclinationIn(sunDay: SunDay, days: number): number {
  const { c0, c1, c2, c3 } = sunDay.sinDeclination;
  return c0 + days * (c1 + days * (c2 + days * c3));
}

/** Turns by which the true sun runs ahead of UT, `days` (-0.5..1.5) after the day's 0h UT; at most 0.012. */
export function noonTurnsIn(sunDay: SunDay, days: number): number {
  const { c0, c1, c2, c3 } = sunDay.noonTurns;
  return c0 + days * (c1 + days * (c2 + days * c3));
}
