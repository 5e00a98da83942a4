import { describe, expect, test } from 'vitest';
import { climateOf, climateTemperatureC } from '../../server/model/climate.ts';
import { type Evening, eveningSpan, HOUR_MS } from '../../server/model/evening.ts';
import {
  eveningWeather,
  forecastTrust,
  type ObservedHours,
  seasonWeather,
  type TypedNight,
  temperatureC,
} from '../../server/model/weather.ts';

const place = { latitudeDeg: 52.5, longitudeDeg: 13.4, timeZone: 'Europe/Berlin' };
// A climate that stays at 10 °C makes every other number below plain arithmetic; its spread is 1.25 K by the rule.
const flat = climateOf({ monthlyMinC: Array(12).fill(10), monthlyMaxC: Array(12).fill(10), ...place });
const usual = climateOf({
  monthlyMinC: [-2, -2, 1, 4, 8, 12, 14, 13, 10, 6, 2, -1],
  monthlyMaxC: [3, 5, 9, 15, 20, 23, 25, 25, 20, 14, 8, 4],
  ...place,
});
const asOf = Date.parse('2026-10-20T16:00Z');
const defaults = {
  place,
  climate: flat,
  hours: null,
  typedNights: new Map<Evening, TypedNight>(),
  from: '2026-10-01',
  through: '2026-11-30',
  asOf,
};

/** Hours from 1 October 00:00 UTC on, for so many days. */
function hoursOf(days: number, fill: (hour: number) => number): ObservedHours {
  return {
    startAt: Date.parse('2026-10-01T00:00Z'),
    tempC: Float32Array.from({ length: days * 24 }, (_, hour) => fill(hour)),
  };
}

describe('the climate alone', () => {
  const season = seasonWeather(defaults);

  test('is every evening, with its own spread and the season offset', () => {
    const evening = eveningWeather(season, '2026-10-10');
    expect(evening.source).toBe('climate');
    expect(evening.meanC).toBeCloseTo(10, 9);
    expect(evening.minC).toBeCloseTo(10, 9);
    expect(evening.sigmaC).toBeCloseTo(Math.sqrt(1.25 ** 2 + 0.7 ** 2), 9);
  });

  test('has one sample more than the evening has hours, also where clocks change', () => {
    expect(eveningWeather(season, '2026-10-10').samplesC).toHaveLength(25);
    expect(eveningWeather(season, '2026-10-24').samplesC).toHaveLength(26);
    const spring = seasonWeather({ ...defaults, from: '2027-03-27', through: '2027-03-27' });
    expect(eveningWeather(spring, '2027-03-27').samplesC).toHaveLength(24);
  });

  test('gives the temperature of the climate at any hour, and a straight line between hours', () => {
    const course = seasonWeather({ ...defaults, climate: usual });
    const { startAt } = eveningSpan('2026-10-24', place.timeZone);
    for (let hour = 0; hour < 60; hour++) {
      const at = startAt + hour * HOUR_MS;
      expect(temperatureC(course, at)).toBeCloseTo(climateTemperatureC(usual, at), 9);
      const half = (temperatureC(course, at) + temperatureC(course, at + HOUR_MS)) / 2;
      expect(temperatureC(course, at + HOUR_MS / 2)).toBeCloseTo(half, 9);
    }
  });

  test('answers inside its evenings only', () => {
    const { startAt } = eveningSpan('2026-10-01', place.timeZone);
    const { endAt } = eveningSpan('2026-11-30', place.timeZone);
    expect(temperatureC(season, startAt)).toBeCloseTo(10, 9);
    expect(temperatureC(season, endAt)).toBeCloseTo(10, 9);
    expect(() => temperatureC(season, startAt - 1)).toThrow(/outside/);
    expect(() => temperatureC(season, endAt + 1)).toThrow(/outside/);
    expect(() => eveningWeather(season, '2026-12-01')).toThrow(/outside/);
    expect(() => seasonWeather({ ...defaults, through: '2026-09-30' })).toThrow(/forward/);
  });

  test('has a night that is colder than its evening, and a mean over the whole of one without a sunset', () => {
    const course = eveningWeather(seasonWeather({ ...defaults, climate: usual }), '2026-10-10');
    const wholeC = course.samplesC.slice(0, 24).reduce((sum, each) => sum + each, 0) / 24;
    expect(course.meanC).toBeLessThan(wholeC - 0.5);
    expect(course.minC).toBeCloseTo(Math.min(...course.samplesC), 1);

    const north = { latitudeDeg: 69.65, longitudeDeg: 18.96, timeZone: 'Europe/Oslo' };
    const light = { ...defaults, place: north, climate: usual, from: '2026-06-20', through: '2026-06-20' };
    const { samplesC, meanC } = eveningWeather(seasonWeather(light), '2026-06-20');
    const inner = samplesC.slice(1, 24).reduce((sum, each) => sum + each, 0);
    expect(meanC).toBeCloseTo((inner + (samplesC[0]! + samplesC[24]!) / 2) / 24, 9);
  });
});

