import { mkdtempSync, rmSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { build } from 'vite';
import { demoDeps } from '../../seed-demo/deps.ts';
import { DEMO_AS_OF, playSeason } from '../../seed-demo/season.ts';
import { buildApp } from '../../server/app.ts';
import { type Clock, fixedClock } from '../../server/clock.ts';
import { openStore } from '../../server/store/open.ts';

const ROOT = path.join(import.meta.dirname, '..', '..');

export type ServedPages = {
  /** 'http://127.0.0.1:…', without a slash at the end. */
  url: string;
  /** Of the demo's props, by tag. */
  propIds: Map<string, string>;
  close: () => Promise<void>;
};

/**
 * The whole service with pages built afresh, on a port of its own.
 * @param options.demo with the demo's site, shown as of its fixed morning; else with nothing in it
 * @param options.clock another clock than the fixed one of the demo
 */
export async function servePagesForTest(options: { demo: boolean; clock?: Clock }): Promise<ServedPages> {
  const webRoot = mkdtempSync(path.join(tmpdir(), 'duskround-pages-'));
  await build({
    configFile: path.join(ROOT, 'web', 'vite.config.ts'),
    build: { outDir: webRoot, emptyOutDir: true },
    logLevel: 'warn',
  });
  const store = openStore(':memory:');
  if (options.demo) playSeason(demoDeps(store));
  const clock = options.clock ?? fixedClock(Date.parse(DEMO_AS_OF));
  const app = buildApp({ store, clock, webRoot, writesPerMinute: 1_000_000 });
  await app.listen({ port: 0, host: '127.0.0.1' });
  const url = `http://127.0.0.1:${(app.server.address() as AddressInfo).port}`;
  return {
    url,
    propIds: options.demo ? await propIdsAt(url) : new Map(),
    close: async () => {
      await app.close();
      store.close();
      rmSync(webRoot, { recursive: true, force: true });
    },
  };
}

async function propIdsAt(url: string): Promise<Map<string, string>> {
  const [site] = (await (await fetch(`${url}/api/sites`)).json()) as { id: string }[];
  const props = (await (await fetch(`${url}/api/props?siteId=${site!.id}`)).json()) as {
    id: string;
    tag: string;
  }[];
  return new Map(props.map(({ id, tag }) => [tag, id]));
}
