import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import { systemClock } from '../../server/clock.ts';
import { openBrowser } from '../rig/browser.ts';
import { type ServedPages, servePagesForTest } from '../rig/served-pages.ts';

vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });

let browser: Browser;
let served: ServedPages;

beforeAll(async () => {
  [browser, served] = await Promise.all([
    openBrowser(),
    servePagesForTest({ demo: false, clock: systemClock() }),
  ]);
});
afterAll(async () => {
  await browser?.close();
  await served?.close();
});

/** A row copied from a climate table goes into its first field. */
const paste = (page: Page, field: string, row: string) =>
  page.getByRole('textbox', { name: field }).evaluate((input, text) => {
    const data = new DataTransfer();
    data.setData('text', text);
    input.dispatchEvent(
      new ClipboardEvent('paste', { clipboardData: data, bubbles: true, cancelable: true }),
    );
  }, row);

it('a first site is made, corrected on the way, and leads to a first prop with its dates', async () => {
  const page = await browser.newPage({ viewport: { width: 390, height: 844 } });
  await page.goto(served.url);
  await page.getByRole('heading', { level: 1, name: 'Where do your lights stand?' }).waitFor();
  await page.getByLabel('Name').fill('Hollin Bank');
  await page.getByLabel('Latitude').fill('54,4');
  await page.getByLabel('Longitude').fill('-240');
  await page.getByLabel('Time zone').fill('Europe/London');
  await page.getByLabel('Season from').fill('2026-10-10');
  await page.getByLabel('Season through').fill('2026-11-02');
  await paste(page, 'Jan Mean minimum, °C', '0 0 1 3 5 8 10 10 8 6 3 1');
  await paste(page, 'Jan Mean maximum, °C', '6\t7\t9\t12\t15\t17\t19\t19\t16\t13\t9\t6');
  expect(await page.getByRole('textbox', { name: 'Dec Mean maximum, °C' }).inputValue()).toBe('6');
  await page.getByRole('button', { name: 'Make this site' }).click();

  // The service's own sentence stands at the field it is about, and nothing typed is lost.
  const longitude = page.getByLabel('Longitude');
  await page.waitForSelector('.field-fault');
  expect(await longitude.getAttribute('aria-invalid')).toBe('true');
  expect(await page.locator('.field-fault').first().textContent()).toContain('-240');
  expect(await page.getByLabel('Latitude').inputValue()).toBe('54,4');
  await longitude.fill('-2,4');
  await page.getByRole('button', { name: 'Make this site' }).click();
  await page.waitForSelector('text=No props yet.');

  await page.getByRole('link', { name: 'Add a prop' }).click();
  await page.getByLabel('Tag').fill('A-01');
  await page.getByLabel('Name', { exact: true }).fill('Gate lantern');
  await page.getByLabel('Zone', { exact: true }).fill('Gate');
  await page.getByLabel('Looks dim at').fill('3.3');
  await page.getByLabel('Average while lit').fill('21');
  await page.getByRole('button', { name: 'Add this prop' }).click();
  await page.waitForSelector('text=Nobody has said when cells went in.');
  await page.getByRole('button', { name: 'Record swap of 3 cells' }).click();
  await page.waitForSelector('.notice-done:has-text("Swap recorded.")');
  await page.waitForSelector('.answer .facts');
  await page.close();
});
