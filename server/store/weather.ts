import { and, asc, eq } from 'drizzle-orm';
import type { TypicalYear } from '../model/climate.ts';
import type { Evening, Instant } from '../model/evening.ts';
import { HOUR_MS } from '../model/evening.ts';
import type { ObservedHours, TypedNight } from '../model/weather.ts';
import type { Db } from './open.ts';
import { typedNights, typicalYears, weatherMonths } from './schema.ts';

/** All platforms Node runs on today put the little end first, so the bytes are the array's own. */
const bytesOf = (floats: Float32Array): Buffer =>
  Buffer.from(floats.buffer, floats.byteOffset, floats.byteLength);

/** A copy: the bytes of a row need not start where a float may. */
const floatsOf = (bytes: Buffer): Float32Array => new Float32Array(Uint8Array.from(bytes).buffer);

function monthStart(at: Instant, monthsLater = 0): Instant {
  const date = new Date(at);
  return Date.UTC(date.getUTCFullYear(), date.getUTCMonth() + monthsLater, 1);
}

function storedMonths(db: Db, siteId: string): Map<Instant, Float32Array> {
  const rows = db
    .select({ monthAt: weatherMonths.monthAt, tempC: weatherMonths.tempC })
    .from(weatherMonths)
    .where(eq(weatherMonths.siteId, siteId))
    .orderBy(asc(weatherMonths.monthAt))
    .all();
  return new Map(rows.map((row) => [row.monthAt, floatsOf(row.tempC)]));
}

/** The imported hours of a site from the first known to the last, NaN between where missing; null when there are none. */
export function findHours(db: Db, siteId: string): ObservedHours | null {
  const months = [...storedMonths(db, siteId)];
  const first = months[0];
  const last = months.at(-1);
  if (!first || !last) return null;
  const startAt = first[0];
  const all = new Float32Array((last[0] - startAt) / HOUR_MS + last[1].length).fill(Number.NaN);
  for (const [monthAt, tempC] of months) all.set(tempC, (monthAt - startAt) / HOUR_MS);
  const from = all.findIndex((each) => !Number.isNaN(each));
  const through = all.findLastIndex((each) => !Number.isNaN(each));
  return from < 0 ? null : { startAt: startAt + from * HOUR_MS, tempC: all.slice(from, through + 1) };
}

/**
 * Merges imported hours with those already kept: a new value wins, a missing one (NaN) leaves what was there.
 * Call it inside a transaction.
 * @param hours `startAt` a whole UTC hour; temperatures in °C
 */
export function saveHours(db: Db, siteId: string, hours: ObservedHours): void {
  const months = storedMonths(db, siteId);
  const endAt = hours.startAt + hours.tempC.length * HOUR_MS;
  for (let monthAt = monthStart(hours.startAt); monthAt < endAt; monthAt = monthStart(monthAt, 1)) {
    const monthHours = (monthStart(monthAt, 1) - monthAt) / HOUR_MS;
    const tempC = months.get(monthAt) ?? new Float32Array(monthHours).fill(Number.NaN);
    const offset = (monthAt - hours.startAt) / HOUR_MS;
    let known = 0;
    for (let hour = Math.max(0, -offset); hour < monthHours && offset + hour < hours.tempC.length; hour++) {
      const value = hours.tempC[offset + hour]!;
      if (Number.isNaN(value)) continue;
      tempC[hour] = value;
      known++;
    }
    if (known === 0) continue;
    const row = { siteId, monthAt, tempC: bytesOf(tempC) };
    db.insert(weatherMonths)
      .values(row)
      .onConflictDoUpdate({
        target: [weatherMonths.siteId, weatherMonths.monthAt],
        set: { tempC: row.tempC },
      })
      .run();
  }
}

/** Takes every imported hour away; false when there were none. */
export function removeHours(db: Db, siteId: string): boolean {
  return db.delete(weatherMonths).where(eq(weatherMonths.siteId, siteId)).run().changes > 0;
}

/** The site's typical year and the name of its station, or null. */
export function findTypicalYear(db: Db, siteId: string): (TypicalYear & { stationName: string }) | null {
  const row = db.select().from(typicalYears).where(eq(typicalYears.siteId, siteId)).get();
  if (!row) return null;
  return {
    stationName: row.stationName,
    standardOffsetHours: row.standardOffsetHours,
    tempC: floatsOf(row.tempC),
  };
}

/**
 * Keeps a typical year in place of the one before.
 * @param year 8760 temperatures in °C; the first 200 characters of `stationName` are kept
 */
export function saveTypicalYear(db: Db, siteId: string, year: TypicalYear & { stationName: string }): void {
  const row = {
    stationName: year.stationName.slice(0, 200),
    standardOffsetHours: year.standardOffsetHours,
    tempC: bytesOf(year.tempC),
  };
  db.insert(typicalYears)
    .values({ siteId, ...row })
    .onConflictDoUpdate({ target: typicalYears.siteId, set: row })
    .run();
}

/** Takes the typical year away; false when there was none. */
export function removeTypicalYear(db: Db, siteId: string): boolean {
  return db.delete(typicalYears).where(eq(typicalYears.siteId, siteId)).run().changes > 0;
}

/** The nights somebody typed, by evening, in order. */
export function listTypedNights(db: Db, siteId: string): Map<Evening, TypedNight & { typedAt: Instant }> {
  const rows = db
    .select()
    .from(typedNights)
    .where(eq(typedNights.siteId, siteId))
    .orderBy(asc(typedNights.evening))
    .all();
  return new Map(rows.map(({ evening, minC, maxC, typedAt }) => [evening, { minC, maxC, typedAt }]));
}

/** Keeps a typed night in place of the one before. Temperatures in °C, -60..50. */
export function saveTypedNight(
  db: Db,
  siteId: string,
  evening: Evening,
  night: TypedNight,
  typedAt: Instant,
): void {
  const row = { minC: night.minC, maxC: night.maxC, typedAt };
  db.insert(typedNights)
    .values({ siteId, evening, ...row })
    .onConflictDoUpdate({ target: [typedNights.siteId, typedNights.evening], set: row })
    .run();
}

/** Takes a typed night away; false when there was none. */
export function removeTypedNight(db: Db, siteId: string, evening: Evening): boolean {
  const night = and(eq(typedNights.siteId, siteId), eq(typedNights.evening, evening));
  return db.delete(typedNights).where(night).run().changes > 0;
}
