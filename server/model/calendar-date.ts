// Calendar dates as day numbers, without any zone. A day number counts days since 1970-01-01.

/**
 * Day number of a date in the Gregorian calendar.
 * Source: H. Hinnant, "chrono-Compatible Low-Level Date Algorithms", days_from_civil.
 * @param year the year
 * @param month 1..12
 * @param day 1..31
 */
export function dayNumber(year: number, month: number, day: number): number {
  const shifted = month <= 2 ? year - 1 : year;
  const era = Math.floor(shifted / 400);
  const yearOfEra = shifted - era * 400;
  const dayOfYear = Math.floor((153 * (month > 2 ? month - 3 : month + 9) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146_097 + dayOfEra - 719_468;
}

/**
 * The date of a day number, 'YYYY-MM-DD', years 0..9999. Source: as above, civil_from_days.
 * @param days whole days since 1970-01-01
 */
export function dateOfDayNumber(days: number): string {
  const shifted = days + 719_468;
  const era = Math.floor(shifted / 146_097);
  const dayOfEra = shifted - era * 146_097;
  const yearOfEra = Math.floor(
    (dayOfEra -
      Math.floor(dayOfEra / 1460) +
      Math.floor(dayOfEra / 36_524) -
      Math.floor(dayOfEra / 146_096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const shiftedMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const day = dayOfYear - Math.floor((153 * shiftedMonth + 2) / 5) + 1;
  const month = shiftedMonth < 10 ? shiftedMonth + 3 : shiftedMonth - 9;
  const year = yearOfEra + era * 400 + (month <= 2 ? 1 : 0);
  return `${padded(year, 4)}-${padded(month, 2)}-${padded(day, 2)}`;
}

/** A whole number written with leading zeros to a width. */
export function padded(value: number, width: number): string {
  return String(value).padStart(width, '0');
}

function isLeap(year: number): boolean {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
}

const MONTH_DAYS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];

/** Whether the Gregorian calendar has this date. */
export function isRealDate(year: number, month: number, day: number): boolean {
  if (month < 1 || month > 12 || day < 1) return false;
  return day <= (month === 2 && isLeap(year) ? 29 : MONTH_DAYS[month - 1]!);
}

/** The number written in `count` digits of a text from a place on; NaN where they are not all digits. */
export function digitsAt(text: string, from: number, count: number): number {
  let value = 0;
  for (let place = from; place < from + count; place += 1) {
    const digit = text.charCodeAt(place) - 48;
    if (!(digit >= 0 && digit <= 9)) return Number.NaN;
    value = value * 10 + digit;
  }
  return value;
}

/**
 * Day number of a date written 'YYYY-MM-DD'; NaN where it is no real date.
 * By character codes, since every prop asks this for every evening.
 */
export function dayNumberOf(text: string): number {
  if (text.length !== 10 || text.charCodeAt(4) !== 45 || text.charCodeAt(7) !== 45) return Number.NaN;
  const year = digitsAt(text, 0, 4);
  const month = digitsAt(text, 5, 2);
  const day = digitsAt(text, 8, 2);
  return isRealDate(year, month, day) ? dayNumber(year, month, day) : Number.NaN;
}
