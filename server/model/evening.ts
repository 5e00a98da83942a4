import { IANAZone } from 'luxon';
import { dateOfDayNumber, dayNumber, dayNumberOf, digitsAt, isRealDate, padded } from './calendar-date.ts';
import { check, checkFinite } from './check.ts';

/** A moment: milliseconds since 1970-01-01T00:00:00Z, leap seconds not counted. */
export type Instant = number;

/** A date, '2026-10-25', that stands for the night after it: noon of that day to noon of the day after, by the zone's clock. */
export type Evening = string;

export const HOUR_MS = 3_600_000;
export const DAY_MS = 24 * HOUR_MS;

const MINUTE_MS = 60_000;
const NOON_MS = 12 * HOUR_MS;
const FIRST_YEAR = 1900;
const LAST_YEAR = 2199;
// Farthest an instant can lie from its own wall time read as UTC; real offsets stay within 15 h 14 min.
const WIDEST_OFFSET_MS = 16 * HOUR_MS;

function checkedDayNumber(evening: Evening): number {
  const days = dayNumberOf(evening);
  if (Number.isNaN(days)) check(false, `An evening is a real date like 2026-10-25, but "${evening}" is not.`);
  return days;
}

/**
 * Whether a text is an evening this service works with: a real calendar date, written YYYY-MM-DD.
 * @param text what was typed
 * @returns false outside 1900..2199, where neither the zones nor the sun are worth asking
 */
export function isEvening(text: string): boolean {
  const year = digitsAt(text, 0, 4);
  return year >= FIRST_YEAR && year <= LAST_YEAR && !Number.isNaN(dayNumberOf(text));
}

/**
 * The calendar date at an instant: up to noon the evening's own name is still that of the day before.
 * @param at the instant
 * @param timeZone IANA zone
 * @throws ProgrammerError outside 1900..2199 or for an unknown zone
 */
export function localDateOf(at: Instant, timeZone: string): Evening {
  const evening = eveningOf(at, timeZone);
  return wallTimeOf(at, timeZone) < '12:00' ? addEvenings(evening, 1) : evening;
}

/**
 * The evening so many evenings later; calendar arithmetic only.
 * @param evening where to start
 * @param count evenings to go on, negative to go back
 */
export function addEvenings(evening: Evening, count: number): Evening {
  check(Number.isInteger(count), `Evenings are counted whole, but the count is ${count}.`);
  return dateOfDayNumber(checkedDayNumber(evening) + count);
}

/**
 * How many evenings lie from one to another: 0 for the same, negative when `through` comes first.
 * @param from the first evening
 * @param through the last evening
 */
export function eveningsBetween(from: Evening, through: Evening): number {
  return checkedDayNumber(through) - checkedDayNumber(from);
}

/**
 * Every evening from one to another, both included; none when `through` comes first.
 * @param from the first evening
 * @param through the last evening
 */
export function eveningsFrom(from: Evening, through: Evening): Evening[] {
  const first = checkedDayNumber(from);
  const count = Math.max(0, checkedDayNumber(through) - first + 1);
  return Array.from({ length: count }, (_, index) => dateOfDayNumber(first + index));
}

/**
 * The ISO weekday of an evening: 1 Monday to 7 Sunday.
 * @param evening the evening
 */
export function weekdayOf(evening: Evening): 1 | 2 | 3 | 4 | 5 | 6 | 7 {
  const sinceMonday = (((checkedDayNumber(evening) + 3) % 7) + 7) % 7;
  return (sinceMonday + 1) as 1 | 2 | 3 | 4 | 5 | 6 | 7;
}

// ---- Zone offsets ----

/** From this instant on, wall clocks show UTC plus this much. */
type OffsetChange = { fromAt: Instant; offsetMs: number };
type ZoneOffsets = {
  zone: IANAZone;
  stretches: Map<number, OffsetChange[]>;
  /** The last answer, and how long it holds: most questions come from one season, one after the other. */
  unchangedFromAt: Instant;
  unchangedUntilAt: Instant;
  unchangedMs: number;
};

// One question to Intl costs thousands of nanoseconds, so each zone is asked for a stretch at once, and the few changes
// found are kept.
const ASKED_EVERY_DAYS = 5;
const STRETCH_DAYS = 80 * ASKED_EVERY_DAYS;
const STRETCH_MS = STRETCH_DAYS * DAY_MS;
const MOST_ZONES_KEPT = 1000;
const zonesKept = new Map<string, ZoneOffsets>();
let lastAsked: { timeZone: string; offsets: ZoneOffsets } | null = null;

