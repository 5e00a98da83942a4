import { type Instant, isEvening } from '../model/evening.ts';
import { AFTER_KNOWN_AT, FIRST_KNOWN_AT, FIRST_KNOWN_YEAR, LAST_KNOWN_YEAR } from '../model/known-years.ts';
import type { Fault } from './refusal.ts';

/**
 * Says when a text is no evening one can ask about.
 * @param evening what was given
 * @param field how the asker calls it
 */
export function eveningFaults(evening: string, field: string): Fault[] {
  const year = Number(evening.slice(0, 4));
  if (isEvening(evening) && year >= FIRST_KNOWN_YEAR && year <= LAST_KNOWN_YEAR) return [];
  const message = `${JSON.stringify(evening.slice(0, 20))} is no date of the calendar between ${FIRST_KNOWN_YEAR} and ${LAST_KNOWN_YEAR}. Dates are written year, month, day: '2026-10-25'.`;
  return [{ field, message }];
}

/**
 * Says when a moment is outside the years one can ask about.
 * @param at the moment
 * @param field how the asker calls it
 */
export function yearFaults(at: Instant, field: string): Fault[] {
  if (at >= FIRST_KNOWN_AT && at < AFTER_KNOWN_AT) return [];
  const side =
    at < FIRST_KNOWN_AT ? `before the year ${FIRST_KNOWN_YEAR}` : `after the year ${LAST_KNOWN_YEAR}`;
  const message = `This moment is ${side}. Is the year right, and the clock of the phone or computer set?`;
  return [{ field, message }];
}
