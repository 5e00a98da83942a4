import fc from 'fast-check';
import { expect, test } from 'vitest';
import {
  addEvenings,
  eveningOf,
  eveningSpan,
  formatInstant,
  parseInstant,
} from '../../server/model/evening.ts';
import { darkSpell } from '../../server/model/sun.ts';
import type { Switching } from '../../server/model/switching.ts';
import { litEvening } from '../../server/model/switching.ts';

const DAY_MS = 86_400_000;
const zones = fc.constantFrom(
  ...Intl.supportedValuesOf('timeZone').filter((_, index) => index % 9 === 0),
  'Pacific/Apia',
  'Pacific/Kwajalein',
  'Pacific/Kiritimati',
  'Australia/Lord_Howe',
  'Pacific/Chatham',
  'America/St_Johns',
  'Africa/Casablanca',
  'Europe/Dublin',
  'Antarctica/Troll',
  'Asia/Gaza',
);
const instants = fc.integer({ min: Date.UTC(1920, 0, 1), max: Date.UTC(2150, 0, 1) });
const evenings = fc
  .integer({ min: 0, max: 40 * 365 })
  .map((days) => new Date(Date.UTC(2015, 0, 1) + days * DAY_MS).toISOString().slice(0, 10));
const latitudes = fc.double({ min: -90, max: 90, noNaN: true });
const longitudes = fc.double({ min: -180, max: 180, noNaN: true });
const clockTimes = fc
  .integer({ min: 0, max: 1439 })
  .map((minutes) => new Date(minutes * 60_000).toISOString().slice(11, 16));

test('every instant is in exactly one evening, in any zone and year', () => {
  fc.assert(
    fc.property(instants, zones, (at, timeZone) => {
      const evening = eveningOf(at, timeZone);
      const span = eveningSpan(evening, timeZone);
      expect(span.startAt).toBeLessThanOrEqual(at);
      expect(at).toBeLessThan(span.endAt);
      expect(eveningSpan(addEvenings(evening, 1), timeZone).startAt).toBe(span.endAt);
      expect(eveningSpan(addEvenings(evening, -1), timeZone).endAt).toBe(span.startAt);
    }),
    { numRuns: 800 },
  );
});

test('the wall clock shows noon when an evening begins', () => {
  fc.assert(
    fc.property(evenings, zones, (evening, timeZone) => {
      const { startAt, endAt } = eveningSpan(evening, timeZone);
      expect(endAt - startAt).toBeGreaterThanOrEqual(23 * 3_600_000);
      expect(endAt - startAt).toBeLessThanOrEqual(25 * 3_600_000);
      const shown = new Intl.DateTimeFormat('sv-SE', { timeZone, dateStyle: 'short', timeStyle: 'short' });
      expect(shown.format(startAt)).toBe(`${evening} 12:00`);
    }),
    { numRuns: 300 },
  );
});

test('an instant survives being written and read', () => {
  fc.assert(
    fc.property(instants, (at) => {
      expect(parseInstant(formatInstant(at))).toBe(at);
      expect(Date.parse(formatInstant(at))).toBe(at);
    }),
  );
});

test('a deeper altitude has a later dusk, an earlier dawn, and never more dark', () => {
  const altitudes = fc.double({ min: -18, max: 5, noNaN: true });
  fc.assert(
    fc.property(
      evenings,
      latitudes,
      longitudes,
      altitudes,
      altitudes,
      (evening, latitudeDeg, longitudeDeg, a, b) => {
        const place = { latitudeDeg, longitudeDeg, timeZone: 'UTC' };
        const shallow = darkSpell(evening, place, Math.max(a, b));
        const deep = darkSpell(evening, place, Math.min(a, b));
        if (shallow.state === 'never-dark') expect(deep.state).toBe('never-dark');
        if (deep.state === 'never-light') expect(shallow.state).toBe('never-light');
        if (shallow.duskAt !== null && deep.duskAt !== null) {
          expect(deep.duskAt).toBeGreaterThanOrEqual(shallow.duskAt - 50);
        }
        if (shallow.dawnAt !== null && deep.dawnAt !== null) {
          expect(deep.dawnAt).toBeLessThanOrEqual(shallow.dawnAt + 50);
        }
      },
    ),
    { numRuns: 2000 },
  );
});

test('either name of the date line gives the same night', () => {
  fc.assert(
    fc.property(evenings, latitudes, zones, (evening, latitudeDeg, timeZone) => {
      const east = darkSpell(evening, { latitudeDeg, longitudeDeg: 180, timeZone }, -6);
      const west = darkSpell(evening, { latitudeDeg, longitudeDeg: -180, timeZone }, -6);
      expect(west).toEqual(east);
    }),
    { numRuns: 500 },
  );
});

const switchings: fc.Arbitrary<Switching> = fc.oneof(
  fc.record(
    {
      kind: fc.constant('light-sensor' as const),
      onLux: fc.double({ min: 0.01, max: 1000, noNaN: true }),
      offLux: fc.double({ min: 0.01, max: 1000, noNaN: true }),
      skyShare: fc.double({ min: 0.02, max: 1, noNaN: true }),
      cutOffHours: fc.double({ min: 0.5, max: 24, noNaN: true }),
    },
    { requiredKeys: ['kind'] },
  ),
  fc.record({ kind: fc.constant('clock' as const), onAt: clockTimes, offAt: clockTimes }),
  fc.record({
    kind: fc.constant('interval-timer' as const),
    onHours: fc.double({ min: 0.5, max: 24, noNaN: true }),
  }),
  fc.constant({ kind: 'always' as const }),
);

test('lit spells are in order, apart, inside the evening and after the cells went in', () => {
  fc.assert(
    fc.property(
      switchings,
      evenings,
      latitudes,
      longitudes,
      zones,
      instants,
      (switching, evening, latitudeDeg, longitudeDeg, timeZone, since) => {
        const span = eveningSpan(evening, timeZone);
        // Half of the time within a week of the evening, where it matters.
        const poweredSinceAt = since % 2 === 0 ? since : span.startAt + (since % (7 * DAY_MS));
        const place = { latitudeDeg, longitudeDeg, timeZone };
        const answer = litEvening(switching, { evening, place, showNight: null, poweredSinceAt });
        let lastAt = Math.max(span.startAt, poweredSinceAt) - 1;
        let litMs = 0;
        for (const { fromAt, untilAt } of answer.spells) {
          expect(fromAt).toBeGreaterThan(lastAt);
          expect(untilAt).toBeGreaterThan(fromAt);
          expect(untilAt).toBeLessThanOrEqual(span.endAt);
          lastAt = untilAt;
          litMs += untilAt - fromAt;
        }
        expect(answer.litHours).toBeCloseTo(litMs / 3_600_000, 9);
      },
    ),
    { numRuns: 1000 },
  );
});
