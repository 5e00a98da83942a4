import { describe, expect, test } from 'vitest';
import {
  addEvenings,
  DAY_MS,
  eveningOf,
  eveningSpan,
  eveningsBetween,
  eveningsFrom,
  formatInstant,
  HOUR_MS,
  instantInEvening,
  instantOnDate,
  isEvening,
  isTimeZone,
  localNoonAt,
  parseInstant,
  standardOffsetHours,
  wallTimeOf,
  weekdayOf,
} from '../../server/model/evening.ts';

const utc = (text: string) => Date.parse(text);
const hoursOf = (evening: string, timeZone: string) => {
  const { startAt, endAt } = eveningSpan(evening, timeZone);
  return (endAt - startAt) / HOUR_MS;
};

describe('calendar', () => {
  // The Gregorian rule: 2000 is a leap year, 1900 and 2100 are not.
  test.each([
    ['2024-02-29', true],
    ['2000-02-29', true],
    ['2100-02-29', false],
    ['1900-02-29', false],
    ['2026-02-30', false],
    ['2026-04-31', false],
    ['2026-13-01', false],
    ['2026-00-10', false],
    ['1899-12-31', false],
    ['2200-01-01', false],
    ['2026-1-05', false],
    ['2026/10/25', false],
    ['2026-10-25T', false],
    ['20261025', false],
    ['', false],
    ['٢٠٢٦-10-25', false],
  ])('"%s" is an evening: %s', (text, expected) => {
    expect(isEvening(text)).toBe(expected);
  });

  // ECMAScript's own calendar is the reference.
  test('evenings are counted as Date counts UTC days, over four centuries of month ends', () => {
    for (let day = utc('1900-01-01T00:00Z'); day < utc('2199-12-01T00:00Z'); day += 17 * DAY_MS) {
      const date = new Date(day);
      const text = date.toISOString().slice(0, 10);
      expect(addEvenings(text, 17)).toBe(new Date(day + 17 * DAY_MS).toISOString().slice(0, 10));
      expect(weekdayOf(text) % 7).toBe(date.getUTCDay());
    }
  });

  test('counting and listing', () => {
    expect(eveningsBetween('2026-12-30', '2027-01-02')).toBe(3);
    expect(eveningsBetween('2027-01-02', '2026-12-30')).toBe(-3);
    expect(eveningsFrom('2028-02-28', '2028-03-01')).toEqual(['2028-02-28', '2028-02-29', '2028-03-01']);
    expect(eveningsFrom('2026-10-25', '2026-10-25')).toEqual(['2026-10-25']);
    expect(eveningsFrom('2026-10-25', '2026-10-24')).toEqual([]);
    expect(() => addEvenings('2026-02-30', 1)).toThrow(/2026-02-30/);
    expect(() => addEvenings('2026-02-20', 0.5)).toThrow(/0.5/);
  });
});

