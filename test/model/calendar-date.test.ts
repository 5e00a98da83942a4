import { expect, test } from 'vitest';
import { dateOfDayNumber, dayNumber, isRealDate } from '../../server/model/calendar-date.ts';

// Against the calendar of the JavaScript engine (ECMA-262: Date counts days of the proleptic Gregorian calendar).
function engineDay(year: number, month: number, day: number): number {
  const date = new Date(0);
  date.setUTCFullYear(year, month - 1, day);
  return date.getTime() / 86_400_000;
}

test('day numbers are those of the engine, both ways, from year 0 to 9999', () => {
  let tried = 0;
  for (let day = engineDay(0, 1, 1); day <= engineDay(9999, 12, 31); day += 61) {
    const date = new Date(day * 86_400_000);
    expect(dateOfDayNumber(day)).toBe(date.toISOString().slice(0, 10));
    expect(dayNumber(date.getUTCFullYear(), date.getUTCMonth() + 1, date.getUTCDate())).toBe(day);
    tried += 1;
  }
  expect(tried).toBeGreaterThan(59_000);
});

test.each([1900, 2000, 2023, 2024, 2100])('29 February %i is a date only if the engine has one', (year) => {
  const inMarch = engineDay(year, 2, 29) === engineDay(year, 3, 1);
  expect(isRealDate(year, 2, 29)).toBe(!inMarch);
});
