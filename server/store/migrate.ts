// Brings a database to this version's schema. drizzle's own migrator is not used: it rebuilds tables with
// foreign keys on (which deletes their children), lets two processes apply the same step at once, and skips a
// step older than the newest applied one.

import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Database } from 'better-sqlite3';
import { readMigrationFiles } from 'drizzle-orm/migrator';
import { StoreError } from './store-error.ts';

/** The table and columns drizzle's own migrator uses, so that its tools can read them. */
const APPLIED = '__drizzle_migrations';

/**
 * The built code lies one folder deeper than the source, so the folder is found from package.json. The settings look
 * for it alike; a store opens without them, and each says in its own words what is missing.
 */
function migrationsFolder(): string {
  let folder = path.dirname(fileURLToPath(import.meta.url));
  while (!existsSync(path.join(folder, 'package.json'))) {
    const parent = path.dirname(folder);
    if (parent === folder)
      throw new StoreError('The migrations folder is missing: no package.json above the program.');
    folder = parent;
  }
  return path.join(folder, 'migrations');
}

function tableNames(client: Database): string[] {
  return client
    .prepare<[], string>(
      "select name from sqlite_master where type = 'table' and name not like 'sqlite\\_%' escape '\\'",
    )
    .pluck()
    .all();
}

/** Timestamps of the applied migrations; refuses a file whose tables are another program's. */
function appliedTimes(client: Database): Set<number> {
  const names = tableNames(client);
  if (!names.includes(APPLIED)) {
    if (names.length === 0) return new Set();
    throw new StoreError(
      `This database holds tables of another program (${names.slice(0, 3).join(', ')}). Name a new file for Duskround, or the one it made before.`,
    );
  }
  return new Set(client.prepare<[], number>(`select created_at from ${APPLIED}`).pluck().all());
}

/**
 * How many migrations a database has had: the schema version.
 * @param client an open connection
 * @throws StoreError when the tables are another program's
 */
export function schemaVersionOf(client: Database): number {
  return appliedTimes(client).size;
}

/**
 * Applies what is missing, all of it or nothing. Several processes may call it at once: one does the work.
 * @param client an open connection outside a transaction; foreign keys are on afterwards
 * @param options `folder`: where the migrations are, this program's own when absent; `onProgress` is told each step
 * @throws StoreError when the database is newer than the folder, another program's, or fails its foreign key check
 */
export function migrate(
  client: Database,
  options: { folder?: string; onProgress?: (text: string) => void } = {},
): void {
  const steps = readMigrationFiles({ migrationsFolder: options.folder ?? migrationsFolder() });
  const pending = () => {
    const applied = appliedTimes(client);
    const unknown = [...applied].filter((time) => !steps.some((step) => step.folderMillis === time)).length;
    if (unknown > 0) {
      throw new StoreError(
        `This database was made by a newer Duskround: it has ${applied.size} schema steps, ${unknown} of them unknown to this version, which knows ${steps.length}. Start the newer version, or take a copy made before.`,
      );
    }
    return steps.filter((step) => !applied.has(step.folderMillis));
  };
  if (pending().length === 0) return;

  client.pragma('foreign_keys = off');
  try {
    client
      .transaction(() => {
        client.exec(
          `create table if not exists ${APPLIED} (id integer primary key, hash text not null, created_at numeric)`,
        );
        const missing = pending();
        for (const [index, step] of missing.entries()) {
          options.onProgress?.(`Preparing the database: step ${index + 1} of ${missing.length}.`);
          for (const statement of step.sql) client.exec(statement);
          client
            .prepare(`insert into ${APPLIED} (hash, created_at) values (?, ?)`)
            .run(step.hash, step.folderMillis);
        }
        const orphans = client.pragma('foreign_key_check') as { table: string }[];
        if (orphans.length > 0) {
          throw new StoreError(
            `The database was left as it was: ${orphans.length} rows of ${orphans[0]!.table} would belong to nothing after the change. Restore a copy, or remove those rows.`,
          );
        }
      })
      .immediate();
  } finally {
    client.pragma('foreign_keys = on');
  }
}
