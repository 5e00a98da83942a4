import { describe, expect, test } from 'vitest';
import { DAY_MS } from '../../server/model/evening.ts';
import { altitudeOfLux, luxOfAltitude } from '../../server/model/light-threshold.ts';
import { darkSpell, darkStretch, nightOf, sunAltitudeDeg } from '../../server/model/sun.ts';
import { apparentSun, noonTurnsIn, sinDeclinationIn, sunDayOf } from '../../server/model/sun-day.ts';
import { holdTo } from './accuracy.ts';
import { grazingNights, rowsOf, tableNights } from './dusk-dawn-table.ts';

const RAD_PER_DEG = Math.PI / 180;
const degOf = (rad: number) => rad / RAD_PER_DEG;
const secondsApart = (at: number | null, text: string) =>
  at === null ? Number.NaN : Math.abs(at - Date.parse(text)) / 1000;
const meanOf = (values: number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;

// What the README promises, in one place. Table and conventions: data/README.md.
const ALLOWED = { tableMeanSeconds: 0.5, tableMaxSeconds: 5, grazingMeanDeg: 0.001, grazingMaxDeg: 0.01 };

describe('dusk and dawn against three ephemerides (data/dusk-dawn.csv)', () => {
  const nights = tableNights().map((night) => ({
    ...night,
    spell: darkSpell(night.evening, night.place, night.altitudeDeg),
  }));
  const crossings = nights.flatMap(({ name, dusk, dawn, spell, toleranceSeconds }) => [
    { name: `${name} dusk`, expected: dusk, at: spell.duskAt, toleranceSeconds },
    { name: `${name} dawn`, expected: dawn, at: spell.dawnAt, toleranceSeconds },
  ]);

  test('the table is whole', () => {
    expect(nights).toHaveLength(1120);
  });

  test('a crossing is there exactly where the ephemerides have one', () => {
    const wrong = crossings.filter(({ expected, at }) => expected.endsWith('Z') !== (at !== null));
    expect(wrong).toEqual([]);
    for (const { spell, dusk, dawn } of nights) {
      if (dusk === 'never dark') expect(spell.state).toBe('never-dark');
      if (dusk === 'never light') expect(spell.state).toBe('never-light');
      if (dusk.endsWith('Z') && dawn === 'never light') expect(spell.state).toBe('dusk-only');
    }
  });

  test('every crossing lies within its tolerance, and well within it on average', (context) => {
    const present = crossings.filter(({ expected }) => expected.endsWith('Z'));
    expect(present.length).toBeGreaterThan(2000);
    const differences = present.map(({ expected, at }) => (at! - Date.parse(expected)) / 1000);
    const apart = differences.map(Math.abs);
    holdTo(
      { maxAbs: ALLOWED.tableMaxSeconds },
      { context, what: 'dusk and dawn', against: 'three ephemerides, 10 places', unit: 's', differences },
    );
    expect(present.filter(({ toleranceSeconds }, index) => !(apart[index]! <= toleranceSeconds))).toEqual([]);
    expect(meanOf(apart)).toBeLessThan(ALLOWED.tableMeanSeconds);
  });

  test('the dark lasts as long', () => {
    for (const { name, evening, place, spell, darkSeconds, toleranceSeconds } of nights) {
      const dark = darkStretch(nightOf(evening, place), spell);
      const seconds = dark === null ? 0 : (dark.untilAt - dark.fromAt) / 1000;
      expect(Math.abs(seconds - darkSeconds), name).toBeLessThanOrEqual(2 * toleranceSeconds);
    }
  });
});

describe('nights on which the sun grazes the altitude (data/dusk-dawn-grazing.csv)', () => {
  const nights = grazingNights().map((night) => ({
    ...night,
    spell: darkSpell(night.evening, night.place, night.altitudeDeg),
  }));

  test('every night is in the right state, down to a margin of some thousandths of a degree', () => {
    expect(nights).toHaveLength(130);
    expect(nights.filter(({ state, spell }) => state !== spell.state)).toEqual([]);
  });

  test('every crossing lies within 0.01 deg of altitude', (context) => {
    const apartDeg = nights.flatMap(({ crossings, spell }) =>
      crossings.map(({ sense, at, degPerHour }) => {
        const ourAt = sense === 'd' ? spell.duskAt : spell.dawnAt;
        return (Math.abs((ourAt ?? Number.NaN) - at) / 3_600_000) * degPerHour;
      }),
    );
    expect(apartDeg.length).toBeGreaterThan(100);
    expect(meanOf(apartDeg)).toBeLessThan(ALLOWED.grazingMeanDeg);
    holdTo(
      { maxAbs: ALLOWED.grazingMaxDeg },
      {
        context,
        what: 'the same where the sun only grazes the altitude',
        against: 'two ephemerides',
        unit: '°',
        differences: apartDeg,
      },
    );
  });
});

describe('worked examples', () => {
  // Reda & Andreas, Solar Position Algorithm, NREL/TP-560-34302, appendix A.5: 2003-10-17 12:30:30 UTC-7.
  const golden = { latitudeDeg: 39.742476, longitudeDeg: -105.1786, timeZone: 'Etc/GMT+7' };

  test('NREL: the altitude that goes with the declination and hour angle printed there', () => {
    const [declinationRad, hourRad] = [-9.31434 * RAD_PER_DEG, 11.105902 * RAD_PER_DEG];
    const latitudeRad = golden.latitudeDeg * RAD_PER_DEG;
    const printedDeg = degOf(
      Math.asin(
        Math.sin(latitudeRad) * Math.sin(declinationRad) +
          Math.cos(latitudeRad) * Math.cos(declinationRad) * Math.cos(hourRad),
      ),
    );
    const altitudeDeg = sunAltitudeDeg(Date.parse('2003-10-17T12:30:30-07:00'), golden);
    expect(Math.abs(altitudeDeg - printedDeg)).toBeLessThan(0.003);
    // Printed there with parallax (0.0019 deg at this altitude), before refraction: e0 = 39.872046.
    expect(Math.abs(altitudeDeg - 0.0019 - 39.872046)).toBeLessThan(0.003);
  });

  test('NREL: sunrise and sunset; the sunset printed is that of the UT day, so the evening before', () => {
    const spell = darkSpell('2003-10-16', golden, -0.8333);
    expect(secondsApart(spell.duskAt, '2003-10-16T17:20:19-07:00')).toBeLessThan(5);
    expect(secondsApart(spell.dawnAt, '2003-10-17T06:12:43-07:00')).toBeLessThan(5);
    // By ERFA sunset comes 87 s earlier a day later.
    const next = darkSpell('2003-10-17', golden, -0.8333);
    expect(secondsApart(next.duskAt, '2003-10-17T17:18:52-07:00')).toBeLessThan(5);
  });

  // Reda & Andreas, as above, table of sunrise and sunset at longitude 0, UTC.
  test.each([
    ['1994-01-02', 35, '1994-01-02T07:08:12Z', '1994-01-02T16:59:55Z', '1994-01-01'],
    ['1996-07-05', -35, '1996-07-05T07:08:15Z', '1996-07-05T17:01:04Z', '1996-07-04'],
    ['2004-12-04', -35, '2004-12-04T04:38:57Z', '2004-12-04T19:02:02Z', '2004-12-03'],
  ])('NREL: %s at latitude %d', (date, latitudeDeg, sunrise, sunset, dateBefore) => {
    const place = { latitudeDeg, longitudeDeg: 0, timeZone: 'UTC' };
    expect(secondsApart(darkSpell(date, place, -0.8333).duskAt, sunset)).toBeLessThan(5);
    expect(secondsApart(darkSpell(dateBefore, place, -0.8333).dawnAt, sunrise)).toBeLessThan(5);
  });

  // Meeus, Astronomical Algorithms, 2nd ed., example 25.a: 1992-10-13 0h TD, JDE 2448908.5.
  test('Meeus 25.a: apparent longitude 199d54m32s, right ascension 13h13m31.4s, declination -7d47m06s', () => {
    const sun = apparentSun((2_448_908.5 - 2_451_545) / 36_525, 0);
    const longitudeDeg = ((sun.longitudeDeg % 360) + 360) % 360;
    const rightAscensionDeg = (sun.rightAscensionDeg + 360) % 360;
    expect(Math.abs(longitudeDeg - (199 + 54 / 60 + 32 / 3600)) * 3600).toBeLessThan(0.6);
    expect(Math.abs(rightAscensionDeg - 15 * (13 + 13 / 60 + 31.4 / 3600)) * 3600).toBeLessThan(1.5);
    expect(Math.abs(degOf(Math.asin(sun.sinDeclination)) + 7 + 47 / 60 + 6 / 3600) * 3600).toBeLessThan(0.6);
  });

  // Meeus example 25.b, the same instant to high accuracy: declination -7d47m01.74s; confirmed with ERFA (-7d47m01.72s).
  // Example 28.b: equation of time +13m42.7s. 0h TD was 59 s before 0h UT.
  test('Meeus 25.b and 28.b: declination within 10 arcseconds, equation of time within 2 s', () => {
    const day = Date.UTC(1992, 9, 13) / DAY_MS;
    const sunDay = sunDayOf(day);
    const declinationDeg = degOf(Math.asin(sinDeclinationIn(sunDay, -59 / 86_400)));
    expect(Math.abs(declinationDeg + 7 + 47 / 60 + 1.74 / 3600) * 3600).toBeLessThan(10);
    expect(Math.abs(noonTurnsIn(sunDay, -59 / 86_400) * 86_400 - (13 * 60 + 42.7))).toBeLessThan(2);
  });

  // U.S. Naval Observatory almanac for Atlanta, 2009-09-06 EDT, to the minute, as quoted in the PyEphem manual.
  test('USNO: Atlanta to the printed minute', () => {
    const atlanta = { latitudeDeg: 33.8, longitudeDeg: -84.4, timeZone: 'America/New_York' };
    const of = (evening: string, altitudeDeg: number) => darkSpell(evening, atlanta, altitudeDeg);
    expect(secondsApart(of('2009-09-05', -6).dawnAt, '2009-09-06T06:50:00-04:00')).toBeLessThan(35);
    expect(secondsApart(of('2009-09-05', -0.833).dawnAt, '2009-09-06T07:15:00-04:00')).toBeLessThan(35);
    expect(secondsApart(of('2009-09-06', -0.833).duskAt, '2009-09-06T19:56:00-04:00')).toBeLessThan(35);
    expect(secondsApart(of('2009-09-06', -6).duskAt, '2009-09-06T20:21:00-04:00')).toBeLessThan(35);
  });

  // ERFA 2.0.0, by the conventions of data/README.md. The sun climbs 0.4 deg a day there: 0.01 deg is 36 min.
  test('the poles see the sun cross an altitude once in half a year', () => {
    const north = { latitudeDeg: 90, longitudeDeg: 0, timeZone: 'Etc/GMT-12' };
    const south = { latitudeDeg: -90, longitudeDeg: 0, timeZone: 'Antarctica/South_Pole' };
    const sunup = darkSpell('2026-03-18', north, -0.833);
    expect(sunup.state).toBe('dawn-only');
    expect(secondsApart(sunup.dawnAt, '2026-03-18T12:13:00Z')).toBeLessThan(2160);
    const dusk = darkSpell('2026-10-08', north, -6);
    expect(dusk.state).toBe('dusk-only');
    expect(secondsApart(dusk.duskAt, '2026-10-08T12:13:00Z')).toBeLessThan(2160);
    const sundown = darkSpell('2026-03-22', south, -0.833);
    expect(sundown.state).toBe('dusk-only');
    expect(secondsApart(sundown.duskAt, '2026-03-22T17:22:00Z')).toBeLessThan(2160);
    expect(darkSpell('2026-06-21', north, -0.833).state).toBe('never-dark');
    expect(darkSpell('2026-06-21', south, -0.833).state).toBe('never-light');
  });

  // ERFA 2.0.0, by the conventions of data/README.md.
  test.each([
    ['polar night, yet a civil twilight', 'Tromso', '2025-12-21', -6, 70_710],
    ['a white night at sunset', 'Helsinki', '2026-06-21', -0.833, 18_249],
    ['the same white night at civil dusk', 'Helsinki', '2026-06-21', -6, 4763],
    ['a night with a clock change', 'New York', '2026-10-31', -6, 45_372],
    ['southern summer at Christmas', 'Sydney', '2025-12-24', -6, 31_057],
  ])('%s', (_, name, evening, altitudeDeg, darkSeconds) => {
    const { place } = tableNights().find((night) => night.name.startsWith(name))!;
    const { duskAt, dawnAt } = darkSpell(evening, place, altitudeDeg);
    expect(Math.abs((dawnAt! - duskAt!) / 1000 - darkSeconds)).toBeLessThan(10);
  });

  test('dusk after midnight stays with its evening: Reykjavik, 2024-06-20, 00:03:57 on the 21st', () => {
    const reykjavik = { latitudeDeg: 64.1466, longitudeDeg: -21.9426, timeZone: 'Atlantic/Reykjavik' };
    const { duskAt } = darkSpell('2024-06-20', reykjavik, -0.833);
    expect(secondsApart(duskAt, '2024-06-21T00:03:57Z')).toBeLessThan(12);
  });
});

describe('light under the open sky', () => {
  const rows = rowsOf('lux-to-altitude.csv').map((row) => ({
    lux: Number(row.lux),
    cubicDeg: Number(row.alt_deg_explsuppl_cubic),
    chebyshevDeg: Number(row.alt_deg_usno_chebyshev),
    spreadDeg: Number(row.spread_deg),
  }));

  test('the altitude of a light, by the cubics of the Explanatory Supplement', () => {
    expect(rows.length).toBeGreaterThan(40);
    for (const { lux, cubicDeg } of rows) {
      expect(Math.abs(altitudeOfLux(lux) - cubicDeg), `${lux} lux`).toBeLessThan(0.001);
    }
  });

  // The independent fit. Stated agreement of the two: 0.033 in log10 from -12 to 5 deg, 8 %.
  test('the other fit to the same measurements agrees to 8 % where sensors switch', () => {
    for (const { lux, chebyshevDeg } of rows.filter(({ lux }) => lux >= 0.01 && lux <= 4000)) {
      expect(Math.abs(Math.log10(luxOfAltitude(chebyshevDeg) / lux)), `${lux} lux`).toBeLessThan(0.034);
    }
  });

  // Glossary of Meteorology (American Meteorological Society), "twilight": lux at the ends of the twilights.
  test('the classical lights of the twilights', () => {
    expect(luxOfAltitude(-0.833)).toBeGreaterThan(410);
    expect(luxOfAltitude(-0.833)).toBeLessThan(585);
    expect(luxOfAltitude(-6)).toBeGreaterThan(2);
    expect(luxOfAltitude(-6)).toBeLessThan(3.5);
    expect(luxOfAltitude(-12)).toBeCloseTo(0.008, 3);
    expect(luxOfAltitude(-18)).toBeCloseTo(6e-4, 4);
  });
});
