import { mkdirSync } from 'node:fs';
import path from 'node:path';
import SqliteDatabase, { type Database } from 'better-sqlite3';
import { type BetterSQLite3Database, drizzle } from 'drizzle-orm/better-sqlite3';
import { migrate, schemaVersionOf } from './migrate.ts';
import * as schema from './schema.ts';
import { StoreError } from './store-error.ts';

export type Db = BetterSQLite3Database<typeof schema>;

export type Store = {
  db: Db;
  /** Number of migrations the database has had. */
  schemaVersion: number;
  close(): void;
  /** Does the deed in one write transaction, all of it or nothing; the deed must not be async. */
  transact<T>(deed: (db: Db) => T): T;
};

const BUSY_TIMEOUT_MS = 5000;

/** Turning WAL on needs the file alone for a moment and does not wait its turn by itself. */
function useWriteAheadLog(client: Database): void {
  for (let attempt = 1; ; attempt++) {
    try {
      client.pragma('journal_mode = wal');
      return;
    } catch (error) {
      if (!isBusy(error) || attempt === 50) throw error;
      Atomics.wait(new Int32Array(new SharedArrayBuffer(4)), 0, 0, BUSY_TIMEOUT_MS / 50);
    }
  }
}

function codeOf(error: unknown): string {
  return error instanceof SqliteDatabase.SqliteError ? error.code : '';
}

function isBusy(error: unknown): boolean {
  return codeOf(error).startsWith('SQLITE_BUSY');
}

/** What better-sqlite3 says, as a sentence for the console; anything unforeseen passes through. */
function explain(error: unknown, file: string): unknown {
  const code = codeOf(error);
  if (code === 'SQLITE_NOTADB' || code.startsWith('SQLITE_CORRUPT')) {
    return new StoreError(
      `${file} is not a database, or is damaged. Name another file, or put a copy in its place.`,
    );
  }
  if (code.startsWith('SQLITE_CANTOPEN')) {
    return new StoreError(`${file} cannot be opened: is it a folder, or in one that may not be written to?`);
  }
  if (code.startsWith('SQLITE_READONLY'))
    return new StoreError(`${file} may not be written to: check its permissions.`);
  if (isBusy(error)) {
    return new StoreError(
      `${file} is held by another program; ${BUSY_TIMEOUT_MS / 1000} s were waited. Close that program and start again.`,
    );
  }
  if (error instanceof StoreError) return new StoreError(`${file}: ${error.message}`);
  return error;
}

function connect(file: string): Database {
  if (file === ':memory:') return new SqliteDatabase(file);
  try {
    mkdirSync(path.dirname(path.resolve(file)), { recursive: true });
  } catch {
    throw new StoreError('the folder for it cannot be made. Name a place that may be written to.');
  }
  return new SqliteDatabase(file, { timeout: BUSY_TIMEOUT_MS });
}

function prepareConnection(client: Database, onProgress?: (text: string) => void): void {
  client.pragma(`busy_timeout = ${BUSY_TIMEOUT_MS}`);
  // Read before anything is written, so that another program's database stays as it was.
  schemaVersionOf(client);
  useWriteAheadLog(client);
  // Full, so that what was acknowledged survives a power cut too; with WAL the default would be lost commits.
  client.pragma('synchronous = full');
  migrate(client, onProgress ? { onProgress } : {});
  client.pragma('foreign_keys = on');
  client.pragma('optimize = 0x10002');
}

/**
 * Opens (or makes) the database and brings it to this version's schema.
 * @param file path, its folder is made when missing; ':memory:' for one that ends with the process
 * @param options `onProgress` is told each schema step
 * @throws StoreError when the file is not a database, another program's, from a newer version, or may not be written
 */
export function openStore(file: string, options: { onProgress?: (text: string) => void } = {}): Store {
  let client: Database | undefined;
  try {
    client = connect(file);
    prepareConnection(client, options.onProgress);
  } catch (error) {
    client?.close();
    throw explain(error, file);
  }
  const opened = client;
  const db: Db = drizzle(opened, { schema, casing: 'snake_case' });
  return {
    db,
    schemaVersion: schemaVersionOf(opened),
    close: () => {
      if (opened.open) opened.close();
    },
    transact: (deed) => opened.transaction(() => deed(db)).immediate(),
  };
}
