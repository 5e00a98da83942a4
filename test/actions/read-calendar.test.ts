import { execFile } from 'node:child_process';
import { copyFileSync, mkdtempSync, rmSync } from 'node:fs';
import path from 'node:path';
import { promisify } from 'node:util';
import ICAL from 'ical.js';
import { build } from 'vite';
import { expect, onTestFinished, test } from 'vitest';
import { addProp, type NewProp } from '../../server/actions/add-prop.ts';
import { changeSite } from '../../server/actions/change-site.ts';
import type { Deps } from '../../server/actions/deps.ts';
import { forecastSite } from '../../server/actions/forecast-site.ts';
import { listCalendarLinks } from '../../server/actions/list-calendar-links.ts';
import { makeCalendarLink } from '../../server/actions/make-calendar-link.ts';
import { type Calendar, readCalendar } from '../../server/actions/read-calendar.ts';
import { recordSighting } from '../../server/actions/record-sighting.ts';
import { recordSwap } from '../../server/actions/record-swap.ts';
import { removeCalendarLink } from '../../server/actions/remove-calendar-link.ts';
import { removeProp } from '../../server/actions/remove-prop.ts';
import { HOUR_MS } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';
import { openStore } from '../../server/store/open.ts';
import { aProp } from '../rig/a-site.ts';
import { NOW } from '../rig/build-app.ts';
import { aSiteIn, someDeps } from '../rig/deps.ts';
import { clientOf } from '../store/samples.ts';
import { temporaryFolder } from '../store/temporary-folder.ts';

// What a subscriber must see over time. Source: RFC 5545 3.8.4.7 (UID), RFC 5546 2.1.4 (SEQUENCE); the rest is ours.

const ROOT = path.join(import.meta.dirname, '..', '..');

function aPropWithCells(deps: Deps, siteId: string, changes: Partial<NewProp> = {}): Prop {
  const prop = addProp(deps, { ...(aProp(siteId) as NewProp), ...changes });
  recordSwap(deps, { propId: prop.id, at: Date.UTC(2026, 9, 17, 15), state: 'new' });
  return prop;
}

function aFeed(deps = someDeps()) {
  const site = aSiteIn(deps);
  const prop = aPropWithCells(deps, site.id);
  const { link, secret } = makeCalendarLink(deps, { siteId: site.id });
  return { deps, site, prop, link, secret, read: () => readCalendar(deps, { secret })! };
}

/** The events as ical.js reads them. */
function eventsOf({ text }: Calendar) {
  const calendar = new ICAL.Component(ICAL.parse(text));
  return calendar.getAllSubcomponents('vevent').map((event) => ({
    uid: String(event.getFirstPropertyValue('uid')),
    sequence: Number(event.getFirstPropertyValue('sequence')),
    status: String(event.getFirstPropertyValue('status')),
    summary: String(event.getFirstPropertyValue('summary')),
    description: String(event.getFirstPropertyValue('description')),
    startsAt: String(event.getFirstPropertyValue('dtstart')),
    stampAt: (event.getFirstPropertyValue('dtstamp') as ICAL.Time).toJSDate().getTime(),
  }));
}

test('one event for each evening the forecast wants a swap by, at the usual start of rounds', () => {
  const { deps, site, read } = aFeed();
  aPropWithCells(deps, site.id, { tag: 'C-03' });
  aPropWithCells(deps, site.id, {
    tag: 'A-01',
    series: 4,
    dimVolts: 4.4,
    load: { behaviour: 'steady', meanMa: 60, standbyMa: 0 },
  });
  const swapBys = new Set(forecastSite(deps, { siteId: site.id }).props.map(({ swapBy }) => swapBy));
  expect(swapBys).not.toContain(null);
  const events = eventsOf(read());
  expect(events.map(({ startsAt }) => startsAt.slice(0, 10))).toEqual([...swapBys].sort());
  expect(events).toHaveLength(2);
  expect(events.at(-1)!.summary).toBe('Swap 2 props: C-02, C-03');
  expect(events.at(-1)!.description).toContain('Ferny Bank · C-02 Moth lantern: 3 × AA alkaline (LR6)\n');
  // 16:30 in London after the clocks went back is 16:30 UTC.
  expect(events.at(-1)!.startsAt.slice(10)).toBe('T16:30:00Z');
});

