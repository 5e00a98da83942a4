import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import {
  addDays,
  dateWords,
  eveningAhead,
  eveningOf,
  instantOfStamp,
  minutesPastNoon,
  momentWords,
  moveDays,
  nightsBetween,
  wallStamp,
  wallTime,
} from '../../../web/words/time.ts';

// The pages reckon wall times with Intl alone; luxon is the outside reference.
const ZONES = [
  'Europe/London',
  'America/New_York',
  'Australia/Lord_Howe',
  'Asia/Kathmandu',
  'Pacific/Apia',
  'UTC',
];
const anInstant = fc.integer({ min: Date.UTC(2024, 0, 1), max: Date.UTC(2030, 0, 1) });

describe('moments in the zone of the site', () => {
  it('shows what luxon shows on the wall', () => {
    fc.assert(
      fc.property(anInstant, fc.constantFrom(...ZONES), (at, zone) => {
        const reference = DateTime.fromMillis(at, { zone });
        expect(wallStamp(at, zone)).toBe(reference.toFormat("yyyy-MM-dd'T'HH:mm"));
        expect(wallTime(at, zone)).toBe(reference.toFormat('HH:mm'));
      }),
    );
  });

  it('finds the moment of a stamp again, to the minute', () => {
    fc.assert(
      fc.property(anInstant, fc.constantFrom(...ZONES), (at, zone) => {
        const found = instantOfStamp(wallStamp(at, zone), zone)!;
        // A wall time shown twice gives the first: an hour earlier, half an hour on Lord Howe Island.
        const late = Math.floor(at / 60_000) - found / 60_000;
        expect([0, 30, 60]).toContain(late);
        expect(wallStamp(found, zone)).toBe(wallStamp(at, zone));
      }),
    );
  });

  // Clock changes of the European Union: directive 2000/84/EC, 01:00 UTC on the last Sunday of March and October.
  it.each([
    ['2026-10-25T01:30', '2026-10-25T00:30:00Z', 'shown twice: the first'],
    ['2026-10-25T02:30', '2026-10-25T02:30:00Z', 'after the change'],
    ['2026-03-29T01:30', '2026-03-29T01:30:00Z', 'skipped: as far behind the gap'],
    ['2026-03-29T02:30', '2026-03-29T01:30:00Z', 'after the gap'],
  ])('%s in London is %s (%s)', (stamp, instant) => {
    expect(instantOfStamp(stamp, 'Europe/London')).toBe(Date.parse(instant));
  });

  it.each(['2026-02-30T10:00', '2026-13-01T10:00', '', 'tomorrow'])('%j is no stamp', (stamp) => {
    expect(instantOfStamp(stamp, 'Europe/London')).toBeNull();
  });

  it('moves by days on the wall, not by 24 hours', () => {
    const before = Date.parse('2026-10-24T08:00:00Z');
    expect(wallStamp(moveDays(before, 1, 'Europe/London'), 'Europe/London')).toBe('2026-10-25T09:00');
    expect(moveDays(before, 1, 'Europe/London') - before).toBe(25 * 3_600_000);
  });
});

describe('evenings', () => {
  // By definition an evening runs from noon of its date to noon of the day after; after-midnight deeds belong to the one before.
  it.each([
    ['2026-10-23T00:40', '2026-10-22', '2026-10-22'],
    ['2026-10-23T05:59', '2026-10-22', '2026-10-22'],
    ['2026-10-23T06:00', '2026-10-22', '2026-10-23'],
    ['2026-10-23T11:59', '2026-10-22', '2026-10-23'],
    ['2026-10-23T12:00', '2026-10-23', '2026-10-23'],
    ['2026-10-23T23:59', '2026-10-23', '2026-10-23'],
  ])('%s belongs to %s, and tonight means %s', (stamp, evening, ahead) => {
    const at = instantOfStamp(stamp, 'Europe/London')!;
    expect(eveningOf(at, 'Europe/London')).toBe(evening);
    expect(eveningAhead(at, 'Europe/London')).toBe(ahead);
  });

  it('counts days as the calendar does', () => {
    const aDate = fc.date({ min: new Date('1950-01-01'), max: new Date('2150-01-01'), noInvalidDate: true });
    fc.assert(
      fc.property(aDate, fc.integer({ min: -900, max: 900 }), (date, days) => {
        const from = date.toISOString().slice(0, 10);
        const reference = DateTime.fromISO(from, { zone: 'utc' }).plus({ days });
        expect(addDays(from, days)).toBe(reference.toISODate());
        expect(nightsBetween(from, addDays(from, days))).toBe(days);
      }),
    );
  });

  it('says them in words', () => {
    // 22 October 2026 is a Thursday: any printed calendar.
    expect(dateWords('2026-10-22')).toBe('Thu 22 Oct');
    expect(momentWords(Date.parse('2026-10-22T08:00:00Z'), 'Europe/London')).toBe('Thu 22 Oct 2026, 09:00');
  });

  it.each([
    ['12:00', 0],
    ['18:30', 390],
    ['00:00', 720],
    ['11:59', 1439],
  ])('%s is %d minutes past noon', (wall, minutes) => {
    expect(minutesPastNoon(wall)).toBe(minutes);
  });
});
