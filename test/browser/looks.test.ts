import { AxeBuilder } from '@axe-core/playwright';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { openBrowser } from '../rig/browser.ts';
import { type ServedPages, servePagesForTest } from '../rig/served-pages.ts';

vi.setConfig({ testTimeout: 120_000, hookTimeout: 60_000 });

let browser: Browser;
let demo: ServedPages;
let empty: ServedPages;

beforeAll(async () => {
  browser = await openBrowser();
  demo = await servePagesForTest({ demo: true });
  empty = await servePagesForTest({ demo: false });
});
afterAll(async () => {
  await browser?.close();
  await demo?.close();
  await empty?.close();
});

type Theme = 'day' | 'night' | 'red';
const THEMES: Theme[] = ['day', 'night', 'red'];

/** Every page, with what shows that it is all there. */
const PAGES = {
  Tonight: () => [`${demo.url}/`, '.band'],
  Props: () => [`${demo.url}/props`, '.rows'],
  'a prop': () => [`${demo.url}/props/${demo.propIds.get('A-02')}`, '.season'],
  'a prop without a set': () => [`${demo.url}/props/${demo.propIds.get('S-01')}`, '.season'],
  'a new prop': () => [`${demo.url}/props/new`, 'form'],
  'a change': () => [`${demo.url}/props/${demo.propIds.get('A-04')}/change`, 'form'],
  Site: () => [`${demo.url}/site`, '.band'],
  'the first site': () => [`${empty.url}/`, 'form'],
  'a prop that is gone': () => [`${demo.url}/props/gone`, '.notice-trouble'],
} as const;
type PageName = keyof typeof PAGES;
const NAMES = Object.keys(PAGES) as PageName[];

async function contextIn(
  theme: Theme | null,
  options: { width: number; device?: 'light' | 'dark' },
): Promise<BrowserContext> {
  const context = await browser.newContext({
    viewport: { width: options.width, height: 800 },
    colorScheme: options.device ?? 'light',
    reducedMotion: 'reduce',
  });
  if (theme) await context.addInitScript(`localStorage.setItem('duskround.theme', '${theme}')`);
  return context;
}

async function open(context: BrowserContext, name: PageName): Promise<Page> {
  const [address, ready] = PAGES[name]() as [string, string];
  const page = await context.newPage();
  await page.goto(address);
  await page.waitForSelector(ready);
  // What is folded away is tested too.
  await page.evaluate('for (const folded of document.querySelectorAll("details")) folded.open = true');
  return page;
}

const wear = (page: Page, theme: Theme) =>
  page.evaluate(`document.documentElement.dataset.theme = '${theme}'`);

const ground = (page: Page) => page.evaluate('getComputedStyle(document.documentElement).backgroundColor');
// The grounds of web/styles/tokens.css.
const GROUNDS = { day: 'rgb(247, 242, 231)', night: 'rgb(15, 23, 41)', red: 'rgb(0, 0, 0)' };

const EVERY_RULE = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
/** A theme changes colours and nothing else, so only these can change their mind with it. */
const RULES_OF_COLOUR = ['color-contrast', 'link-in-text-block'];

