import { expect, test } from 'vitest';
import {
  findCalendarLinkByHash,
  insertCalendarLink,
  listCalendarLinks,
  removeCalendarLink,
  touchCalendarLink,
} from '../../server/store/calendar-links.ts';
import { type DueEvent, listDueEvents, saveDueEvents } from '../../server/store/due-evenings.ts';
import { dropReplaysBefore, findReplay, saveReplay } from '../../server/store/replays.ts';
import { insertSite } from '../../server/store/sites.ts';
import { sampleSite, storeWithSamples } from './samples.ts';

const link = {
  id: 'link-1',
  siteId: sampleSite.id,
  secretHash: 'ab'.repeat(32),
  label: 'Kitchen tablet',
  alarms: true,
  createdAt: 1_000,
};

test('calendar links come back oldest first, are found by their hash, touched and revoked', () => {
  const { db, close } = storeWithSamples();
  const plain = {
    ...link,
    id: 'link-0',
    secretHash: 'cd'.repeat(32),
    label: null,
    alarms: false,
    createdAt: 2_000,
  };
  insertCalendarLink(db, plain);
  insertCalendarLink(db, link);
  expect(listCalendarLinks(db, sampleSite.id)).toStrictEqual([
    { ...link, lastReadAt: null },
    { ...plain, lastReadAt: null },
  ]);
  touchCalendarLink(db, link.id, 3_000);
  expect(findCalendarLinkByHash(db, link.secretHash)).toStrictEqual({ ...link, lastReadAt: 3_000 });
  expect(findCalendarLinkByHash(db, 'ef'.repeat(32))).toBeNull();
  expect(removeCalendarLink(db, 'another-site', link.id)).toBe(false);
  expect(removeCalendarLink(db, sampleSite.id, link.id)).toBe(true);
  expect(findCalendarLinkByHash(db, link.secretHash)).toBeNull();
  close();
});

test('two links never share a secret', () => {
  const { db, close } = storeWithSamples();
  insertCalendarLink(db, link);
  expect(() => insertCalendarLink(db, { ...link, id: 'link-2' })).toThrow(/UNIQUE/);
  close();
});

const due = (uid: string, rest: Partial<DueEvent> = {}): DueEvent => ({
  uid,
  siteId: sampleSite.id,
  evening: '2026-10-30',
  sequence: 0,
  createdAt: 1_000,
  modifiedAt: 1_000,
  state: 'due',
  fingerprint: 'first',
  propIds: ['prop-1'],
  ...rest,
});

test('due events are kept, changed, dropped, and those of another site left alone', () => {
  const { db, close } = storeWithSamples();
  insertSite(db, { ...sampleSite, id: 'other' });
  const elsewhere = due('c', { siteId: 'other' });
  saveDueEvents(db, 'other', [elsewhere]);
  saveDueEvents(db, sampleSite.id, [due('b', { evening: '2026-10-31' }), due('a')]);
  expect(listDueEvents(db, sampleSite.id).map((event) => event.uid)).toEqual(['a', 'b']);
  const changed = due('b', {
    sequence: 1,
    modifiedAt: 2_000,
    state: 'cancelled',
    fingerprint: 'second',
    propIds: [],
  });
  saveDueEvents(db, sampleSite.id, [changed]);
  expect(listDueEvents(db, sampleSite.id)).toStrictEqual([changed]);
  saveDueEvents(db, sampleSite.id, []);
  expect(listDueEvents(db, sampleSite.id)).toEqual([]);
  expect(listDueEvents(db, 'other')).toStrictEqual([elsewhere]);
  close();
});

test('an event cannot be taken over by another site', () => {
  const { db, close } = storeWithSamples();
  insertSite(db, { ...sampleSite, id: 'other' });
  saveDueEvents(db, 'other', [due('c', { siteId: 'other' })]);
  expect(() => saveDueEvents(db, sampleSite.id, [due('c')])).toThrow(/belongs to another site/);
  close();
});

test('a replay comes back once saved, is never overwritten, and is forgotten by age', () => {
  const { db, close } = storeWithSamples();
  const key = 'POST /api/props/prop-1/swaps 7f1c';
  expect(findReplay(db, key)).toBeNull();
  saveReplay(db, { key, bodyHash: 'h1', status: 201, body: '{"id":"swap-1"}', at: 1_000 });
  expect(() => saveReplay(db, { key, bodyHash: 'h2', status: 201, body: '{}', at: 2_000 })).toThrow(/UNIQUE/);
  expect(findReplay(db, key)).toStrictEqual({ bodyHash: 'h1', status: 201, body: '{"id":"swap-1"}' });
  expect(dropReplaysBefore(db, 1_000)).toBe(0);
  expect(dropReplaysBefore(db, 1_001)).toBe(1);
  expect(findReplay(db, key)).toBeNull();
  close();
});