describe('zones', () => {
  // Names and links of the IANA tz database (files europe, northamerica, backward).
  test.each([
    'Europe/London',
    'Arctic/Longyearbyen',
    'Asia/Calcutta',
    'Asia/Kolkata',
    'US/Eastern',
    'America/Argentina/Buenos_Aires',
    'Etc/GMT+7',
    'UTC',
  ])('%s is a zone', (name) => {
    expect(isTimeZone(name)).toBe(true);
  });

  test.each(['EST5', '+02:00', '-0500', 'UTC+2', 'Europe/Nowhere', '', ' ', 'local', 'Europe/London '])(
    '"%s" is none',
    (name) => {
      expect(isTimeZone(name)).toBe(false);
      expect(() => eveningSpan('2026-10-25', name)).toThrow(/IANA/);
    },
  );

  // Directive 2000/84/EC; the US Energy Policy Act of 2005; tz database, file australasia (Lord Howe, Chatham).
  test.each([
    ['Europe/London', '2026-10-24', 25],
    ['Europe/London', '2026-10-25', 24],
    ['Europe/London', '2026-03-28', 23],
    ['America/New_York', '2026-10-31', 25],
    ['America/New_York', '2024-03-09', 23],
    ['Australia/Lord_Howe', '2025-04-05', 24.5],
    ['Australia/Lord_Howe', '2026-10-03', 23.5],
    ['Pacific/Chatham', '2026-04-04', 25],
    ['UTC', '2026-10-24', 24],
  ])('%s: the evening of %s lasts %d h', (timeZone, evening, hours) => {
    expect(hoursOf(evening, timeZone)).toBe(hours);
  });

  test('an evening begins at local noon', () => {
    expect(formatInstant(localNoonAt('2026-10-25', 'Europe/London'))).toBe('2026-10-25T12:00:00Z');
    expect(formatInstant(localNoonAt('2026-10-25', 'Pacific/Kiritimati'))).toBe('2026-10-24T22:00:00Z');
    expect(formatInstant(localNoonAt('2026-07-01', 'America/St_Johns'))).toBe('2026-07-01T14:30:00Z');
  });

  // tz database, file australasia: Samoa went from -10 to +14 at the end of 2011-12-29.
  test('a date that a zone never had is an empty evening', () => {
    const noonAfter = utc('2011-12-30T22:00:00Z');
    expect(eveningSpan('2011-12-30', 'Pacific/Apia')).toEqual({ startAt: noonAfter, endAt: noonAfter });
    expect(hoursOf('2011-12-29', 'Pacific/Apia')).toBe(24);
    expect(eveningOf(noonAfter - 1, 'Pacific/Apia')).toBe('2011-12-29');
    expect(eveningOf(noonAfter, 'Pacific/Apia')).toBe('2011-12-31');
  });

  // tz database, file australasia: Kwajalein went from +11 to -12 at the start of 1969-10-01.
  test('a date that a zone had twice is one long evening', () => {
    expect(hoursOf('1969-09-30', 'Pacific/Kwajalein')).toBe(47);
    expect(eveningOf(utc('1969-09-30T20:00:00Z'), 'Pacific/Kwajalein')).toBe('1969-09-30');
  });

  test('after midnight belongs to the evening before', () => {
    expect(eveningOf(utc('2026-10-25T00:59:00Z'), 'Europe/London')).toBe('2026-10-24');
    expect(eveningOf(utc('2026-10-25T11:59:59Z'), 'Europe/London')).toBe('2026-10-24');
    expect(eveningOf(utc('2026-10-25T12:00:00Z'), 'Europe/London')).toBe('2026-10-25');
  });

  test('standard time, wherever summer is', () => {
    expect(standardOffsetHours('Europe/London', 2026)).toBe(0);
    expect(standardOffsetHours('America/New_York', 2026)).toBe(-5);
    expect(standardOffsetHours('Australia/Sydney', 2026)).toBe(10);
    expect(standardOffsetHours('Asia/Kathmandu', 2026)).toBe(5.75);
  });
});

