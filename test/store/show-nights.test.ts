import { expect, test } from 'vitest';
import { listShowNights, replaceShowNights, type StoredShowNight } from '../../server/store/show-nights.ts';
import { sampleSite, storeWithSamples } from './samples.ts';

const night = (evening: string, rest: Partial<StoredShowNight> = {}): StoredShowNight => ({
  evening,
  opensAt: '18:30',
  closesAt: '21:30',
  calledOff: false,
  addedAt: 0,
  calledOffAt: null,
  ...rest,
});

test('show nights come back in order with their trace, and a new list takes the place of the old', () => {
  const { db, close } = storeWithSamples();
  const first = [
    night('2026-10-31', { calledOff: true, calledOffAt: 9_000 }),
    night('2026-10-30', { addedAt: 4_000 }),
  ];
  replaceShowNights(db, sampleSite.id, first);
  expect(listShowNights(db, sampleSite.id)).toStrictEqual([first[1], first[0]]);
  const second = [night('2026-11-01', { opensAt: '00:00', closesAt: '23:59' })];
  replaceShowNights(db, sampleSite.id, second);
  expect(listShowNights(db, sampleSite.id)).toStrictEqual(second);
  replaceShowNights(db, sampleSite.id, []);
  expect(listShowNights(db, sampleSite.id)).toEqual([]);
  close();
});

test('the same evening twice is refused, and inside a transaction the old list stays', () => {
  const store = storeWithSamples();
  const old = [night('2026-10-30')];
  replaceShowNights(store.db, sampleSite.id, old);
  const twice = [night('2026-10-31'), night('2026-10-31')];
  expect(() => store.transact((db) => replaceShowNights(db, sampleSite.id, twice))).toThrow(/UNIQUE/);
  expect(listShowNights(store.db, sampleSite.id)).toStrictEqual(old);
  store.close();
});

test.each([
  ['evening', '2026-02-30'],
  ['evening', '2026-13-01'],
  ['evening', '2027-02-29'],
  ['evening', 'now'],
  ['evening', '2026-10-30T00:00'],
  ['opensAt', '24:00'],
  ['opensAt', '8:30'],
  ['closesAt', '18:60'],
  ['closesAt', '18:30:00'],
])('%s %s is refused', (field, value) => {
  const { db, close } = storeWithSamples();
  expect(() => replaceShowNights(db, sampleSite.id, [{ ...night('2026-10-30'), [field]: value }])).toThrow(
    /CHECK/,
  );
  close();
});

test('29 February of a leap year is an evening', () => {
  const { db, close } = storeWithSamples();
  replaceShowNights(db, sampleSite.id, [night('2028-02-29')]);
  expect(listShowNights(db, sampleSite.id)).toHaveLength(1);
  close();
});
