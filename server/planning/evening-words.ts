import { type Evening, weekdayOf } from '../model/evening.ts';

const WEEKDAYS = ['Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat', 'Sun'];
/** January first. */
export const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];

/** An evening in words: 'Thu 22 Oct'. */
export function eveningWords(evening: Evening): string {
  return `${WEEKDAYS[weekdayOf(evening) - 1]} ${dayWords(evening)}`;
}

/** A date with its year: '22 Oct 2026'. */
export function dateWords(date: Evening): string {
  return `${dayWords(date)} ${date.slice(0, 4)}`;
}

function dayWords(date: Evening): string {
  return `${Number(date.slice(8))} ${MONTHS[Number(date.slice(5, 7)) - 1]!.slice(0, 3)}`;
}

/** A range of evenings in words; `beyond` stands for an end that lies past the season. */
export function rangeWords(range: { early: Evening | null; late: Evening | null }, beyond: string): string {
  if (range.early === null) return beyond;
  if (range.early === range.late) return eveningWords(range.early);
  return `${eveningWords(range.early)} – ${range.late === null ? beyond : eveningWords(range.late)}`;
}