describe('imported hours', () => {
  test('are taken as they are up to now, with the error of a station', () => {
    const season = seasonWeather({ ...defaults, hours: hoursOf(25, () => 4) });
    const evening = eveningWeather(season, '2026-10-12');
    expect(evening).toMatchObject({ source: 'observed', sigmaC: 0.7 });
    expect(evening.meanC).toBeCloseTo(4, 6);
  });

  // Blended night = 10 + rho (4 - 10), with the rho table of the model notes: .95 .92 .88 ... .15, 0 from day 13.
  test.each([
    ['2026-10-20', 1, 0.95],
    ['2026-10-21', 2, 0.92],
    ['2026-10-25', 6, 0.67],
    ['2026-10-31', 12, 0.15],
  ])('of %s, %i days ahead, count by %f', (evening, _lead, rho) => {
    const season = seasonWeather({ ...defaults, hours: hoursOf(60, () => 4) });
    const found = eveningWeather(season, evening);
    expect(found.source).toBe('forecast');
    if (evening !== '2026-10-20') expect(found.meanC).toBeCloseTo(10 - 6 * rho, 6);
    expect(found.sigmaC).toBeCloseTo(Math.hypot(1.25 * Math.sqrt(1 - rho ** 2), 0.7), 9);
  });

  test('of tonight are observed up to now and forecast from now on', () => {
    const season = seasonWeather({ ...defaults, hours: hoursOf(60, () => 4) });
    expect(temperatureC(season, asOf - HOUR_MS)).toBeCloseTo(4, 6);
    expect(temperatureC(season, asOf + 2 * HOUR_MS)).toBeCloseTo(10 - 6 * 0.95, 6);
  });

  test('more than 12 days ahead are not used', () => {
    const season = seasonWeather({ ...defaults, hours: hoursOf(60, () => 4) });
    const found = eveningWeather(season, '2026-11-01');
    expect(found.source).toBe('climate');
    expect(found.meanC).toBeCloseTo(10, 9);
  });

  test('of a night whose dawn has not come yet are no observation', () => {
    const early = { ...defaults, hours: hoursOf(60, () => 4), asOf: Date.parse('2026-10-21T04:00Z') };
    expect(eveningWeather(seasonWeather(early), '2026-10-20').source).toBe('forecast');
    const late = { ...early, asOf: Date.parse('2026-10-21T07:00Z') };
    expect(eveningWeather(seasonWeather(late), '2026-10-20').source).toBe('observed');
  });

  test('may miss three hours in a row: the line between stands in', () => {
    // 12 October 18, 19 and 20 h UTC are missing; 4 °C before, 8 °C after.
    const gap = 11 * 24 + 18;
    const hours = hoursOf(19, (hour) => (hour < gap ? 4 : hour < gap + 3 ? Number.NaN : 8));
    const season = seasonWeather({ ...defaults, hours });
    expect(eveningWeather(season, '2026-10-12').source).toBe('observed');
    const middleAt = hours.startAt + (gap + 1) * HOUR_MS;
    expect(temperatureC(season, middleAt)).toBeCloseTo(6, 1);
    expect(temperatureC(season, middleAt - HOUR_MS)).toBeCloseTo(5, 1);
  });

  test.each([
    [3, 'observed'],
    [4, 'climate'],
  ])('with %i of every few missing make an evening %s', (missing, source) => {
    const hours = hoursOf(19, (hour) => (hour % (missing + 1) === 0 ? 4 : Number.NaN));
    expect(eveningWeather(seasonWeather({ ...defaults, hours }), '2026-10-12').source).toBe(source);
  });

  test('that miss a day leave it to the climate and what the edges tell of it', () => {
    const gap = 11 * 24 + 12;
    const hours = hoursOf(19, (hour) => (hour >= gap && hour < gap + 71 ? Number.NaN : 4));
    const season = seasonWeather({ ...defaults, hours });
    expect(eveningWeather(season, '2026-10-13')).toMatchObject({ source: 'climate' });
    // 36 h from both edges, each known 6 K below the climate: persistence of 0.6 a day bridges to
    // 6 * 2 f / (1 + f²) with f = 0.6 ** 1.5, the mean of a first-order autoregression between two equal ends.
    const f = 0.6 ** 1.5;
    const middleAt = hours.startAt + (gap + 35) * HOUR_MS;
    expect(temperatureC(season, middleAt)).toBeCloseTo(10 - (6 * 2 * f) / (1 + f * f), 6);
  });

  test('make an evening known from 18 hours on', () => {
    // The evening of 12 October is 12:00 to 12:00 local, 10:00 to 10:00 UTC; the hours end inside it.
    const endingAfter = (known: number) =>
      eveningWeather(
        seasonWeather({
          ...defaults,
          hours: { startAt: Date.parse('2026-10-01T00:00Z'), tempC: new Float32Array(11 * 24 + 10 + known) },
        }),
        '2026-10-12',
      ).source;
    expect(endingAfter(17)).toBe('climate');
    expect(endingAfter(18)).toBe('observed');
  });

  test('fall between the samples of a zone half an hour off', () => {
    const india = { latitudeDeg: 28.6, longitudeDeg: 77.2, timeZone: 'Asia/Kolkata' };
    const hours = hoursOf(25, (hour) => hour % 24);
    const season = seasonWeather({ ...defaults, place: india, hours });
    // 12:00 in India is 06:30 UTC.
    expect(eveningWeather(season, '2026-10-05').samplesC[0]).toBeCloseTo(6.5, 5);
    expect(temperatureC(season, Date.parse('2026-10-05T08:00Z'))).toBeCloseTo(8, 5);
  });

  test('that lie wholly outside the season change nothing', () => {
    const elsewhere = { startAt: Date.parse('2020-01-01T00:00Z'), tempC: new Float32Array(500) };
    expect(eveningWeather(seasonWeather({ ...defaults, hours: elsewhere }), '2026-10-05').source).toBe(
      'climate',
    );
  });
});

