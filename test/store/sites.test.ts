import { expect, test } from 'vitest';
import { insertCalendarLink } from '../../server/store/calendar-links.ts';
import { saveDueEvents } from '../../server/store/due-evenings.ts';
import { insertEntry } from '../../server/store/log.ts';
import { replaceShowNights } from '../../server/store/show-nights.ts';
import {
  findSite,
  insertSite,
  listSites,
  raiseAllRevisions,
  raiseRevision,
  removeSite,
  siteChangedAt,
  siteRevision,
  updateSite,
} from '../../server/store/sites.ts';
import { saveHours, saveTypedNight, saveTypicalYear } from '../../server/store/weather.ts';
import { clientOf, sampleSighting, sampleSite, sampleSwap, storeWithSamples } from './samples.ts';

test('a site comes back as it went in, and as it was changed', () => {
  const { db, close } = storeWithSamples();
  expect(findSite(db, sampleSite.id)).toStrictEqual(sampleSite);
  const changed = {
    ...sampleSite,
    name: 'Mühlenweg 🎃',
    latitudeDeg: -54.4,
    zoneOffsetsC: {},
    marginNights: 0,
  };
  updateSite(db, changed);
  expect(findSite(db, sampleSite.id)).toStrictEqual(changed);
  expect(findSite(db, 'nobody')).toBeNull();
  close();
});

test('pages of sites go by name, then id, and miss none', () => {
  const { db, close } = storeWithSamples();
  for (const [id, name] of [
    ['b', 'Mill Walk'],
    ['a', 'Mill Walk'],
    ['z', 'Abbey'],
    ['y', 'Yew Lane'],
  ] as const) {
    insertSite(db, { ...sampleSite, id, name });
  }
  const ids = (page: { limit: number; after?: string }) => listSites(db, page).map((site) => site.id);
  expect(ids({ limit: 10 })).toEqual(['z', 'a', 'b', 'mill-walk', 'y']);
  expect(ids({ limit: 2 })).toEqual(['z', 'a']);
  expect(ids({ limit: 2, after: 'a' })).toEqual(['b', 'mill-walk']);
  expect(ids({ limit: 2, after: 'mill-walk' })).toEqual(['y']);
  expect(ids({ limit: 2, after: 'y' })).toEqual([]);
  expect(ids({ limit: 2, after: 'gone' })).toEqual([]);
  close();
});

test('a revision rises only when it is raised, for one site or for all', () => {
  const { db, close } = storeWithSamples();
  insertSite(db, { ...sampleSite, id: 'other' });
  updateSite(db, { ...sampleSite, name: 'Renamed' });
  expect(siteRevision(db, sampleSite.id)).toBe(0);
  raiseRevision(db, sampleSite.id, 1_000);
  raiseRevision(db, sampleSite.id, 2_000);
  raiseAllRevisions(db, 3_000);
  expect([siteRevision(db, sampleSite.id), siteChangedAt(db, sampleSite.id)]).toEqual([3, 3_000]);
  expect([siteRevision(db, 'other'), siteChangedAt(db, 'other')]).toEqual([1, 3_000]);
  updateSite(db, sampleSite);
  expect(siteRevision(db, sampleSite.id)).toBe(3);
  close();
});

test('with a site goes all that is on it, and nothing of another', () => {
  const { db, close } = storeWithSamples();
  const everyHour = new Float32Array(8760);
  const fill = (siteId: string) => {
    replaceShowNights(db, siteId, [
      {
        evening: '2026-10-30',
        opensAt: '18:30',
        closesAt: '21:30',
        calledOff: false,
        addedAt: 0,
        calledOffAt: null,
      },
    ]);
    saveHours(db, siteId, { startAt: 0, tempC: Float32Array.of(1) });
    saveTypicalYear(db, siteId, { standardOffsetHours: 0, tempC: everyHour, stationName: 'X' });
    saveTypedNight(db, siteId, '2026-10-30', { minC: 1, maxC: 2 }, 0);
    insertCalendarLink(db, {
      id: siteId,
      siteId,
      secretHash: `hash-of-${siteId}`.padEnd(64, '0'),
      label: null,
      alarms: true,
      createdAt: 0,
    });
    saveDueEvents(db, siteId, [
      {
        uid: siteId,
        siteId,
        evening: '2026-10-30',
        sequence: 0,
        createdAt: 0,
        modifiedAt: 0,
        state: 'due',
        fingerprint: 'f',
        propIds: [],
      },
    ]);
  };
  insertSite(db, { ...sampleSite, id: 'other' });
  fill(sampleSite.id);
  fill('other');
  insertEntry(db, sampleSwap);
  insertEntry(db, sampleSighting);

  expect(removeSite(db, sampleSite.id)).toBe(true);
  expect(removeSite(db, sampleSite.id)).toBe(false);
  const rows = (table: string) => clientOf(db).prepare(`select count(*) from ${table}`).pluck().get();
  expect([rows('props'), rows('log')]).toEqual([0, 0]);
  for (const table of [
    'sites',
    'show_nights',
    'weather_months',
    'typical_years',
    'typed_nights',
    'calendar_links',
    'due_evenings',
  ]) {
    expect([table, rows(table)]).toEqual([table, 1]);
  }
  close();
});
