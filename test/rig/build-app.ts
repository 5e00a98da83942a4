import type { FastifyInstance } from 'fastify';
import request from 'supertest';
import { expect, onTestFinished } from 'vitest';
import { type AppOptions, buildApp } from '../../server/app.ts';
import { settableClock } from '../../server/clock.ts';
import type { Instant } from '../../server/model/evening.ts';
import { openStore, type Store } from '../../server/store/open.ts';
import { type ApiDocument, listenIn, undocumented } from './as-documented.ts';

/** Thursday, three weeks into the season of `aSite`. */
export const NOW = Date.UTC(2026, 9, 22, 9);

export type Rig = {
  app: FastifyInstance;
  store: Store;
  clock: ReturnType<typeof settableClock>;
  /** Asks the app as a program on the same machine would. */
  ask: ReturnType<typeof request>;
};

/**
 * A whole app of its own: a database in memory and a clock to set. It ends with the test, which fails if any answer
 * was not as the API describes it.
 * @param options what is not as usual; `at` is what the clock shows first
 */
export async function aRig(options: Partial<AppOptions> & { at?: Instant } = {}): Promise<Rig> {
  const { at, store = openStore(':memory:'), ...rest } = options;
  const clock = settableClock(at ?? NOW);
  const app = buildApp({ store, clock, writesPerMinute: 1_000_000, ...rest });
  const sent = listenIn(app);
  await app.ready();
  onTestFinished(async () => {
    const document = app.swagger() as unknown as ApiDocument;
    expect(sent.map((answer) => undocumented(document, answer)).filter((fault) => fault !== null)).toEqual(
      [],
    );
    await app.close();
    store.close();
  });
  return { app, store, clock, ask: request(app.server) };
}

/** Everything the database holds, to see that a refused request changed nothing. */
export function dumpOf(store: Store): string {
  const client = (store.db as unknown as { $client: import('better-sqlite3').Database }).$client;
  const tables = client
    .prepare("select name from sqlite_master where type = 'table' order by name")
    .pluck()
    .all();
  return JSON.stringify(tables.map((table) => [table, client.prepare(`select * from "${table}"`).all()]));
}