describe('a typed night', () => {
  const typedNights = new Map([
    ['2026-10-12', { minC: -5, maxC: 3 }],
    ['2026-10-22', { minC: -5, maxC: 3 }],
    ['2026-11-20', { minC: 2, maxC: 2 }],
  ]);

  test('beats hours and climate, past and to come', () => {
    const season = seasonWeather({ ...defaults, typedNights, hours: hoursOf(60, () => 25) });
    expect(eveningWeather(season, '2026-10-12')).toMatchObject({ source: 'observed', sigmaC: 0.5 });
    const ahead = eveningWeather(season, '2026-10-22');
    expect(ahead.source).toBe('forecast');
    expect(ahead.meanC).toBeLessThan(3);
    expect(ahead.sigmaC).toBeCloseTo(Math.hypot(1.25 * Math.sqrt(1 - 0.88 ** 2), 0.5), 9);
    expect(eveningWeather(season, '2026-11-20').sigmaC).toBeCloseTo(Math.hypot(1.25, 0.5), 9);
    expect(eveningWeather(season, '2026-11-20').meanC).toBeCloseTo(2, 9);
  });

  test.each([
    ['the usual course of a day', usual],
    ['a flat climate', flat],
  ])('has the typed low and high among the hours of the night, on %s', (_, climate) => {
    const season = seasonWeather({ ...defaults, climate, typedNights });
    const { samplesC, startAt, meanC, minC } = eveningWeather(season, '2026-10-12');
    // Sunset in Berlin on 12 October 2026 is about 18:18 CEST and sunrise about 07:28 (from memory of an almanac): hours 7 to 19.
    const night = samplesC.slice(7, 20);
    expect(Math.min(...night)).toBeCloseTo(-5, 9);
    expect(Math.max(...night)).toBeCloseTo(3, 9);
    expect(night[0]).toBeCloseTo(3, 9);
    expect(temperatureC(season, startAt + 7 * HOUR_MS)).toBeCloseTo(3, 9);
    expect(meanC).toBeGreaterThan(-5);
    expect(meanC).toBeLessThan(3);
    expect(minC).toBeCloseTo(-5, 1);
  });

  test('does not blow up the day around an uneven night', () => {
    const wild = new Map([['2026-10-12', { minC: -15, maxC: 20 }]]);
    const season = seasonWeather({ ...defaults, climate: usual, typedNights: wild });
    expect(Math.max(...eveningWeather(season, '2026-10-12').samplesC)).toBeLessThan(30);
  });

  test('is refused with its high below its low', () => {
    const upside = new Map([['2026-10-12', { minC: 3, maxC: -5 }]]);
    expect(() => seasonWeather({ ...defaults, typedNights: upside })).toThrow(/below/);
  });
});

test('trust in a forecast falls day by day and ends after twelve', () => {
  // Rho by lead day, from the model notes: a judgement, no measurement.
  expect([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13].map(forecastTrust)).toEqual([
    0.95, 0.92, 0.88, 0.83, 0.76, 0.67, 0.58, 0.48, 0.39, 0.3, 0.22, 0.15, 0,
  ]);
});
