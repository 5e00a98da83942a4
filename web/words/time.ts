/**
 * Moments and evenings in words, always in the zone of the site: the browser may be in another one.
 * Evenings are plain dates ('2026-10-25') and are reckoned as UTC dates, so no zone can shift them.
 */
export type Wall = { year: number; month: number; day: number; hour: number; minute: number };

const DAY_MS = 86_400_000;
const WEEKDAYS = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];
export const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

const formats = new Map<string, Intl.DateTimeFormat>();

function formatOf(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone,
      hourCycle: 'h23',
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
    });
    formats.set(timeZone, format);
  }
  return format;
}

/** What the clock on the wall of that zone shows at an instant (epoch milliseconds). */
export function wallOf(at: number, timeZone: string): Wall {
  const wall: Wall = { year: 0, month: 0, day: 0, hour: 0, minute: 0 };
  for (const part of formatOf(timeZone).formatToParts(at)) {
    if (part.type in wall) wall[part.type as keyof Wall] = Number(part.value);
  }
  return wall;
}

const two = (value: number) => String(value).padStart(2, '0');

/** 'HH:MM' on the site's wall. */
export function wallTime(at: number, timeZone: string): string {
  const wall = wallOf(at, timeZone);
  return `${two(wall.hour)}:${two(wall.minute)}`;
}

/** 'YYYY-MM-DDTHH:MM', the value of a datetime-local field. */
export function wallStamp(at: number, timeZone: string): string {
  const wall = wallOf(at, timeZone);
  return `${wall.year}-${two(wall.month)}-${two(wall.day)}T${two(wall.hour)}:${two(wall.minute)}`;
}

/**
 * The instant at which the wall shows a stamp 'YYYY-MM-DDTHH:MM', or null when it is no stamp. A stamp the
 * spring change skips gives the moment as far after the gap; of a stamp shown twice, the first.
 */
export function instantOfStamp(stamp: string, timeZone: string): number | null {
  const match = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2})/.exec(stamp);
  if (!match) return null;
  const [year, month, day, hour, minute] = match.slice(1).map(Number) as [
    number,
    number,
    number,
    number,
    number,
  ];
  const asUtc = Date.UTC(year, month - 1, day, hour, minute);
  if (Number.isNaN(asUtc) || new Date(asUtc).toISOString().slice(0, 10) !== stamp.slice(0, 10)) return null;
  const before = asUtc - offsetMs(asUtc - DAY_MS, timeZone);
  const after = asUtc - offsetMs(asUtc + DAY_MS, timeZone);
  // Both hold in a repeated hour, and the earlier is the first; neither holds in a gap, and `before` lands past it.
  const fitting = [before, after].filter((at) => wallStamp(at, timeZone) === stamp.slice(0, 16));
  return fitting.length > 0 ? Math.min(...fitting) : before;
}

function offsetMs(at: number, timeZone: string): number {
  const wall = wallOf(at, timeZone);
  return (
    Date.UTC(wall.year, wall.month - 1, wall.day, wall.hour, wall.minute) - Math.floor(at / 60_000) * 60_000
  );
}

/** The evening an instant belongs to: before noon it is still the evening before. */
export function eveningOf(at: number, timeZone: string): string {
  const wall = wallOf(at, timeZone);
  const date = `${String(wall.year).padStart(4, '0')}-${two(wall.month)}-${two(wall.day)}`;
  return wall.hour < 12 ? addDays(date, -1) : date;
}

/**
 * The night people mean by "tonight": the one that is on, or from six in the morning the one to come. An evening
 * lasts to the next noon, but nobody at breakfast calls last night tonight.
 */
export function eveningAhead(at: number, timeZone: string): string {
  const evening = eveningOf(at, timeZone);
  const { hour } = wallOf(at, timeZone);
  return hour >= 6 && hour < 12 ? addDays(evening, 1) : evening;
}

/** Pure calendar arithmetic on 'YYYY-MM-DD'. */
export function addDays(date: string, days: number): string {
  return new Date(Date.parse(`${date}T00:00:00Z`) + days * DAY_MS).toISOString().slice(0, 10);
}

/** Nights from one evening to another; negative when `through` is earlier. */
export function nightsBetween(from: string, through: string): number {
  return Math.round((Date.parse(`${through}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / DAY_MS);
}

/** The same wall time some days on. */
export function moveDays(at: number, days: number, timeZone: string): number {
  const stamp = wallStamp(at, timeZone);
  return (
    instantOfStamp(`${addDays(stamp.slice(0, 10), days)}${stamp.slice(10)}`, timeZone) ?? at + days * DAY_MS
  );
}

/** Minutes the wall clock is past noon of the evening, 0..1440: where a moment stands on the night band. */
export function minutesPastNoon(wall: string): number {
  const [hour, minute] = wall.split(':').map(Number) as [number, number];
  return (hour * 60 + minute - 720 + 1440) % 1440;
}

const dateOf = (date: string) => new Date(`${date}T00:00:00Z`);
export const weekdayWord = (date: string) => WEEKDAYS[dateOf(date).getUTCDay()]!;
export const dayNumber = (date: string) => dateOf(date).getUTCDate();
export const monthWord = (date: string) => MONTHS[dateOf(date).getUTCMonth()]!;

/** 'Thu 22 Oct'. */
export const dateWords = (date: string) => `${weekdayWord(date)} ${dayNumber(date)} ${monthWord(date)}`;

/** 'Thu 22 Oct 2026, 09:00' on the site's wall. */
export function momentWords(at: number, timeZone: string): string {
  const stamp = wallStamp(at, timeZone);
  return `${dateWords(stamp.slice(0, 10))} ${stamp.slice(0, 4)}, ${stamp.slice(11)}`;
}

/** 'Thu 22 Oct, 09:00': the same without the year, for logs. */
export function shortMomentWords(at: number, timeZone: string): string {
  const stamp = wallStamp(at, timeZone);
  return `${dateWords(stamp.slice(0, 10))}, ${stamp.slice(11)}`;
}