/**
 * Whether a text names a time zone of the IANA database, older names and links included.
 * @param text what was typed; bare offsets ('+02:00') and rules ('EST5') are no zone, since they know no clock changes
 */
export function isTimeZone(text: string): boolean {
  return /^[A-Za-z][A-Za-z0-9_+\-/]*$/.test(text) && IANAZone.isValidZone(text);
}

function offsetsOf(timeZone: string): ZoneOffsets {
  if (lastAsked?.timeZone === timeZone) return lastAsked.offsets;
  let offsets = zonesKept.get(timeZone);
  if (offsets === undefined) {
    check(isTimeZone(timeZone), `"${timeZone}" is no IANA time zone.`);
    if (zonesKept.size >= MOST_ZONES_KEPT) zonesKept.clear();
    offsets = {
      zone: IANAZone.create(timeZone),
      stretches: new Map(),
      unchangedFromAt: 0,
      unchangedUntilAt: 0,
      unchangedMs: 0,
    };
    zonesKept.set(timeZone, offsets);
  }
  lastAsked = { timeZone, offsets };
  return offsets;
}

function askedOffsetMs(zone: IANAZone, at: Instant): number {
  return Math.round(zone.offset(at) * 60) * 1000;
}

// The instant, to the second, of the first change between two instants that differ in offset.
function changeBetween(zone: IANAZone, { fromAt, untilAt }: { fromAt: Instant; untilAt: Instant }): Instant {
  const offsetMs = askedOffsetMs(zone, fromAt);
  let [beforeAt, changedAt] = [fromAt, untilAt];
  while (changedAt - beforeAt > 1000) {
    const middleAt = beforeAt + Math.floor((changedAt - beforeAt) / 2000) * 1000;
    if (askedOffsetMs(zone, middleAt) === offsetMs) beforeAt = middleAt;
    else changedAt = middleAt;
  }
  return changedAt;
}

// Looks every few days, and day by day where those differ. A change undone between two looks would be missed; the
// shortest of 1900..2039 in the database lasted a week (parts of Brazil, October 2000).
function changesInStretch(zone: IANAZone, stretch: number): OffsetChange[] {
  const startAt = stretch * STRETCH_MS;
  const changes: OffsetChange[] = [{ fromAt: startAt, offsetMs: askedOffsetMs(zone, startAt) }];
  const look = (fromAt: Instant, untilAt: Instant, stepMs: number): void => {
    for (let at = fromAt; at < untilAt; at += stepMs) {
      const nextMs = askedOffsetMs(zone, at + stepMs);
      if (nextMs === changes.at(-1)!.offsetMs) continue;
      if (stepMs > DAY_MS) look(at, at + stepMs, DAY_MS);
      else
        changes.push({ fromAt: changeBetween(zone, { fromAt: at, untilAt: at + stepMs }), offsetMs: nextMs });
    }
  };
  look(startAt, startAt + STRETCH_MS, ASKED_EVERY_DAYS * DAY_MS);
  return changes;
}

function offsetMsAt(at: Instant, offsets: ZoneOffsets): number {
  if (at >= offsets.unchangedFromAt && at < offsets.unchangedUntilAt) return offsets.unchangedMs;
  const stretch = Math.floor(at / STRETCH_MS);
  let changes = offsets.stretches.get(stretch);
  if (changes === undefined) {
    changes = changesInStretch(offsets.zone, stretch);
    offsets.stretches.set(stretch, changes);
  }
  let index = changes.length - 1;
  while (index > 0 && changes[index]!.fromAt > at) index -= 1;
  offsets.unchangedFromAt = changes[index]!.fromAt;
  offsets.unchangedUntilAt = changes[index + 1]?.fromAt ?? (stretch + 1) * STRETCH_MS;
  offsets.unchangedMs = changes[index]!.offsetMs;
  return offsets.unchangedMs;
}

/**
 * The instant at which wall clocks show a time, written as if it were UTC.
 * A time that a clock change skips is moved forward by the skip; one that comes twice is the first of the two.
 */
