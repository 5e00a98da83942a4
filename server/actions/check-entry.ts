import { DAY_MS, eveningsBetween, type Instant, isEvening, localDateOf } from '../model/evening.ts';
import { dateWords } from '../planning/evening-words.ts';
import { yearFaults } from './known-years.ts';
import type { Fault } from './refusal.ts';

// Phones may run ahead, and a zone may be set wrong; more than a day is another date.
const FURTHEST_AHEAD_MS = DAY_MS;
// A slip of day and month is worth asking about when it leads to a recent date.
const RECENT_EVENINGS = 60;

/**
 * What is wrong with the moment something is said to have happened.
 * @param at the moment
 * @param options.now the present
 * @param options.timeZone the site's, for the dates in the answer
 */
export function momentFaults(at: Instant, options: { now: Instant; timeZone: string }): Fault[] {
  const { now, timeZone } = options;
  const unknown = yearFaults(at, 'at');
  if (unknown.length > 0) return unknown;
  if (at <= now + FURTHEST_AHEAD_MS) return [];
  const date = localDateOf(at, timeZone);
  const today = localDateOf(now, timeZone);
  const days = eveningsBetween(today, date);
  const swapped = `${date.slice(0, 4)}-${date.slice(8)}-${date.slice(5, 7)}`;
  const since = isEvening(swapped) ? eveningsBetween(swapped, today) : -1;
  const guess = since >= 0 && since <= RECENT_EVENINGS ? dateWords(swapped) : `today, ${dateWords(today)}`;
  const message = `This is dated ${dateWords(date)}, ${days} days ahead. Was it ${guess}?`;
  return [{ field: 'at', message }];
}
