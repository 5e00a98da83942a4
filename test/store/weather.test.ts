import fc from 'fast-check';
import { expect, test } from 'vitest';
import { HOUR_MS } from '../../server/model/evening.ts';
import {
  findHours,
  findTypicalYear,
  listTypedNights,
  removeTypedNight,
  saveHours,
  saveTypedNight,
  saveTypicalYear,
} from '../../server/store/weather.ts';
import { sampleSite, storeWithSamples } from './samples.ts';

const siteId = sampleSite.id;
const missing = Number.NaN;

test('hours across months, a leap day and a year end come back as they went in', () => {
  for (const startAt of [
    Date.UTC(2026, 9, 31, 20),
    Date.UTC(2028, 1, 28, 23),
    Date.UTC(2026, 11, 31, 23),
    Date.UTC(1969, 11, 31),
  ]) {
    const { db, close } = storeWithSamples();
    const hours = {
      startAt,
      tempC: Float32Array.from({ length: 24 * 65 }, (_, hour) => (hour % 7 === 3 ? missing : hour / 8)),
    };
    saveHours(db, siteId, hours);
    expect(findHours(db, siteId)).toStrictEqual(hours);
    close();
  }
});

test('a new value wins, a missing one leaves what was there, and months between are missing', () => {
  const { db, close } = storeWithSamples();
  const startAt = Date.UTC(2026, 9, 1, 5);
  saveHours(db, siteId, { startAt, tempC: Float32Array.of(1, 2, missing, 4) });
  saveHours(db, siteId, { startAt: startAt + HOUR_MS, tempC: Float32Array.of(missing, 30, 40, 50) });
  expect(findHours(db, siteId)).toStrictEqual({ startAt, tempC: Float32Array.of(1, 2, 30, 40, 50) });
  saveHours(db, siteId, { startAt: Date.UTC(2026, 11, 1), tempC: Float32Array.of(7) });
  const joined = findHours(db, siteId)!;
  expect(joined.tempC).toHaveLength((Date.UTC(2026, 11, 1) - startAt) / HOUR_MS + 1);
  expect(joined.tempC.at(-1)).toBe(7);
  expect(joined.tempC.subarray(5, -1).every(Number.isNaN)).toBe(true);
  close();
});

test('nothing known is null, whether nothing came or only missing values', () => {
  const { db, close } = storeWithSamples();
  expect(findHours(db, siteId)).toBeNull();
  saveHours(db, siteId, { startAt: 0, tempC: new Float32Array(100).fill(missing) });
  saveHours(db, siteId, { startAt: 0, tempC: new Float32Array(0) });
  expect(findHours(db, siteId)).toBeNull();
  close();
});

test('any imports join as a plain map from hour to last known value does', () => {
  const value = fc.option(fc.float({ min: -60, max: 50, noNaN: true }), { nil: missing });
  const piece = fc.record({
    offset: fc.integer({ min: 0, max: 3000 }),
    values: fc.array(value, { maxLength: 900 }),
  });
  const base = Date.UTC(2027, 10, 1);
  fc.assert(
    fc.property(fc.array(piece, { minLength: 1, maxLength: 4 }), (pieces) => {
      const { db, close } = storeWithSamples();
      const expected = new Map<number, number>();
      for (const { offset, values } of pieces) {
        saveHours(db, siteId, { startAt: base + offset * HOUR_MS, tempC: Float32Array.from(values) });
        values.forEach((each, index) => {
          if (!Number.isNaN(each)) expected.set(base + (offset + index) * HOUR_MS, each);
        });
      }
      const found = findHours(db, siteId);
      const known = new Map<number, number>();
      found?.tempC.forEach((each, hour) => {
        if (!Number.isNaN(each)) known.set(found.startAt + hour * HOUR_MS, each);
      });
      const inOrder = [...expected].sort(([one], [other]) => one - other);
      expect([...known]).toEqual(inOrder);
      if (found) expect(found.startAt).toBe(inOrder[0]![0]);
      close();
    }),
    { numRuns: 40 },
  );
});

test('a typical year comes back as it went in, and a new one takes its place', () => {
  const { db, close } = storeWithSamples();
  expect(findTypicalYear(db, siteId)).toBeNull();
  const tempC = Float32Array.from({ length: 8760 }, (_, hour) =>
    hour === 5 ? missing : Math.fround(hour / 300 - 7.3),
  );
  const year = { stationName: 'Ravnebjerg', standardOffsetHours: 5.75, tempC };
  saveTypicalYear(db, siteId, { ...year, stationName: 'before', standardOffsetHours: -8 });
  saveTypicalYear(db, siteId, year);
  expect(findTypicalYear(db, siteId)).toStrictEqual(year);
  close();
});

test('a part of a larger array is kept as that part alone', () => {
  const { db, close } = storeWithSamples();
  const larger = Float32Array.from({ length: 8800 }, (_, index) => index);
  saveTypicalYear(db, siteId, { stationName: '', standardOffsetHours: 0, tempC: larger.subarray(13, 8773) });
  expect(findTypicalYear(db, siteId)?.tempC[0]).toBe(13);
  expect(findTypicalYear(db, siteId)?.tempC.at(-1)).toBe(8772);
  close();
});

test('a typical year with an hour too few is refused', () => {
  const { db, close } = storeWithSamples();
  const short = { stationName: '', standardOffsetHours: 0, tempC: new Float32Array(8759) };
  expect(() => saveTypicalYear(db, siteId, short)).toThrow(/CHECK/);
  close();
});

test('typed nights come back in order, are replaced and taken away', () => {
  const { db, close } = storeWithSamples();
  saveTypedNight(db, siteId, '2026-11-02', { minC: -3.5, maxC: 4 }, 2_000);
  saveTypedNight(db, siteId, '2026-11-01', { minC: 9, maxC: 9 }, 1_000);
  saveTypedNight(db, siteId, '2026-11-01', { minC: 1, maxC: 6.25 }, 3_000);
  expect([...listTypedNights(db, siteId)]).toStrictEqual([
    ['2026-11-01', { minC: 1, maxC: 6.25, typedAt: 3_000 }],
    ['2026-11-02', { minC: -3.5, maxC: 4, typedAt: 2_000 }],
  ]);
  expect(removeTypedNight(db, siteId, '2026-11-01')).toBe(true);
  expect(removeTypedNight(db, siteId, '2026-11-01')).toBe(false);
  expect([...listTypedNights(db, siteId).keys()]).toEqual(['2026-11-02']);
  close();
});