test('a secret nobody has opens nothing, and neither does one revoked', () => {
  const { deps, site, link, secret, read } = aFeed();
  expect(readCalendar(deps, { secret: `${secret}x` })).toBeNull();
  expect(read()).not.toBeNull();
  removeCalendarLink(deps, { siteId: site.id, linkId: link.id });
  expect(readCalendar(deps, { secret })).toBeNull();
});

test('the secret, the label and the place stand nowhere in the file', () => {
  const deps = someDeps();
  const site = aSiteIn(deps, { latitudeDeg: 54.4321, longitudeDeg: -2.4321 });
  aPropWithCells(deps, site.id);
  const { secret } = makeCalendarLink(deps, { siteId: site.id, label: 'Rosalind' });
  const { text } = readCalendar(deps, { secret })!;
  for (const told of [secret, 'Rosalind', '54.43', '2.43']) expect(text).not.toContain(told);
});

test('nothing changed: the same bytes later that evening, reckoned anew or not, and nothing written', () => {
  const { deps, read, secret } = aFeed();
  const before = read();
  deps.clock.set(NOW + 70 * 60_000);
  read();
  const changes = () => clientOf(deps.store.db).prepare('select total_changes()').pluck().get();
  const changesBefore = changes();
  deps.clock.set(NOW + 100 * 60_000);
  expect(read()).toEqual(before);
  const fresh = { ...deps, store: { ...deps.store } };
  expect(readCalendar(fresh, { secret })).toEqual(before);
  expect(changes()).toBe(changesBefore);
});

test('when the forecast moves the same event moves, counted and stamped', () => {
  const { deps, prop, read } = aFeed();
  const [before] = eventsOf(read());
  deps.clock.set(NOW + HOUR_MS);
  recordSighting(deps, { propId: prop.id, at: NOW, seen: 'dim' });
  const after = eventsOf(read());
  expect(after).toHaveLength(1);
  expect(after[0]).toMatchObject({ uid: before!.uid, sequence: before!.sequence + 1, status: 'CONFIRMED' });
  // Seen dim: it wants a swap that very evening. 16:30 in London in summer time is 15:30 UTC.
  expect(after[0]!.startsAt).toBe('2026-10-22T15:30:00Z');
  expect(after[0]!.stampAt).toBe(NOW + HOUR_MS);
});

test('a prop taken away cancels its evening, which goes a week later', () => {
  const { deps, prop, read } = aFeed();
  const [before] = eventsOf(read());
  removeProp(deps, { propId: prop.id });
  const [after] = eventsOf(read());
  expect(after).toMatchObject({ uid: before!.uid, sequence: before!.sequence + 1, status: 'CANCELLED' });
  expect(after!.summary).toBe(`Cancelled: ${before!.summary}`);
  const dueAt = Date.parse(before!.startsAt);
  deps.clock.set(dueAt + 7 * 24 * HOUR_MS);
  expect(eventsOf(read())).toHaveLength(1);
  deps.clock.set(dueAt + 8 * 24 * HOUR_MS);
  expect(eventsOf(read())).toEqual([]);
});

test('a site renamed shows at once, and the event keeps its identity', () => {
  const { deps, site, read } = aFeed();
  const before = read();
  deps.clock.set(NOW + HOUR_MS);
  changeSite(deps, { siteId: site.id, changes: { name: 'Quarry; Steps' } });
  const after = read();
  expect(after.etag).not.toBe(before.etag);
  expect(eventsOf(after)[0]!.uid).toBe(eventsOf(before)[0]!.uid);
  expect(eventsOf(after)[0]!.stampAt).toBe(NOW + HOUR_MS);
  expect(eventsOf(after)[0]!.description).toContain('Quarry; Steps');
});