function instantOfWall(wallMs: number, offsets: ZoneOffsets): Instant {
  const earliestAt = wallMs - WIDEST_OFFSET_MS;
  const latestAt = wallMs + WIDEST_OFFSET_MS;
  const earlierMs = offsetMsAt(earliestAt, offsets);
  if (offsets.unchangedUntilAt > latestAt) return wallMs - earlierMs;
  const laterMs = offsetMsAt(latestAt, offsets);
  const firstAt = wallMs - earlierMs;
  if (offsetMsAt(firstAt, offsets) === earlierMs) return firstAt;
  const secondAt = wallMs - laterMs;
  return offsetMsAt(secondAt, offsets) === laterMs ? secondAt : firstAt;
}

function noonAt(days: number, offsets: ZoneOffsets): Instant {
  return instantOfWall(days * DAY_MS + NOON_MS, offsets);
}

/**
 * The local noon an evening begins with.
 * @param evening the evening
 * @param timeZone IANA name
 * @throws ProgrammerError for a date or zone that does not exist
 */
export function localNoonAt(evening: Evening, timeZone: string): Instant {
  return noonAt(checkedDayNumber(evening), offsetsOf(timeZone));
}

/**
 * When an evening begins and ends: its local noon, and the next local noon (which is no longer part of it).
 * Evenings tile time: each ends where the next begins, 23 to 25 h later at clock changes, else 24 h.
 * A date the zone never had (Samoa 2011-12-30) is an empty evening: it begins and ends at the noon after the skip.
 * A date whose noon came twice (Kwajalein 1969-09-30) begins at the first and lasts about two days.
 * @param evening the evening
 * @param timeZone IANA name
 * @throws ProgrammerError for a date or zone that does not exist
 */
export function eveningSpan(evening: Evening, timeZone: string): { startAt: Instant; endAt: Instant } {
  const days = checkedDayNumber(evening);
  const offsets = offsetsOf(timeZone);
  return { startAt: noonAt(days, offsets), endAt: noonAt(days + 1, offsets) };
}

/**
 * The evening an instant belongs to; what happens after midnight belongs to the evening before.
 * @param at the instant
 * @param timeZone IANA name
 */
export function eveningOf(at: Instant, timeZone: string): Evening {
  checkFinite(at, 'at');
  const offsets = offsetsOf(timeZone);
  let days = Math.floor((at + offsetMsAt(at, offsets) - NOON_MS) / DAY_MS);
  // The wall clock alone misleads where a zone skipped or repeated a date.
  while (at < noonAt(days, offsets)) days -= 1;
  while (at >= noonAt(days + 1, offsets)) days += 1;
  return dateOfDayNumber(days);
}

// ---- Wall times ----

/** The last of some evenings. */
export function latestOf(...evenings: [Evening, ...Evening[]]): Evening {
  return [...evenings].sort().at(-1)!;
}

/** From this hour on a morning belongs, in people's minds, to the evening to come. Common practice, no source. */
const MORNING_HOUR_MS = 6 * HOUR_MS;

/**
 * The evening people mean by "tonight": the one under way until six in the morning, then the one to come.
 * @param at the instant
 * @param timeZone IANA name
 */
export function eveningAhead(at: Instant, timeZone: string): Evening {
  return eveningOf(at + MORNING_HOUR_MS, timeZone);
}

/**
 * Minutes since midnight of a wall time.
 * @param wallTime 'HH:MM', 00:00 to 23:59
 * @returns null where the text is no such time
 */
export function minutesOfWallTime(wallTime: string): number | null {
  if (wallTime.length !== 5 || wallTime.charCodeAt(2) !== 58) return null;
  const hours = digitsAt(wallTime, 0, 2);
  const minutes = digitsAt(wallTime, 3, 2);
  return hours <= 23 && minutes <= 59 ? hours * 60 + minutes : null;
}

function checkedMinutes(wallTime: string): number {
  const minutes = minutesOfWallTime(wallTime);
  if (minutes === null) check(false, `A wall time is written like 18:30, but "${wallTime}" is not.`);
  return minutes;
}

/**
 * The moment on one calendar date when the wall clock shows a time.
 * A time that a clock change skips is moved forward by the skip; one that comes twice is the first of the two.
 * @param date the calendar date, midnight to midnight
 * @param wallTime 'HH:MM'
 * @param timeZone IANA name
 */
export function instantOnDate(date: string, wallTime: string, timeZone: string): Instant {
  const wallMs = checkedDayNumber(date) * DAY_MS + checkedMinutes(wallTime) * MINUTE_MS;
  return instantOfWall(wallMs, offsetsOf(timeZone));
}

