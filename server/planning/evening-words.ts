import { type Evening, weekdayOf } from '../model/evening.ts';

const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** An evening in words: 'Thu 22 Oct'. */
export function eveningWords(evening: Evening): string {
  return `${WEEKDAYS[weekdayOf(evening) - 1]} ${Number(evening.slice(8, 10))} ${MONTHS[Number(evening.slice(5, 7)) - 1]}`;
}

/** A range of evenings in words; `beyond` stands for an end that lies past the season. */
export function rangeWords(range: { early: Evening | null; late: Evening | null }, beyond: string): string {
  if (range.early === null) return beyond;
  if (range.early === range.late) return eveningWords(range.early);
  return `${eveningWords(range.early)} – ${range.late === null ? beyond : eveningWords(range.late)}`;
}