async function violations(axe: AxeBuilder): Promise<string[]> {
  const result = await axe.analyze();
  return result.violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id} at ${node.target}`));
}

/** Computed colours of everything on the page. */
const coloursOf = (page: Page) =>
  page.evaluate(`
    [...new Set([...document.querySelectorAll('body *')].flatMap((element) => {
      const { color, backgroundColor, borderTopColor, borderTopWidth, fill, stroke } = getComputedStyle(element);
      return [color, backgroundColor, borderTopWidth === '0px' ? 'none' : borderTopColor, fill, stroke];
    }))]
  `) as Promise<string[]>;

/** Red must lead: green and blue are at most a third of it, as in #ff4a3d. */
function isRed(colour: string): boolean {
  const [red = 0, green = 0, blue = 0, alpha = 1] = (colour.match(/[\d.]+/g) ?? []).map(Number);
  return alpha === 0 || Math.max(green, blue) <= red / 3;
}

const heightsOf = (page: Page) =>
  page.evaluate(`
    [...document.querySelectorAll('button, select, nav a, .button, .row-link, .choice-one, .tick, summary, input:not([type=radio]):not([type=checkbox])')]
      .filter((control) => control.checkVisibility())
      .map((control) => [control.outerHTML.slice(0, 60), control.getBoundingClientRect().height])
  `) as Promise<[string, number][]>;

describe.each(NAMES)('%s', (name) => {
  it('suits everybody: axe, red light, a narrow phone, cold fingers', async () => {
    const context = await contextIn(null, { width: 1280 });
    const page = await open(context, name);
    await wear(page, 'night');
    expect(await violations(new AxeBuilder({ page }).withTags(EVERY_RULE)), 'night').toEqual([]);
    await wear(page, 'day');
    expect(await violations(new AxeBuilder({ page }).withRules(RULES_OF_COLOUR)), 'day').toEqual([]);
    await wear(page, 'red');
    expect(await violations(new AxeBuilder({ page }).withRules(RULES_OF_COLOUR)), 'red').toEqual([]);

    // Red spares eyes used to the dark: nothing on the page may be of another colour.
    const colours = await coloursOf(page);
    expect(colours.length).toBeGreaterThan(3);
    expect(colours.filter((colour) => !isRed(colour))).toEqual([]);

    // WCAG 2.2, 1.4.10 Reflow: no scrolling in two directions at 320 px, which is 1280 px at 400 %.
    await page.setViewportSize({ width: 320, height: 800 });
    await expect.poll(() => page.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(320);

    // 2.5.8 wants 24 px; cold fingers want 48 (a border may lie outside of them).
    const heights = await heightsOf(page);
    expect(heights.length).toBeGreaterThan(2);
    expect(heights.filter(([, height]) => height < 46)).toEqual([]);
    await context.close();
  });
});

describe('themes', () => {
  it.each([
    ['light', 'day'],
    ['dark', 'night'],
  ] as const)('a device set to %s gets %s paper', async (device, theme) => {
    const context = await contextIn(null, { width: 800, device });
    const page = await open(context, 'Tonight');
    expect(await ground(page)).toBe(GROUNDS[theme]);
    await context.close();
  });

  it('a chosen theme stays, and is given back by choosing it again', async () => {
    const context = await contextIn(null, { width: 800, device: 'light' });
    const page = await open(context, 'Tonight');
    await page.getByRole('button', { name: 'Red', exact: true }).click();
    expect(await ground(page)).toBe(GROUNDS.red);
    await page.reload();
    await page.waitForSelector('.tally');
    expect(await ground(page)).toBe(GROUNDS.red);
    const red = page.getByRole('button', { name: 'Red', exact: true });
    expect(await red.getAttribute('aria-pressed')).toBe('true');
    await red.click();
    expect(await ground(page)).toBe(GROUNDS.day);
    await context.close();
  });

  it.each(THEMES)('%s is there before the pages run: nothing flashes', async (theme) => {
    const context = await contextIn(theme, { width: 800, device: theme === 'day' ? 'dark' : 'light' });
    const page = await context.newPage();
    // The pages' own script never arrives; what is painted is the document and its style sheets.
    await page.route('**/assets/*.js', (route) => route.abort());
    await page.goto(`${demo.url}/`);
    expect(await ground(page)).toBe(GROUNDS[theme]);
    await context.close();
  });
});

describe('when the service does not answer', () => {
  it('what came last stays on the page, with a word about it and a way to try again', async () => {
    const context = await contextIn('night', { width: 390 });
    const page = await open(context, 'Tonight');
    await page.route('**/api/**', (route) => route.abort());
    await page.getByRole('button', { name: 'A day later' }).click();
    await page.waitForSelector('.notice-trouble:has-text("Duskround does not answer")');
    expect(await page.locator('.tally-count').count()).toBe(4);
    await page.unroute('**/api/**');
    await page.getByRole('button', { name: 'Try again' }).first().click();
    await page.waitForSelector('.notice-trouble', { state: 'detached' });
    await context.close();
  });
});
