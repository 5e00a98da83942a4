import { type Instant, isEvening } from '../model/evening.ts';
import type { Fault } from './refusal.ts';

// The model knows 1900 to 2199; keeping well inside, the evening before and the sunrise after are always known too.
const FIRST_YEAR = 2000;
const LAST_YEAR = 2150;
const FIRST_AT = Date.UTC(FIRST_YEAR, 0, 1);
const AFTER_LAST_AT = Date.UTC(LAST_YEAR + 1, 0, 1);

/**
 * Says when a text is no evening one can ask about.
 * @param evening what was given
 * @param field how the asker calls it
 */
export function eveningFaults(evening: string, field: string): Fault[] {
  const year = Number(evening.slice(0, 4));
  if (isEvening(evening) && year >= FIRST_YEAR && year <= LAST_YEAR) return [];
  const message = `${JSON.stringify(evening.slice(0, 20))} is no date of the calendar between ${FIRST_YEAR} and ${LAST_YEAR}. Dates are written year, month, day: '2026-10-25'.`;
  return [{ field, message }];
}

/**
 * Says when a moment is outside the years one can ask about.
 * @param at the moment
 * @param field how the asker calls it
 */
export function yearFaults(at: Instant, field: string): Fault[] {
  if (at >= FIRST_AT && at < AFTER_LAST_AT) return [];
  const side = at < FIRST_AT ? `before the year ${FIRST_YEAR}` : `after the year ${LAST_YEAR}`;
  const message = `This moment is ${side}. Is the year right, and the clock of the phone or computer set?`;
  return [{ field, message }];
}
