import type { CellType } from '../../server/model/cell-type.ts';
import type { Sighting, Swap } from '../../server/model/log-entry.ts';
import type { Prop } from '../../server/model/prop.ts';
import type { Site } from '../../server/model/site.ts';
import { type Db, openStore, type Store } from '../../server/store/open.ts';
import { insertProp } from '../../server/store/props.ts';
import { insertSite } from '../../server/store/sites.ts';

// Invented values, one of each kind, with every optional field left out.

export const sampleSite: Site = {
  id: 'mill-walk',
  name: 'Mill Walk',
  latitudeDeg: 54.4,
  longitudeDeg: -2.96,
  timeZone: 'Europe/London',
  seasonFrom: '2026-10-16',
  seasonThrough: '2026-11-08',
  monthlyMinC: [0.5, 0.4, 1.5, 3, 5.5, 8.5, 10.5, 10.3, 8.4, 6, 3, 1],
  monthlyMaxC: [6, 6.5, 8.5, 11, 14.5, 17, 18.5, 18.2, 16, 12.5, 9, 6.8],
  confidence: 0.9,
  marginNights: 1,
  rounds: {
    weekdays: [3, 6],
    startsAt: '16:30',
    minutesFree: 90,
    minutesPerStop: 4,
    walkMinutes: 35,
    cost: 12.5,
  },
  zoneOffsetsC: { 'Mill Race': -3 },
};

export const sampleProp: Prop = {
  id: 'prop-1',
  siteId: sampleSite.id,
  tag: 'B-06',
  name: 'Heron',
  zone: 'Mill Race',
  units: 1,
  importance: 'feature',
  cellTypeId: 'LR6',
  series: 3,
  parallel: 1,
  dimVolts: 3.1,
  load: { behaviour: 'fades', meanMa: 22, standbyMa: 0.08 },
  switching: { kind: 'light-sensor', onLux: 12, skyShare: 0.4, cutOffHours: 6 },
};

export const sampleCellType: CellType = {
  id: 'shed-box',
  name: 'The box in the shed',
  kind: 'zinc-carbon',
  capacityMah: 950,
  nominalVolts: 1.5,
  cellsInside: 1,
  massG: 18,
  rechargeable: false,
  builtIn: false,
};

export const sampleSwap: Swap = {
  kind: 'swap',
  id: 'swap-1',
  propId: sampleProp.id,
  at: Date.UTC(2026, 9, 17, 15),
  recordedAt: Date.UTC(2026, 9, 17, 15, 2),
  state: 'new',
};

export const sampleSighting: Sighting = {
  kind: 'sighting',
  id: 'sighting-1',
  propId: sampleProp.id,
  at: Date.UTC(2026, 9, 21, 19),
  recordedAt: Date.UTC(2026, 9, 21, 20),
  seen: 'bright',
};

/** An empty store in memory with the sample site on it, and the sample prop on that. */
export function storeWithSamples(): Store & { db: Db } {
  const store = openStore(':memory:');
  insertSite(store.db, sampleSite);
  insertProp(store.db, sampleProp);
  return store;
}

/** The connection under a database, for looking at what SQL alone can show. */
export function clientOf(db: Db): import('better-sqlite3').Database {
  return (db as unknown as { $client: import('better-sqlite3').Database }).$client;
}
