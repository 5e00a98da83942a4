import { describe, expect, test } from 'vitest';
import { altitudeOfLux, luxOfAltitude, thresholdAltitudeDeg } from '../../server/model/light-threshold.ts';

describe('light and altitude', () => {
  test('more light means a higher sun, without exception', () => {
    let lastDeg = -Infinity;
    for (let logLux = -4; logLux < 5.2; logLux += 0.001) {
      const altitudeDeg = altitudeOfLux(10 ** logLux);
      expect(altitudeDeg).toBeGreaterThanOrEqual(lastDeg);
      lastDeg = altitudeDeg;
    }
  });

  test('the altitude of a light has that light, to the 1 % by which the seams disagree', () => {
    for (let lux = 0.001; lux < 120_000; lux *= 1.01) {
      expect(Math.abs(luxOfAltitude(altitudeOfLux(lux)) / lux - 1)).toBeLessThan(0.011);
    }
  });

  // The seams of the published table: 10.41-10.44 and 4499-4538 lux belong to no altitude.
  test('light between two segments is the seam', () => {
    expect(altitudeOfLux(10.425)).toBeCloseTo(-5, 3);
    expect(altitudeOfLux(4520)).toBeCloseTo(5, 3);
  });

  test('more light than the sun gives, and less than the curve knows', () => {
    expect(altitudeOfLux(1e6)).toBe(Infinity);
    expect(altitudeOfLux(1e-4)).toBe(-Infinity);
    expect(altitudeOfLux(0)).toBe(-Infinity);
  });

  test('refuses what is no light', () => {
    expect(() => altitudeOfLux(-1)).toThrow(/-1/);
    expect(() => altitudeOfLux(Number.NaN)).toThrow(/NaN/);
    expect(() => luxOfAltitude(91)).toThrow(/91/);
    expect(() => thresholdAltitudeDeg({ lux: 10, skyShare: 1.5 })).toThrow(/1.5/);
  });
});

describe('a sensor under leaves or a porch', () => {
  // data/lux-to-altitude.csv: 10 lux -5.036, 20 lux -4.391, 100 lux -2.743.
  test.each([
    [1, -5.036],
    [0.5, -4.391],
    [0.1, -2.743],
  ])('10 lux with %d of the sky', (skyShare, altitudeDeg) => {
    expect(thresholdAltitudeDeg({ lux: 10, skyShare })).toBeCloseTo(altitudeDeg, 2);
  });

  test('sees no sky, is always dark', () => {
    expect(thresholdAltitudeDeg({ lux: 10, skyShare: 0 })).toBe(Infinity);
  });
});
