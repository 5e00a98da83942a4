import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import SqliteDatabase from 'better-sqlite3';
import { expect, test } from 'vitest';
import { openStore } from '../../server/store/open.ts';
import { findSite, insertSite } from '../../server/store/sites.ts';
import { StoreError } from '../../server/store/store-error.ts';
import { clientOf, sampleSite } from './samples.ts';
import { temporaryFolder } from './temporary-folder.ts';

test('an empty file, as mktemp leaves one, becomes a database', () => {
  const file = path.join(temporaryFolder(), 'empty.db');
  writeFileSync(file, '');
  const store = openStore(file);
  insertSite(store.db, sampleSite);
  store.close();
  const again = openStore(file);
  expect(findSite(again.db, sampleSite.id)).toStrictEqual(sampleSite);
  again.close();
});

test('missing folders are made, and each schema step is told', () => {
  const file = path.join(temporaryFolder(), 'some', 'where', 'new.db');
  const told: string[] = [];
  const store = openStore(file, { onProgress: (text) => told.push(text) });
  store.close();
  expect(existsSync(file)).toBe(true);
  expect(told).toHaveLength(store.schemaVersion);
  openStore(file, { onProgress: (text) => told.push(text) }).close();
  expect(told).toHaveLength(store.schemaVersion);
});

// Source: SQLite's documentation of PRAGMA synchronous, where FULL is 2; in WAL mode only FULL syncs at each commit.
test('commits are synced, foreign keys hold, a busy file is waited for', () => {
  const store = openStore(path.join(temporaryFolder(), 'pragmas.db'));
  const client = clientOf(store.db);
  expect(client.pragma('journal_mode', { simple: true })).toBe('wal');
  expect(client.pragma('synchronous', { simple: true })).toBe(2);
  expect(client.pragma('foreign_keys', { simple: true })).toBe(1);
  expect(client.pragma('busy_timeout', { simple: true })).toBe(5000);
  store.close();
});

test('closing twice is harmless and leaves no journal beside the file', () => {
  const file = path.join(temporaryFolder(), 'closed.db');
  const store = openStore(file);
  insertSite(store.db, sampleSite);
  store.close();
  store.close();
  expect(existsSync(`${file}-wal`)).toBe(false);
});

test('a file that is no database is refused by name and left alone', () => {
  const file = path.join(temporaryFolder(), 'letter.txt');
  const letter = 'Dear crew, the keys are under the heron. '.repeat(50);
  writeFileSync(file, letter);
  expect(() => openStore(file)).toThrow(StoreError);
  expect(() => openStore(file)).toThrow(/letter\.txt is not a database/);
  expect(readFileSync(file, 'utf8')).toBe(letter);
});

test('a database of another program is refused and left alone', () => {
  const file = path.join(temporaryFolder(), 'bees.db');
  const other = new SqliteDatabase(file);
  other.exec('create table hives (id integer primary key)');
  other.close();
  const before = readFileSync(file);
  expect(() => openStore(file)).toThrow(/bees\.db: .*another program \(hives\)/);
  expect(readFileSync(file).equals(before)).toBe(true);
});

test('a database from a newer version is refused and left alone', () => {
  const file = path.join(temporaryFolder(), 'newer.db');
  const store = openStore(file);
  store.close();
  const newer = new SqliteDatabase(file);
  newer
    .prepare("insert into __drizzle_migrations (hash, created_at) values ('later', ?)")
    .run(Date.UTC(2199, 0, 1));
  newer.close();
  const before = readFileSync(file);
  expect(() => openStore(file)).toThrow(StoreError);
  expect(() => openStore(file)).toThrow(
    new RegExp(`newer Duskround: it has ${store.schemaVersion + 1} schema steps, 1 of them unknown`),
  );
  expect(readFileSync(file).equals(before)).toBe(true);
});

test('a folder in place of a file is refused in a sentence', () => {
  expect(() => openStore(temporaryFolder())).toThrow(StoreError);
  expect(() => openStore(temporaryFolder())).toThrow(/is it a folder/);
});

test('a folder that cannot be made is refused in a sentence', () => {
  const file = path.join(temporaryFolder(), 'plain-file');
  writeFileSync(file, 'x');
  expect(() => openStore(path.join(file, 'inside.db'))).toThrow(
    /inside\.db: the folder for it cannot be made/,
  );
});

test('a deed that fails leaves nothing behind, one that succeeds gives its value', () => {
  const store = openStore(':memory:');
  expect(() =>
    store.transact((db) => {
      insertSite(db, sampleSite);
      throw new Error('the gate is locked');
    }),
  ).toThrow('the gate is locked');
  expect(findSite(store.db, sampleSite.id)).toBeNull();
  const kept = store.transact((db) => {
    insertSite(db, sampleSite);
    return 'kept';
  });
  expect(kept).toBe('kept');
  expect(findSite(store.db, sampleSite.id)).toStrictEqual(sampleSite);
  store.close();
});

test('an async deed is refused and leaves nothing behind', () => {
  const store = openStore(':memory:');
  expect(() => store.transact(async (db) => insertSite(db, sampleSite))).toThrow(/promise/i);
  expect(findSite(store.db, sampleSite.id)).toBeNull();
  store.close();
});
