import { readFileSync } from 'node:fs';
import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, expect, it, vi } from 'vitest';
import { openBrowser } from '../rig/browser.ts';
import { type ServedPages, servePagesForTest } from '../rig/served-pages.ts';

vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });

let browser: Browser;
let served: ServedPages;
let context: BrowserContext;
let page: Page;

beforeAll(async () => {
  [browser, served] = await Promise.all([openBrowser(), servePagesForTest({ demo: true })]);
});
afterAll(async () => {
  await browser?.close();
  await served?.close();
});
beforeEach(async () => {
  context = await browser.newContext({ viewport: { width: 390, height: 844 } });
  page = await context.newPage();
  await page.goto(`${served.url}/props`);
  await page.waitForSelector('.rows');
  await page.getByText('In and out of spreadsheets').click();
});
afterEach(async () => {
  await context.close();
});

const choose = (text: string) =>
  page
    .getByLabel('Props file')
    .setInputFiles({ name: 'props.csv', mimeType: 'text/csv', buffer: Buffer.from(text) });

async function tagsKept(): Promise<string[]> {
  const [site] = (await (await fetch(`${served.url}/api/sites`)).json()) as { id: string }[];
  const props = (await (await fetch(`${served.url}/api/props?siteId=${site!.id}`)).json()) as {
    tag: string;
  }[];
  return props.map(({ tag }) => tag);
}

const FILE = `tag;name;zone;cells;dimVolts;behaviour;meanMa;kind
Z-01;Heron;Mill;3xAA;3,3;steady;~20 mA;by-hand
Z-02;Otter;Mill;3xAA;33 V each;steady;22;by-hand
`;

it('a file with one faulty row is mended, looked through and taken in', async () => {
  await choose(FILE);
  await page.waitForSelector('text=1 of 2 rows would do.');
  const fault = page.locator('.remarks tbody tr').first();
  expect(await fault.locator('th, td').allTextContents()).toEqual([
    '3',
    'dimVolts',
    expect.stringContaining('"33 V each" is not a number'),
  ]);
  expect(await page.getByRole('button', { name: /^Take in/ }).count()).toBe(0);
  const axe = await new AxeBuilder({ page: page as never }).analyze();
  expect(axe.violations.map(({ id }) => id)).toEqual([]);
  // The page itself does not go sideways; the table does in its own room.
  expect(await page.evaluate('document.documentElement.scrollWidth <= innerWidth')).toBe(true);
  expect(await tagsKept()).not.toContain('Z-01');

  await choose(FILE.replace('33 V each', '3,3'));
  await page.waitForSelector('text=All 2 rows would do: 2 new, 0 changed, 0 as before.');
  expect(await tagsKept()).not.toContain('Z-01');
  await page.getByRole('button', { name: 'Take in 2 props' }).click();
  await page.waitForSelector('text=Taken in: 2 new, 0 changed, 0 as before.');
  expect(await tagsKept()).toEqual(expect.arrayContaining(['Z-01', 'Z-02']));
  await page.waitForSelector('.row .tag:text("Z-02")');
});

it('pasted rows say what they would change', async () => {
  const rows = page.getByLabel('Or rows pasted from a spreadsheet');
  await rows.fill('tag\tname\nA-01\tThe first lantern of all\n');
  await page.getByRole('button', { name: 'Look through these rows' }).click();
  await page.waitForSelector('text=All 1 row would do: 0 new, 1 changed, 0 as before.');
  expect(await page.locator('details li').last().textContent()).toBe('A-01 The first lantern of all: name');
});

it('the props come out as a file, and the same file changes nothing', async () => {
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('link', { name: 'Props', exact: true }).last().click(),
  ]);
  expect(download.suggestedFilename()).toBe('props.csv');
  const text = readFileSync(await download.path(), 'utf8');
  const kept = await tagsKept();
  await choose(text);
  await page.waitForSelector(
    `text=All ${kept.length} rows would do: 0 new, 0 changed, ${kept.length} as before.`,
  );
});
