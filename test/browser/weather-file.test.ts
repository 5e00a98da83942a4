import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { openBrowser } from '../rig/browser.ts';
import { type ServedPages, servePagesForTest } from '../rig/served-pages.ts';

vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });

let browser: Browser;
let served: ServedPages;

beforeAll(async () => {
  [browser, served] = await Promise.all([openBrowser(), servePagesForTest({ demo: true })]);
});
afterAll(async () => {
  await browser?.close();
  await served?.close();
});

// Invented: two autumn days, a degree to and fro.
const LOG = Array.from({ length: 48 }, (_, hour) => {
  const day = 20 + Math.floor(hour / 24);
  return `2026-10-${day}T${String(hour % 24).padStart(2, '0')}:00Z,${8 + (hour % 3)}`;
});

it('a wrong weather file is taken out again where it came in', async () => {
  const page = await browser.newPage({ viewport: { width: 390, height: 844 } });
  await page.goto(`${served.url}/site`);
  await page.getByLabel('Weather file').setInputFiles({
    name: 'logger.csv',
    mimeType: 'text/csv',
    buffer: Buffer.from(['time,tempC', ...LOG].join('\n')),
  });
  const takeOut = page.getByRole('button', { name: 'Take out 48 hours' });
  await takeOut.waitFor();
  await takeOut.click();
  await takeOut.waitFor({ state: 'detached' });
  const [site] = (await (await fetch(`${served.url}/api/sites`)).json()) as { id: string }[];
  const inUse = await (await fetch(`${served.url}/api/sites/${site!.id}/weather`)).json();
  expect(inUse).toMatchObject({ hours: null });
  await page.close();
});