describe('wall times', () => {
  test('from noon on they lie on the date, before noon on the next', () => {
    expect(formatInstant(instantInEvening('2026-10-24', '18:30', 'Europe/London'))).toBe(
      '2026-10-24T17:30:00Z',
    );
    expect(formatInstant(instantInEvening('2026-10-24', '00:30', 'Europe/London'))).toBe(
      '2026-10-24T23:30:00Z',
    );
    expect(formatInstant(instantInEvening('2026-10-24', '12:00', 'Europe/London'))).toBe(
      '2026-10-24T11:00:00Z',
    );
    expect(formatInstant(instantInEvening('2026-10-24', '11:59', 'Europe/London'))).toBe(
      '2026-10-25T11:59:00Z',
    );
  });

  // As RFC 5545 section 3.3.5 reads a local time: the first of two, and a skipped one by the offset before the gap.
  test('a repeated time is the first, a skipped time moves forward', () => {
    expect(formatInstant(instantInEvening('2026-10-24', '01:30', 'Europe/London'))).toBe(
      '2026-10-25T00:30:00Z',
    );
    expect(formatInstant(instantInEvening('2026-03-28', '01:30', 'Europe/London'))).toBe(
      '2026-03-29T01:30:00Z',
    );
    expect(wallTimeOf(utc('2026-03-29T01:30:00Z'), 'Europe/London')).toBe('02:30');
    expect(formatInstant(instantOnDate('2024-03-10', '02:30', 'America/New_York'))).toBe(
      '2024-03-10T07:30:00Z',
    );
  });

  test('never outside the evening, not even where its date was skipped', () => {
    const { endAt } = eveningSpan('2011-12-30', 'Pacific/Apia');
    expect(instantInEvening('2011-12-30', '18:30', 'Pacific/Apia')).toBe(endAt);
  });

  test.each(['24:00', '18:60', '8:30', '18.30', '18:3', ''])('"%s" is no wall time', (text) => {
    expect(() => instantInEvening('2026-10-25', text, 'UTC')).toThrow(/18:30/);
  });

  // Intl.DateTimeFormat is the reference.
  test.each([
    'Europe/London',
    'Pacific/Chatham',
    'America/St_Johns',
    'Africa/Casablanca',
    'Australia/Lord_Howe',
  ])('%s: wall clocks show what Intl shows', (timeZone) => {
    const clock = new Intl.DateTimeFormat('en-GB', {
      timeZone,
      hour: '2-digit',
      minute: '2-digit',
      hourCycle: 'h23',
    });
    for (let at = utc('1995-01-01T00:07Z'); at < utc('2035-01-01T00:00Z'); at += 61 * HOUR_MS) {
      expect(wallTimeOf(at, timeZone)).toBe(clock.format(at));
    }
  });
});

describe('instants as text', () => {
  // The examples of RFC 3339 section 5.8 that are no leap seconds; Date is the reference for their value.
  test.each(['1985-04-12T23:20:50.52Z', '1996-12-19T16:39:57-08:00', '1937-01-01T12:00:27.87+00:20'])(
    'reads %s',
    (text) => {
      expect(parseInstant(text)).toBe(Date.parse(text));
    },
  );

  test('finer than a millisecond is cut off; letters may be small', () => {
    expect(parseInstant('2026-10-25t17:30:00.1239z')).toBe(Date.UTC(2026, 9, 25, 17, 30, 0, 123));
  });

  test.each([
    '2026-02-30T12:00:00Z',
    '2026-10-25T24:00:00Z',
    '2026-10-25T17:60:00Z',
    '1990-12-31T23:59:60Z',
    '2026-10-25T17:30:00',
    '2026-10-25 17:30:00Z',
    '2026-10-25T17:30Z',
    '2026-10-25',
    '2026-10-25T17:30:00+25:00',
    '2026-10-25T17:30:00+01:75',
    '2026-10-25T17:30:00+0100',
    '1899-12-31T12:00:00Z',
    '2200-01-01T00:00:00Z',
    'tomorrow',
    '',
  ])('refuses "%s"', (text) => {
    expect(parseInstant(text)).toBeNull();
  });

  test('writes UTC, with milliseconds only where there are any', () => {
    expect(formatInstant(Date.UTC(2026, 9, 25, 17, 30))).toBe('2026-10-25T17:30:00Z');
    expect(formatInstant(Date.UTC(2026, 9, 25, 17, 30, 0, 7))).toBe('2026-10-25T17:30:00.007Z');
    expect(formatInstant(Date.UTC(1969, 11, 31, 23, 59, 59, 999))).toBe('1969-12-31T23:59:59.999Z');
    expect(() => formatInstant(Number.NaN)).toThrow(/NaN/);
  });
});
