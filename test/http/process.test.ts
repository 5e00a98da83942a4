import { type ChildProcessWithoutNullStreams, spawn } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { build } from 'vite';
import { afterAll, beforeAll, expect, onTestFinished, test } from 'vitest';
import { packageRoot } from '../../server/config.ts';
import { A_SITE, aProp } from '../rig/a-site.ts';

// Node 20 runs no TypeScript, so the program is built first; inside the repository, so that it finds its packages.
let builtFolder = '';

beforeAll(async () => {
  builtFolder = mkdtempSync(join(packageRoot(), 'node_modules', '.served-'));
  await build({
    root: packageRoot(),
    configFile: false,
    logLevel: 'error',
    build: {
      ssr: 'server/main.ts',
      outDir: builtFolder,
      rolldownOptions: { output: { entryFileNames: 'main.mjs' } },
    },
  });
}, 60_000);
afterAll(() => rmSync(builtFolder, { recursive: true, force: true }));

type Running = { child: ChildProcessWithoutNullStreams; output: () => string; errors: () => string };

function started(settings: Record<string, string>): Running {
  const child = spawn(process.execPath, [join(builtFolder, 'main.mjs')], {
    env: { PATH: process.env.PATH ?? '', DUSKROUND_PORT: '0', ...settings },
  });
  let output = '';
  let errors = '';
  child.stdout.on('data', (text) => {
    output += text;
  });
  child.stderr.on('data', (text) => {
    errors += text;
  });
  onTestFinished(() => {
    child.kill('SIGKILL');
  });
  return { child, output: () => output, errors: () => errors };
}

async function listening(settings: Record<string, string>): Promise<Running & { url: string }> {
  const running = started(settings);
  while (!/serves .* at http/.test(running.output())) {
    await Promise.race([once(running.child.stdout, 'data'), once(running.child, 'exit')]);
    expect(running.child.exitCode, running.errors()).toBeNull();
  }
  return { ...running, url: / at (http:\S+)\//.exec(running.output())![1]! };
}

function aFile(): string {
  const folder = mkdtempSync(join(tmpdir(), 'served-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return join(folder, 'deep', 'x.db');
}

async function sent(url: string, body: object, headers: Record<string, string> = {}) {
  const answer = await fetch(url, {
    method: 'POST',
    headers: { 'content-type': 'application/json', ...headers },
    body: JSON.stringify(body),
  });
  expect(answer.status).toBe(201);
  return (await answer.json()) as { id: string };
}

test('what was acknowledged survives kill -9, and its replay is still known', async () => {
  const settings = { DUSKROUND_DB: aFile(), DUSKROUND_AS_OF: '2026-10-22T09:00:00Z' };
  const first = await listening(settings);
  const site = await sent(`${first.url}/api/sites`, A_SITE);
  const prop = await sent(`${first.url}/api/props`, aProp(site.id));
  const swap = { at: '2026-10-21T15:00:00Z', state: 'new' };
  const swapped = await sent(`${first.url}/api/props/${prop.id}/swaps`, swap, { 'idempotency-key': 'k' });
  const ended = once(first.child, 'exit');
  first.child.kill('SIGKILL');
  await ended;

  const second = await listening(settings);
  const log = await (await fetch(`${second.url}/api/props/${prop.id}/log`)).json();
  expect(log).toEqual([swapped]);
  const again = await sent(`${second.url}/api/props/${prop.id}/swaps`, swap, { 'idempotency-key': 'k' });
  expect(again).toEqual(swapped);
  const stopped = once(second.child, 'exit');
  second.child.kill('SIGTERM');
  expect(await stopped).toEqual([0, null]);
  expect(second.errors()).toBe('');
}, 60_000);

test('asked to end while it still reckons ahead, it ends cleanly', async () => {
  const settings = { DUSKROUND_DB: aFile(), DUSKROUND_AS_OF: '2026-10-22T09:00:00Z' };
  const first = await listening(settings);
  for (const name of ['Alder', 'Beech', 'Cedar']) {
    const site = await sent(`${first.url}/api/sites`, { ...A_SITE, name });
    for (let count = 0; count < 20; count++) {
      const prop = await sent(`${first.url}/api/props`, aProp(site.id, { tag: `A-${count}` }));
      await sent(`${first.url}/api/props/${prop.id}/swaps`, { at: '2026-10-20T15:00:00Z', state: 'new' });
    }
  }
  first.child.kill('SIGTERM');
  await once(first.child, 'exit');

  const second = await listening(settings);
  const stopped = once(second.child, 'exit');
  second.child.kill('SIGTERM');
  expect(await stopped).toEqual([0, null]);
  expect(second.errors()).toBe('');
}, 60_000);

test('a taken port, a bad setting and a file that is no database are told in one sentence', async () => {
  const first = await listening({ DUSKROUND_DB: aFile() });
  const port = new URL(first.url).port;
  const noDatabase = join(aFile(), '..', '..', 'notes.txt');
  writeFileSync(noDatabase, 'not a database, whatever its name says. '.repeat(50));
  const cases: [settings: Record<string, string>, says: string][] = [
    [{ DUSKROUND_DB: aFile(), DUSKROUND_PORT: port }, `Port ${port} is in use already`],
    [{ DUSKROUND_DB: aFile(), DUSKROUND_HOST: '0.0.0.0' }, 'no sign-in'],
    [{ DUSKROUND_DB: noDatabase }, 'is not a database'],
  ];
  for (const [settings, says] of cases) {
    const { child, errors } = started(settings);
    const [code] = await once(child, 'close');
    expect(code).toBe(1);
    expect(errors().trim().split('\n')).toEqual([expect.stringContaining(says)]);
  }
}, 60_000);
