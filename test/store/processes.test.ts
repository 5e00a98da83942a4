import { type ChildProcessWithoutNullStreams, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import path from 'node:path';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { build } from 'vite';
import { afterAll, beforeAll, expect, onTestFinished, test } from 'vitest';
import { findEntry } from '../../server/store/log.ts';
import { openStore } from '../../server/store/open.ts';
import { clientOf } from './samples.ts';
import { temporaryFolder } from './temporary-folder.ts';

// Node 20 runs no TypeScript, so the child is built first; inside the repository, so that it finds its packages.
const repository = fileURLToPath(new URL('../..', import.meta.url));
let builtFolder = '';

beforeAll(async () => {
  builtFolder = mkdtempSync(path.join(repository, 'node_modules', '.store-child-'));
  await build({
    root: repository,
    configFile: false,
    logLevel: 'error',
    build: {
      ssr: 'test/store/store-child.ts',
      outDir: builtFolder,
      rolldownOptions: { output: { entryFileNames: 'child.mjs' } },
    },
  });
});
afterAll(() => rmSync(builtFolder, { recursive: true, force: true }));

type Child = { child: ChildProcessWithoutNullStreams; lines: string[]; errors: string[] };

async function readyChild(deed: 'open' | 'write', file: string): Promise<Child> {
  const child = spawn(process.execPath, [path.join(builtFolder, 'child.mjs'), deed, file]);
  onTestFinished(() => {
    child.kill('SIGKILL');
  });
  const lines: string[] = [];
  const errors: string[] = [];
  child.stderr.on('data', (text) => errors.push(String(text)));
  const reader = createInterface({ input: child.stdout });
  reader.on('line', (line) => lines.push(line));
  await Promise.race([once(reader, 'line'), once(child, 'exit')]);
  return { child, lines, errors };
}

test('six processes open a new database at once and all of them may use it', async () => {
  const file = path.join(temporaryFolder(), 'together.db');
  const children = await Promise.all(Array.from({ length: 6 }, () => readyChild('open', file)));
  const ended = children.map(({ child }) => once(child, 'close'));
  for (const { child } of children) child.stdin.write('go\n');
  await Promise.all(ended);
  const store = openStore(file);
  for (const { lines, errors } of children) {
    expect(errors.join('')).toBe('');
    expect(lines).toEqual(['ready', `schema ${store.schemaVersion}`]);
  }
  const applied = clientOf(store.db).prepare('select created_at from __drizzle_migrations').pluck().all();
  expect(new Set(applied).size).toBe(applied.length);
  store.close();
});

test('every acknowledged write is there after kill -9', async () => {
  const file = path.join(temporaryFolder(), 'killed.db');
  const { child, lines, errors } = await readyChild('write', file);
  const ended = once(child, 'close');
  child.stdout.on('data', () => {
    if (lines.length > 25) child.kill('SIGKILL');
  });
  child.stdin.write('go\n');
  const [, signal] = await ended;
  expect(errors.join('')).toBe('');
  expect(signal).toBe('SIGKILL');
  const acknowledged = lines.filter((line) => /^swap-\d+$/.test(line));
  expect(acknowledged.length).toBeGreaterThan(20);
  const store = openStore(file);
  expect(acknowledged.filter((id) => findEntry(store.db, id) === null)).toEqual([]);
  expect(clientOf(store.db).pragma('integrity_check', { simple: true })).toBe('ok');
  store.close();
});
