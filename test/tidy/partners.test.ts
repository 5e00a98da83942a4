import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, it } from 'vitest';
import { ROOT, sourceFiles } from './source-files.ts';

const CELLS = 'test/reference/cells.reference.test.ts';
const SUN = 'test/reference/sun.reference.test.ts';
const WEATHER = 'test/reference/weather.reference.test.ts';

/** What holds each file of the model that reckons: a test that imports it and has its numbers from outside, or why none. */
const HELD_BY: Record<string, string> = {
  'belief.ts':
    'why: squares of independent spreads add; the widths are estimates and are called so beside them',
  'calendar-date.ts': 'test/model/calendar-date.test.ts',
  'cell-kinds.ts': CELLS,
  'cell-types-built-in.ts': CELLS,
  'cell.ts': CELLS,
  'chance.ts': CELLS,
  'check.ts': 'why: compares with bounds that are handed in',
  'climate.ts': WEATHER,
  'crossing-search.ts': `why: reached through sun.ts where the sun only grazes, which ${SUN} holds to two ephemerides`,
  'depletion.ts': CELLS,
  'draw-down.ts': CELLS,
  'evening.ts': SUN,
  'interpolate.ts': `why: straight lines; ${CELLS} reads every point of every curve through it`,
  'light-threshold.ts': SUN,
  'load.ts': CELLS,
  'peukert.ts': CELLS,
  'prop-forecast.ts': 'test/model/depletion.test.ts',
  'schedule.ts': 'test/model/schedule.test.ts',
  'set-in-use.ts': 'why: reads a log and reckons nothing',
  'sun-day.ts': SUN,
  'sun.ts': SUN,
  'switching.ts': 'test/model/switching.test.ts',
  'warnings.ts':
    'why: bounds of what is likely, no published value exists; what they compare with is held above',
  'weather.ts': WEATHER,
};

const model = sourceFiles('server/model');
/** A file of types alone reckons nothing. */
const reckons = model.filter(({ text }) => /\bfunction\b|=> |\[\s*-?\d/.test(text));

it('every file of the model that reckons is held by something outside the project, or says why not', () => {
  const names = reckons.map(({ file }) => path.basename(file));
  expect(names.sort()).toEqual(Object.keys(HELD_BY).sort());
});

const held = Object.entries(HELD_BY).filter(([, by]) => !by.startsWith('why: '));

it.each(held)('%s is imported by %s', (name, by) => {
  const folder = path.dirname(by);
  const [test] = sourceFiles(folder).filter(({ file }) => file === by);
  const values = test?.imports.filter(({ typeOnly }) => !typeOnly).map(({ from }) => from);
  expect(values).toContain(`server/model/${name}`);
});

it('a test named in a reason exists', () => {
  const named = Object.values(HELD_BY).flatMap((by) => by.match(/test\/[\w./-]+\.test\.ts/g) ?? []);
  expect(named.filter((file) => !existsSync(path.join(ROOT, file)))).toEqual([]);
});

it('every file of reference data says where it is from', () => {
  const folder = path.join(ROOT, 'test', 'reference', 'data');
  const origins = readFileSync(path.join(folder, 'README.md'), 'utf8');
  const files = readdirSync(folder).filter((name) => name !== 'README.md');
  expect(files.length).toBeGreaterThan(3);
  expect(files.filter((name) => !origins.includes(name))).toEqual([]);
});
