import { check, checkWithin } from './check.ts';

/** log10 of lux = c0 + c1 x + c2 x^2 + c3 x^3, x = altitude / 90 deg, between two altitudes. */
type Segment = { fromDeg: number; toDeg: number; c0: number; c1: number; c2: number; c3: number };

// Source: Explanatory Supplement to the Astronomical Almanac (Seidelmann, ed., 1992), ch. 9, illuminance on level ground
// under a clear sky, after Brown (1952). From dark to bright. Good to 0.02 in log10 (5 %).
const SEGMENTS: readonly Segment[] = [
  { fromDeg: -18, toDeg: -12, c0: 13.84, c1: 262.72, c2: 1447.42, c3: 2797.93 },
  { fromDeg: -12, toDeg: -5, c0: 2.7, c1: 12.17, c2: -431.69, c3: -1899.83 },
  { fromDeg: -5, toDeg: -0.8, c0: 2.88, c1: 21.81, c2: -258.11, c3: -858.36 },
  { fromDeg: -0.8, toDeg: 5, c0: 2.88, c1: 22.26, c2: -207.64, c3: 1034.3 },
  { fromDeg: 5, toDeg: 20, c0: 3.05, c1: 13.28, c2: -45.98, c3: 64.33 },
  { fromDeg: 20, toDeg: 90, c0: 3.74, c1: 3.97, c2: -4.07, c3: 1.47 },
];

const DARKEST_DEG = -18;
// Halvings that bring the widest segment below a millionth of a degree.
const HALVINGS = 27;

function logLuxIn(segment: Segment, altitudeDeg: number): number {
  const x = altitudeDeg / 90;
  return segment.c0 + x * (segment.c1 + x * (segment.c2 + x * segment.c3));
}

/**
 * Light on level ground under a clear open sky.
 * Source: the six cubics above. Below -18 deg it stays at what the curve gives there (0.0006 lux), since starlight, the
 * moon and street lamps then outshine the sun.
 * @param altitudeDeg altitude of the sun's centre, -90..90
 * @returns lux; at a seam the darker segment speaks (the seams disagree by up to 1 %)
 * @throws ProgrammerError outside -90..90
 */
export function luxOfAltitude(altitudeDeg: number): number {
  checkWithin(altitudeDeg, 'altitudeDeg', { min: -90, max: 90 });
  const litDeg = Math.max(altitudeDeg, DARKEST_DEG);
  const segment = SEGMENTS.find((each) => litDeg <= each.toDeg)!;
  return 10 ** logLuxIn(segment, litDeg);
}

/**
 * The altitude of the sun at which the open sky gives a light.
 * Ours: the cubics inverted one by one; light that falls between two of them is the seam itself (0.015 deg at most).
 * Below about 0.3 lux moon and street lamps decide, not the sun.
 * @param lux light on level ground, 0 or more
 * @returns degrees; Infinity for light the sun never gives, -Infinity for less than the curve's darkest
 * @throws ProgrammerError for negative lux
 */
export function altitudeOfLux(lux: number): number {
  check(lux >= 0, `lux must be 0 or more, but is ${lux}.`);
  const logLux = Math.log10(lux);
  if (logLux < logLuxIn(SEGMENTS[0]!, DARKEST_DEG)) return -Infinity;
  const segment = SEGMENTS.find((each) => logLux <= logLuxIn(each, each.toDeg));
  if (segment === undefined) return Infinity;
  let { fromDeg, toDeg } = segment;
  for (let halving = 0; halving < HALVINGS; halving += 1) {
    const middleDeg = (fromDeg + toDeg) / 2;
    if (logLuxIn(segment, middleDeg) < logLux) fromDeg = middleDeg;
    else toDeg = middleDeg;
  }
  return (fromDeg + toDeg) / 2;
}

/**
 * The altitude of the sun at which a sensor that sees part of the sky reads its threshold.
 * Ours: the sensor gets skyShare of the open sky's light, so the open sky must fall to lux / skyShare.
 * @param lux threshold at the sensor, 0 or more
 * @param skyShare share of the open sky's light that reaches it, 0..1 (leaves, porch, cloud)
 * @returns degrees; Infinity where even full sun leaves the sensor in the dark, -Infinity where no night is dark enough
 * @throws ProgrammerError outside these ranges
 */
export function thresholdAltitudeDeg({ lux, skyShare }: { lux: number; skyShare: number }): number {
  checkWithin(skyShare, 'skyShare', { min: 0, max: 1 });
  return skyShare === 0 ? Infinity : altitudeOfLux(lux / skyShare);
}
