import { expect, test } from 'vitest';
import type { LogEntry, Sighting, Swap } from '../../server/model/log-entry.ts';
import { findEntry, insertEntry, listLog, propLog, siteLog, undoEntry } from '../../server/store/log.ts';
import { insertProp } from '../../server/store/props.ts';
import { insertSite } from '../../server/store/sites.ts';
import { clientOf, sampleProp, sampleSighting, sampleSite, sampleSwap, storeWithSamples } from './samples.ts';

const fullSwap: Swap = {
  ...sampleSwap,
  id: 'swap-full',
  state: 'part-used',
  leftShare: 0,
  cellTypeId: 'HR6',
  cells: 2,
  setId: 'C',
  healthShare: 0.82,
  oldSet: 'dim',
  note: 'Two of three:\n"the third sticks" 🦇',
};
const fullSighting: Sighting = {
  ...sampleSighting,
  id: 'sighting-full',
  seen: 'odd',
  volts: 0,
  taken: 'resting',
  note: 'flickers',
};

test.each<LogEntry>([sampleSwap, fullSwap, sampleSighting, fullSighting])(
  '$id comes back as it went in',
  (entry) => {
    const { db, close } = storeWithSamples();
    insertEntry(db, entry);
    expect(findEntry(db, entry.id)).toStrictEqual(entry);
    expect(propLog(db, entry.propId)).toStrictEqual([entry]);
    expect(siteLog(db, sampleSite.id)).toStrictEqual(new Map([[entry.propId, [entry]]]));
    expect(listLog(db, entry.propId, { limit: 1, undone: false })).toStrictEqual([entry]);
    close();
  },
);

test('an undo keeps a trace of its first moment and takes the entry out of what counts', () => {
  const { db, close } = storeWithSamples();
  insertEntry(db, sampleSwap);
  insertEntry(db, sampleSighting);
  expect(undoEntry(db, sampleSwap.id, 5_000)).toBe(true);
  expect(undoEntry(db, sampleSwap.id, 6_000)).toBe(false);
  expect(findEntry(db, sampleSwap.id)).toStrictEqual({ ...sampleSwap, undoneAt: 5_000 });
  const ids = (undone: boolean) => listLog(db, sampleProp.id, { limit: 9, undone }).map((entry) => entry.id);
  expect(ids(true)).toEqual([sampleSighting.id, sampleSwap.id]);
  expect(ids(false)).toEqual([sampleSighting.id]);
  expect(propLog(db, sampleProp.id)).toStrictEqual([sampleSighting]);
  expect(siteLog(db, sampleSite.id).get(sampleProp.id)).toStrictEqual([sampleSighting]);
  close();
});

test('the log goes by moment, then by when it was recorded, then by id, and pages miss none', () => {
  const { db, close } = storeWithSamples();
  const at = sampleSwap.at;
  const put = (id: string, moments: { at: number; recordedAt: number }) =>
    insertEntry(db, { ...sampleSwap, id, ...moments });
  put('e', { at: at + 1, recordedAt: at });
  put('a', { at, recordedAt: at + 9 });
  put('d', { at, recordedAt: at + 5 });
  put('c', { at, recordedAt: at + 5 });
  put('f', { at: at - 1, recordedAt: at + 99 });
  const oldestFirst = ['f', 'c', 'd', 'a', 'e'];
  expect(propLog(db, sampleProp.id).map((entry) => entry.id)).toEqual(oldestFirst);
  expect(
    siteLog(db, sampleSite.id)
      .get(sampleProp.id)!
      .map((entry) => entry.id),
  ).toEqual(oldestFirst);
  const walked: LogEntry[] = [];
  for (;;) {
    const before = walked.at(-1);
    const page = listLog(db, sampleProp.id, { limit: 2, undone: false, ...(before ? { before } : {}) });
    if (page.length === 0) break;
    walked.push(...page);
  }
  expect(walked.map((entry) => entry.id)).toEqual(oldestFirst.toReversed());
  const afterGone = listLog(db, sampleProp.id, { limit: 9, undone: false, before: { at, id: 'gone' } });
  expect(afterGone.map((entry) => entry.id)).toEqual(['f']);
  close();
});

test('the log of a site is that of its props alone', () => {
  const { db, close } = storeWithSamples();
  insertSite(db, { ...sampleSite, id: 'other' });
  insertProp(db, { ...sampleProp, id: 'prop-2', tag: 'B-07' });
  insertProp(db, { ...sampleProp, id: 'elsewhere', siteId: 'other' });
  const entries = [sampleProp.id, 'prop-2', 'elsewhere'].map((propId) => ({
    ...sampleSwap,
    id: `of-${propId}`,
    propId,
  }));
  for (const entry of entries) insertEntry(db, entry);
  expect(siteLog(db, sampleSite.id)).toStrictEqual(
    new Map([
      [sampleProp.id, [entries[0]]],
      ['prop-2', [entries[1]]],
    ]),
  );
  close();
});

test('an entry of an unknown prop, an id taken and a mixture of the two kinds are refused', () => {
  const { db, close } = storeWithSamples();
  insertEntry(db, sampleSwap);
  expect(() => insertEntry(db, { ...sampleSwap, id: 'x', propId: 'nobody' })).toThrow(/FOREIGN KEY/);
  expect(() => insertEntry(db, sampleSwap)).toThrow(/UNIQUE/);
  const mixed = [
    { ...sampleSwap, id: 'x', volts: 3 },
    { ...sampleSwap, id: 'x', seen: 'dim' },
    { ...sampleSighting, id: 'x', cells: 3 },
    { ...sampleSighting, id: 'x', kind: 'dream' },
  ];
  for (const entry of mixed) expect(() => insertEntry(db, entry as unknown as LogEntry)).toThrow(/CHECK/);
  expect(clientOf(db).prepare('select count(*) from log').pluck().get()).toBe(1);
  close();
});