test('two links of a site tell of the same events; only one of them rings', () => {
  const { deps, site, read } = aFeed();
  const loud = makeCalendarLink(deps, { siteId: site.id, alarms: true });
  const ringing = readCalendar(deps, { secret: loud.secret })!;
  expect(eventsOf(ringing)).toEqual(eventsOf(read()));
  expect(ringing.text).toContain('BEGIN:VALARM');
  expect(read().text).not.toContain('BEGIN:VALARM');
  expect(ringing.etag).not.toBe(read().etag);
});

test('when a link was last read is kept to the hour and is no part of the file', () => {
  const { deps, site, read } = aFeed();
  const lastReadAt = () => listCalendarLinks(deps, { siteId: site.id })[0]!.lastReadAt;
  expect(lastReadAt()).toBeNull();
  const before = read();
  expect(lastReadAt()).toBe(NOW);
  deps.clock.set(NOW + HOUR_MS - 1);
  read();
  expect(lastReadAt()).toBe(NOW);
  deps.clock.set(NOW + HOUR_MS);
  expect(read()).toEqual(before);
  expect(lastReadAt()).toBe(NOW + HOUR_MS);
});

test('a site with nothing due has a calendar with nothing in it', () => {
  const deps = someDeps();
  const { secret } = makeCalendarLink(deps, { siteId: aSiteIn(deps).id });
  const { text } = readCalendar(deps, { secret })!;
  expect(text).toMatch(/^BEGIN:VCALENDAR\r\n/);
  expect(text).toMatch(/END:VCALENDAR\r\n$/);
  expect(text).not.toContain('VEVENT');
});

/** Node 20 runs no TypeScript, so the child is built first; inside the repository, so that it finds its packages. */
async function builtChild(): Promise<string> {
  const outDir = mkdtempSync(path.join(ROOT, 'node_modules', '.calendar-child-'));
  onTestFinished(() => rmSync(outDir, { recursive: true, force: true }));
  const rolldownOptions = { output: { entryFileNames: 'child.mjs' } };
  const ssr = 'test/actions/calendar-child.ts';
  await build({ root: ROOT, configFile: false, logLevel: 'error', build: { ssr, outDir, rolldownOptions } });
  return path.join(outDir, 'child.mjs');
}

test('a process gives the same bytes whatever time zone it runs in, and whoever reads first', async () => {
  const child = await builtChild();
  const file = path.join(temporaryFolder(), 'unread.db');
  const deps = { ...someDeps(), store: openStore(file) };
  const { secret } = aFeed(deps);
  deps.store.close();
  const read = async (timeZone: string, database: string, at: number) => {
    const { stdout } = await promisify(execFile)(process.execPath, [child, database, secret, String(at)], {
      env: { ...process.env, TZ: timeZone },
    });
    return JSON.parse(stdout) as { offsetMinutes: number; calendar: Calendar };
  };
  // UTC+13:45 in summer, UTC-3:30 less an hour. Source: the tz database, Pacific/Chatham and America/St_Johns.
  const zones: [string, number][] = [
    ['UTC', 0],
    ['Pacific/Chatham', -825],
    ['America/St_Johns', 150],
  ];
  const texts = [];
  for (const [timeZone, offsetMinutes] of zones) {
    const copy = path.join(temporaryFolder(), 'copy.db');
    copyFileSync(file, copy);
    const first = await read(timeZone, copy, NOW);
    expect(first.offsetMinutes).toBe(offsetMinutes);
    const second = await read('Pacific/Chatham', copy, NOW + 2 * HOUR_MS);
    expect(second.calendar).toEqual(first.calendar);
    texts.push(first.calendar.text);
  }
  expect(eventsOf({ text: texts[0]!, etag: '' })).toHaveLength(1);
  expect(new Set(texts).size).toBe(1);
}, 60_000);