/**
 * The moment within an evening when the wall clock shows a time: from 12:00 on it lies on the evening's own date,
 * before 12:00 on the next. Skipped and repeated times as in `instantOnDate`; never outside the evening's span.
 * @param evening the evening
 * @param wallTime 'HH:MM'
 * @param timeZone IANA name
 */
export function instantInEvening(evening: Evening, wallTime: string, timeZone: string): Instant {
  const minutes = checkedMinutes(wallTime);
  const days = checkedDayNumber(evening) + (minutes < 12 * 60 ? 1 : 0);
  const at = instantOfWall(days * DAY_MS + minutes * MINUTE_MS, offsetsOf(timeZone));
  const span = eveningSpan(evening, timeZone);
  return Math.min(Math.max(at, span.startAt), span.endAt);
}

/**
 * What the wall clock shows at an instant, 'HH:MM', seconds dropped.
 * @param at the instant
 * @param timeZone IANA name
 */
export function wallTimeOf(at: Instant, timeZone: string): string {
  checkFinite(at, 'at');
  const wallMs = at + offsetMsAt(at, offsetsOf(timeZone));
  const minutes = Math.floor((wallMs - Math.floor(wallMs / DAY_MS) * DAY_MS) / MINUTE_MS);
  return `${padded(Math.floor(minutes / 60), 2)}:${padded(minutes % 60, 2)}`;
}

/**
 * Hours that standard time is ahead of UTC in a year: the smaller of January's and July's offset.
 * Ours: good for reckoning the sun's own day; a zone with more than two offsets a year shows one of them.
 * @param timeZone IANA name
 * @param year 1900..2199
 */
export function standardOffsetHours(timeZone: string, year: number): number {
  const offsets = offsetsOf(timeZone);
  const januaryMs = offsetMsAt(dayNumber(year, 1, 1) * DAY_MS + NOON_MS, offsets);
  const julyMs = offsetMsAt(dayNumber(year, 7, 1) * DAY_MS + NOON_MS, offsets);
  return Math.min(januaryMs, julyMs) / HOUR_MS;
}

// ---- Instants as text ----

const INSTANT_TEXT =
  /^(\d{4})-(\d{2})-(\d{2})[Tt](\d{2}):(\d{2}):(\d{2})(?:\.(\d{1,9}))?(?:[Zz]|([+-])(\d{2}):(\d{2}))$/;

/**
 * Reads an instant. Source: RFC 3339 section 5.6, `date-time`; finer than a millisecond is cut off.
 * @param text like '2026-10-25T17:30:00Z' or '2026-10-25T18:30:00+01:00'
 * @returns null without an offset, for dates and times that do not exist, for hour 24 and second 60, and outside
 *   1900..2199
 */
export function parseInstant(text: string): Instant | null {
  const parts = INSTANT_TEXT.exec(text);
  if (parts === null) return null;
  const [year, month, day, hour, minute, second] = parts.slice(1, 7).map(Number) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const [offsetHour, offsetMinute] = [Number(parts[9] ?? 0), Number(parts[10] ?? 0)];
  if (year < FIRST_YEAR || year > LAST_YEAR || !isRealDate(year, month, day)) return null;
  if (hour > 23 || minute > 59 || second > 59 || offsetHour > 23 || offsetMinute > 59) return null;
  const ms = Number((parts[7] ?? '0').padEnd(3, '0').slice(0, 3));
  const wallMs =
    dayNumber(year, month, day) * DAY_MS + hour * HOUR_MS + minute * MINUTE_MS + second * 1000 + ms;
  const offsetMs = (parts[8] === '-' ? -1 : 1) * (offsetHour * HOUR_MS + offsetMinute * MINUTE_MS);
  return wallMs - offsetMs;
}

/**
 * Writes an instant as RFC 3339 in UTC: '2026-10-25T17:30:00Z', with milliseconds only where there are any.
 * @param at the instant, whole milliseconds
 */
export function formatInstant(at: Instant): string {
  checkFinite(at, 'at');
  const wholeAt = Math.round(at);
  const days = Math.floor(wholeAt / DAY_MS);
  const msOfDay = wholeAt - days * DAY_MS;
  const clock = [
    Math.floor(msOfDay / HOUR_MS),
    Math.floor(msOfDay / MINUTE_MS) % 60,
    Math.floor(msOfDay / 1000) % 60,
  ];
  const ms = msOfDay % 1000;
  const fraction = ms === 0 ? '' : `.${padded(ms, 3)}`;
  return `${dateOfDayNumber(days)}T${clock.map((part) => padded(part, 2)).join(':')}${fraction}Z`;
}
