import { describe, expect, test } from 'vitest';
import { eveningSpan, HOUR_MS } from '../../server/model/evening.ts';
import {
  darkHoursOf,
  darkSpell,
  darkStretch,
  nightOf,
  nightsDuring,
  sunAltitudeDeg,
} from '../../server/model/sun.ts';

const london = { latitudeDeg: 51.5074, longitudeDeg: -0.1278, timeZone: 'Europe/London' };
const tromso = { latitudeDeg: 69.6492, longitudeDeg: 18.9553, timeZone: 'Europe/Oslo' };
const kashgar = { latitudeDeg: 39.4704, longitudeDeg: 75.9898, timeZone: 'Asia/Shanghai' };

describe('dusk and dawn', () => {
  test('the sun stands at the altitude at both', () => {
    for (const place of [london, kashgar]) {
      for (const altitudeDeg of [-0.833, -6, -12]) {
        const { duskAt, dawnAt } = darkSpell('2026-12-24', place, altitudeDeg);
        expect(sunAltitudeDeg(duskAt!, place)).toBeCloseTo(altitudeDeg, 3);
        expect(sunAltitudeDeg(dawnAt!, place)).toBeCloseTo(altitudeDeg, 3);
      }
    }
  });

  test('either name of the date line gives the same night', () => {
    const east = { latitudeDeg: 10, longitudeDeg: 180, timeZone: 'Pacific/Fiji' };
    expect(darkSpell('2026-10-31', { ...east, longitudeDeg: -180 }, -6)).toEqual(
      darkSpell('2026-10-31', east, -6),
    );
  });

  // The local date decides, not the longitude: Kiritimati keeps UTC+14 at 157 deg west.
  test('dusk falls on its own local date at UTC+14', () => {
    const kiritimati = { latitudeDeg: 1.87, longitudeDeg: -157.4, timeZone: 'Pacific/Kiritimati' };
    const { startAt, endAt } = eveningSpan('2026-10-31', kiritimati.timeZone);
    const { duskAt, dawnAt } = darkSpell('2026-10-31', kiritimati, -6);
    expect(duskAt).toBeGreaterThan(startAt);
    expect(dawnAt).toBeLessThan(endAt);
    expect(dawnAt! - duskAt!).toBeGreaterThan(10 * HOUR_MS);
  });

  test('an altitude the sun cannot pass is a state, not an error', () => {
    for (const altitudeDeg of [Infinity, 90, 89]) {
      expect(darkSpell('2026-12-24', london, altitudeDeg).state).toBe('never-light');
    }
    for (const altitudeDeg of [-Infinity, -90, -89]) {
      expect(darkSpell('2026-12-24', london, altitudeDeg).state).toBe('never-dark');
    }
  });

  test.each([
    [{ ...london, latitudeDeg: 90.0001 }, /latitudeDeg.*90.0001/],
    [{ ...london, latitudeDeg: Number.NaN }, /latitudeDeg.*NaN/],
    [{ ...london, longitudeDeg: 181 }, /longitudeDeg.*181/],
    [{ ...london, timeZone: 'EST5' }, /EST5/],
  ])('refuses %o', (place, message) => {
    expect(() => darkSpell('2026-12-24', place, -6)).toThrow(message);
  });

  test('refuses an altitude or instant that is no number, and a date that is none', () => {
    expect(() => darkSpell('2026-12-24', london, Number.NaN)).toThrow(/NaN/);
    expect(() => darkSpell('2026-02-30', london, -6)).toThrow(/2026-02-30/);
    expect(() => sunAltitudeDeg(Number.NaN, london)).toThrow(/NaN/);
    expect(() => sunAltitudeDeg(Infinity, london)).toThrow(/Infinity/);
  });

  test.each([90, -90, 89.99, -89.95, 89.5])(
    'latitude %d answers every evening of a year in one state or another',
    (latitudeDeg) => {
      const place = { latitudeDeg, longitudeDeg: 0, timeZone: 'UTC' };
      const { startAt } = eveningSpan('2026-01-01', 'UTC');
      for (let day = 0; day < 365; day += 1) {
        const evening = new Date(startAt + day * 24 * HOUR_MS).toISOString().slice(0, 10);
        const spell = darkSpell(evening, place, -6);
        expect(spell.duskAt !== null).toBe(spell.state === 'normal' || spell.state === 'dusk-only');
        expect(spell.dawnAt !== null).toBe(spell.state === 'normal' || spell.state === 'dawn-only');
      }
    },
  );
});

describe('nights', () => {
  test('follow each other without a gap and cover the evening', () => {
    for (const place of [london, tromso, kashgar]) {
      const { startAt, endAt } = eveningSpan('2026-10-24', place.timeZone);
      const nights = nightsDuring('2026-10-24', place);
      expect(nights[0]!.startAt).toBeLessThanOrEqual(startAt);
      expect(nights.at(-1)!.endAt).toBeGreaterThanOrEqual(endAt);
      for (let index = 1; index < nights.length; index += 1) {
        expect(nights[index]!.startAt).toBe(nights[index - 1]!.endAt);
      }
    }
  });

  test('the two nights of an evening that lasts 47 h are both there', () => {
    const kwajalein = { latitudeDeg: 9.1, longitudeDeg: 167.3, timeZone: 'Pacific/Kwajalein' };
    const { startAt, endAt } = eveningSpan('1969-09-30', kwajalein.timeZone);
    const long = nightsDuring('1969-09-30', kwajalein).filter(
      (night) => Math.min(night.endAt, endAt) - Math.max(night.startAt, startAt) > 20 * HOUR_MS,
    );
    expect(long).toHaveLength(2);
  });

  test('hours of dark: the whole evening in polar night, none in midnight sun, dusk to dawn between', () => {
    expect(darkHoursOf('2025-12-21', tromso, -0.833)).toBe(24);
    expect(darkHoursOf('2025-06-21', tromso, -0.833)).toBe(0);
    const { duskAt, dawnAt } = darkSpell('2026-10-24', london, -6);
    expect(darkHoursOf('2026-10-24', london, -6)).toBeCloseTo((dawnAt! - duskAt!) / HOUR_MS, 9);
  });

  test('an edge of the night stands in for a missing dusk', () => {
    // data/dusk-dawn-grazing.csv: Tromso 2026-01-14 has a dawn only.
    const night = nightOf('2026-01-14', tromso);
    const spell = darkSpell('2026-01-14', tromso, -0.833);
    expect(darkStretch(night, spell)).toEqual({ fromAt: night.startAt, untilAt: spell.dawnAt });
  });
});
