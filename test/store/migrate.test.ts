import { cpSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import SqliteDatabase, { type Database } from 'better-sqlite3';
import { generateSQLiteDrizzleJson, generateSQLiteMigration } from 'drizzle-kit/api';
import { describe, expect, onTestFinished, test } from 'vitest';
import { findEntry } from '../../server/store/log.ts';
import { migrate, schemaVersionOf } from '../../server/store/migrate.ts';
import { openStore } from '../../server/store/open.ts';
import { findProp } from '../../server/store/props.ts';
import * as schema from '../../server/store/schema.ts';
import { findSite } from '../../server/store/sites.ts';
import { clientOf, sampleProp, sampleSighting, sampleSite, sampleSwap } from './samples.ts';
import { temporaryFolder } from './temporary-folder.ts';

const committed = fileURLToPath(new URL('../../migrations', import.meta.url));

type Journal = { entries: { idx: number; tag: string; when: number }[] };
const journal = (folder: string) =>
  JSON.parse(readFileSync(path.join(folder, 'meta', '_journal.json'), 'utf8')) as Journal;

/** A copy of the migrations, with only the first few of them in the journal. */
function firstMigrations(count: number): string {
  const folder = path.join(temporaryFolder(), 'migrations');
  cpSync(committed, folder, { recursive: true });
  const { entries, ...rest } = journal(folder);
  writeJournal(folder, { ...rest, entries: entries.slice(0, count) });
  return folder;
}

function writeJournal(folder: string, content: Journal): void {
  mkdirSync(path.join(folder, 'meta'), { recursive: true });
  writeFileSync(path.join(folder, 'meta', '_journal.json'), JSON.stringify(content));
}

/** Migrations of a made-up herd: [tag, SQL, when]. */
function ownMigrations(...steps: [tag: string, sql: string, when: number][]): string {
  const folder = temporaryFolder();
  for (const [tag, sql] of steps) writeFileSync(path.join(folder, `${tag}.sql`), sql);
  writeJournal(folder, { entries: steps.map(([tag, , when], idx) => ({ idx, tag, when })) });
  return folder;
}

function memory(): Database {
  const client = new SqliteDatabase(':memory:');
  onTestFinished(() => {
    client.close();
  });
  return client;
}

const tables = (client: Database) =>
  client
    .prepare("select name from sqlite_master where type = 'table' and name not glob 'sqlite_*'")
    .pluck()
    .all();

describe('this schema', () => {
  const total = journal(committed).entries.length;

  test('there are earlier schemas to come from', () => {
    expect(total).toBeGreaterThanOrEqual(2);
  });

  test.each(Array.from({ length: total - 1 }, (_, index) => index + 1))(
    'rows survive the way from schema %i to the newest',
    (earlier) => {
      const file = path.join(temporaryFolder(), 'earlier.db');
      const client = new SqliteDatabase(file);
      migrate(client, { folder: firstMigrations(earlier) });
      expect(schemaVersionOf(client)).toBe(earlier);
      // Written as plain SQL into the tables as they were then: later columns do not exist yet.
      insertAsOf0(client);
      client.close();

      const store = openStore(file);
      expect(store.schemaVersion).toBe(total);
      expect(findSite(store.db, sampleSite.id)).toStrictEqual(sampleSite);
      expect(findProp(store.db, sampleProp.id)).toStrictEqual(sampleProp);
      expect(findEntry(store.db, sampleSwap.id)).toStrictEqual(sampleSwap);
      expect(findEntry(store.db, sampleSighting.id)).toStrictEqual(sampleSighting);
      expect(clientOf(store.db).pragma('integrity_check', { simple: true })).toBe('ok');
      store.close();
    },
  );

  test('what the tables say in code is what the migrations make', async () => {
    const newest = journal(committed).entries.at(-1)!;
    const snapshotFile = `${newest.tag.slice(0, 4)}_snapshot.json`;
    const snapshot = JSON.parse(readFileSync(path.join(committed, 'meta', snapshotFile), 'utf8'));
    const inCode = await generateSQLiteDrizzleJson(schema, snapshot.id, 'snake_case');
    expect(await generateSQLiteMigration(snapshot, inCode)).toEqual([]);

    const nothing = await generateSQLiteDrizzleJson({});
    const fromCode = memory();
    for (const statement of await generateSQLiteMigration(nothing, inCode)) fromCode.exec(statement);
    const migrated = memory();
    migrate(migrated);
    expect(described(migrated)).toEqual(described(fromCode));
  });
});

/** Tables and indexes with their SQL, however quoted, without the migrator's own table. */
function described(client: Database): string[] {
  const rows = client
    .prepare<[], { name: string; sql: string }>(
      "select name, sql from sqlite_master where sql is not null and name <> '__drizzle_migrations' order by name",
    )
    .all();
  return rows.map((row) => `${row.name}: ${row.sql.replace(/[`"]/g, '').replace(/\s+/g, ' ')}`);
}

function insertAsOf0(client: Database): void {
  const put = (table: string, row: Record<string, unknown>) => {
    const columns = Object.keys(row);
    client
      .prepare(`insert into ${table} (${columns.join(', ')}) values (${columns.map(() => '?').join(', ')})`)
      .run(...Object.values(row));
  };
  put('sites', {
    id: sampleSite.id,
    name: sampleSite.name,
    latitude_deg: sampleSite.latitudeDeg,
    longitude_deg: sampleSite.longitudeDeg,
    time_zone: sampleSite.timeZone,
    season_from: sampleSite.seasonFrom,
    season_through: sampleSite.seasonThrough,
    monthly_min_c: JSON.stringify(sampleSite.monthlyMinC),
    monthly_max_c: JSON.stringify(sampleSite.monthlyMaxC),
    confidence: sampleSite.confidence,
    margin_nights: sampleSite.marginNights,
    rounds: JSON.stringify(sampleSite.rounds),
    zone_offsets_c: JSON.stringify(sampleSite.zoneOffsetsC),
  });
  put('props', {
    id: sampleProp.id,
    site_id: sampleProp.siteId,
    tag: sampleProp.tag,
    tag_order: 'b-016',
    name: sampleProp.name,
    zone: sampleProp.zone,
    units: sampleProp.units,
    importance: sampleProp.importance,
    cell_type_id: sampleProp.cellTypeId,
    series: sampleProp.series,
    parallel: sampleProp.parallel,
    dim_volts: sampleProp.dimVolts,
    load: JSON.stringify(sampleProp.load),
    switching: JSON.stringify(sampleProp.switching),
  });
  const entry = { prop_id: sampleProp.id };
  put('log', {
    ...entry,
    id: sampleSwap.id,
    kind: 'swap',
    at_ms: sampleSwap.at,
    recorded_at_ms: sampleSwap.recordedAt,
    state: sampleSwap.state,
  });
  put('log', {
    ...entry,
    id: sampleSighting.id,
    kind: 'sighting',
    at_ms: sampleSighting.at,
    recorded_at_ms: sampleSighting.recordedAt,
    seen: sampleSighting.seen,
  });
}

describe('the migrator', () => {
  const herd = `create table herds (id integer primary key);--> statement-breakpoint
    create table sheep (id integer primary key, herd_id integer not null references herds (id) on delete cascade);`;

  test('children survive when the table they belong to is built anew', () => {
    const client = memory();
    migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000]) });
    client.exec('insert into herds values (1); insert into sheep values (1, 1), (2, 1)');
    // The statements drizzle-kit writes when a column changes.
    const rebuild = `PRAGMA foreign_keys=OFF;--> statement-breakpoint
      create table __new_herds (id integer primary key, name text default 'north' not null);--> statement-breakpoint
      insert into __new_herds (id) select id from herds;--> statement-breakpoint
      drop table herds;--> statement-breakpoint
      alter table __new_herds rename to herds;--> statement-breakpoint
      PRAGMA foreign_keys=ON;`;
    migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000], ['0001_names', rebuild, 2000]) });
    expect(client.prepare('select count(*) from sheep').pluck().get()).toBe(2);
    expect(client.prepare('select name from herds').pluck().all()).toEqual(['north']);
    expect(client.pragma('foreign_keys', { simple: true })).toBe(1);
  });

  test('a step older than the newest applied one is still applied', () => {
    const client = memory();
    const late: [string, string, number] = ['0002_late', 'create table late (id integer);', 3000];
    migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000], late) });
    const merged: [string, string, number] = ['0001_merged', 'create table merged (id integer);', 2000];
    migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000], merged, late) });
    expect(tables(client)).toContain('merged');
    expect(schemaVersionOf(client)).toBe(3);
  });

  test('a step that fails takes the whole way back', () => {
    const client = memory();
    const broken: [string, string, number] = [
      '0001_broken',
      'create table half (id integer);--> statement-breakpoint creat',
      2000,
    ];
    expect(() => migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000], broken) })).toThrow(
      /syntax/,
    );
    expect(tables(client)).toEqual([]);
    expect(client.pragma('foreign_keys', { simple: true })).toBe(1);
  });

  test('a step that would leave rows without their parent is taken back', () => {
    const client = memory();
    migrate(client, { folder: ownMigrations(['0000_herd', herd, 1000]) });
    client.exec('insert into herds values (1); insert into sheep values (1, 1)');
    const folder = ownMigrations(['0000_herd', herd, 1000], ['0001_cull', 'delete from herds;', 2000]);
    expect(() => migrate(client, { folder })).toThrow(/1 rows of sheep would belong to nothing/);
    expect(client.prepare('select count(*) from herds').pluck().get()).toBe(1);
    expect(schemaVersionOf(client)).toBe(1);
  });
});
