import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, onTestFinished, test } from 'vitest';
import { aRig } from '../rig/build-app.ts';

function someBuiltPages(): string {
  const folder = mkdtempSync(join(tmpdir(), 'pages-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  mkdirSync(join(folder, 'assets'));
  writeFileSync(join(folder, 'index.html'), '<!doctype html><title>Pages</title>');
  writeFileSync(join(folder, 'assets', 'main-DC5KU-7P.js'), 'export {};');
  writeFileSync(join(folder, 'wick-original.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
  return folder;
}

const HTML = 'text/html,application/xhtml+xml';

test('every address that is no file and no API is a page', async () => {
  const { ask } = await aRig({ webRoot: someBuiltPages() });
  for (const path of ['/', '/props/x', '/site?asOf=2026-10-22T09:00:00Z']) {
    const page = await ask.get(path).set('accept', HTML).expect(200);
    expect(page.text).toContain('<title>Pages</title>');
    expect(page.headers['content-type']).toContain('text/html');
    expect(page.headers['cache-control']).toBe('no-cache');
    expect(page.headers['content-security-policy']).toContain("default-src 'self'");
  }
  await ask.head('/props/x').set('accept', HTML).expect(200);
});

test('addresses of the API and of calendars are never a page', async () => {
  const { ask } = await aRig({ webRoot: someBuiltPages() });
  for (const path of ['/api/nothing', '/api', '/calendars/x', '/calendars'])
    expect((await ask.get(path).set('accept', HTML).expect(404)).body.code).toBe('not-found');
  expect((await ask.get('/props/x').set('accept', 'application/json').expect(404)).body.code).toBe(
    'not-found',
  );
  expect((await ask.post('/props/x').set('accept', HTML).expect(404)).body.code).toBe('not-found');
});

test('files with a hash in their name are kept for good', async () => {
  const { ask } = await aRig({ webRoot: someBuiltPages() });
  const file = await ask.get('/assets/main-DC5KU-7P.js').expect(200);
  expect(file.headers['cache-control']).toBe('public, max-age=31536000, immutable');
  expect(file.headers['content-type']).toContain('javascript');
  await ask.get('/assets/main-gone.js').expect(404);
  const plain = await ask.get('/wick-original.svg').expect(200);
  expect(plain.headers['cache-control']).toBe('no-cache');
});

test('nothing outside the folder is served', async () => {
  const { ask } = await aRig({ webRoot: someBuiltPages() });
  for (const path of ['/../package.json', '/..%2fpackage.json', '/assets/..%2f..%2f..%2fetc/passwd', '/.env'])
    expect((await ask.get(path)).status, path).toBe(404);
});

test('without built pages the API still works', async () => {
  const { ask } = await aRig({ webRoot: join(tmpdir(), 'nothing-built-here') });
  await ask.get('/').set('accept', HTML).expect(404);
  await ask.get('/api/health').expect(200);
});
