import { describe, expect, it } from 'vitest';
import { type SourceFile, sourceFiles } from './source-files.ts';

/** What each room may import; everything else is refused. `types` come in as types only. */
type Rule = { room: string; may: RegExp[]; types?: RegExp[]; because: string };

const room = (name: string) => new RegExp(`^server/${name}/`);
const npm = (...names: string[]) =>
  new RegExp(`^(${names.map((name) => name.replace('/', '\\/')).join('|')})(/|$)`);

const RULES: Rule[] = [
  {
    room: 'server/model/evening.ts',
    may: [room('model'), npm('luxon')],
    because: 'one file knows zones, so that the library behind it can be changed',
  },
  { room: 'server/model', may: [room('model')], because: 'what is true of light and cells needs no machine' },
  {
    room: 'server/planning',
    may: [room('planning'), room('model')],
    because: 'a plan can be recomputed from its numbers alone',
  },
  {
    room: 'server/store',
    may: [room('store'), room('model'), npm('drizzle-orm', 'better-sqlite3'), /^node:/],
    because: 'the database is spoken to in one room and gives model values',
  },
  {
    room: 'server/exchange',
    may: [room('exchange'), room('model'), npm('papaparse', 'ical-generator'), /^node:/],
    types: [room('planning')],
    because: 'words of other programs are text and values, with no database behind them',
  },
  {
    room: 'server/actions',
    may: [
      room('actions'),
      room('planning'),
      room('store'),
      room('exchange'),
      room('model'),
      /^server\/clock\.ts$/,
      /^node:crypto$/,
    ],
    because: 'a deed loads, computes and saves; it does not know who asked',
  },
  {
    room: 'server/http/schemas',
    may: [/^server\/http\/schemas\//, npm('typebox')],
    because: 'the pages take their types from here, so they stay light',
  },
  {
    room: 'server/http',
    may: [
      room('http'),
      room('actions'),
      room('model'),
      /^server\/(clock|config)\.ts$/,
      /^node:/,
      npm(
        'fastify',
        '@fastify/static',
        '@fastify/swagger',
        '@fastify/multipart',
        '@fastify/rate-limit',
        'typebox',
      ),
    ],
    types: [room('store')],
    because: 'routes hand on and answer; they never touch the database or the plan',
  },
  {
    room: 'server/config.ts',
    may: [room('model'), /^node:/],
    because: 'the only reader of the environment',
  },
  { room: 'server/clock.ts', may: [room('model')], because: 'the only reader of the clock' },
  {
    room: 'server/app.ts',
    may: [/^server\//, /^node:/, npm('fastify')],
    because: 'the only wiring place',
  },
  {
    room: 'server/main.ts',
    may: [/^server\//, /^node:/, npm('fastify')],
    because: 'nothing stands above it',
  },
  {
    room: 'seed-demo',
    may: [
      /^seed-demo\//,
      room('actions'),
      room('model'),
      room('planning'),
      /^server\/store\/open\.ts$/,
      /^server\/(clock|config)\.ts$/,
      /^node:/,
    ],
    types: [room('store')],
    because: 'the demo is made by the same deeds as everything else',
  },
  {
    room: 'web/vite.config.ts',
    may: [npm('vite')],
    because: 'it builds the pages and is no part of them',
  },
  {
    room: 'web',
    may: [/^web\//, npm('preact')],
    types: [/^server\/http\/schemas\//],
    because: 'a page knows the service by its answers alone',
  },
];

/** The first rule that names the file's room: narrower rooms stand before wider ones. */
function ruleFor(file: string): Rule | undefined {
  return RULES.find(({ room: name }) => file === name || file.startsWith(`${name}/`));
}

function faultsOf({ file, imports }: Pick<SourceFile, 'file' | 'imports'>): string[] {
  const rule = ruleFor(file);
  if (!rule) return [`${file} is in no room`];
  return imports
    .filter(({ from, typeOnly }) => {
      if (rule.may.some((pattern) => pattern.test(from))) return false;
      return !(typeOnly && rule.types?.some((pattern) => pattern.test(from)));
    })
    .map(({ from }) => `${file} imports ${from}, but ${rule.because}`);
}

const files = sourceFiles('server', 'web', 'seed-demo');

describe('imports flow one way', () => {
  it('reads the project', () => {
    expect(files.length).toBeGreaterThan(80);
    expect(files.flatMap(({ imports }) => imports).length).toBeGreaterThan(300);
  });

  it.each(RULES.map((rule) => [rule.room, rule] as const))('%s', (name, rule) => {
    const inRoom = files.filter(({ file }) => ruleFor(file) === rule);
    expect(inRoom.length, `nothing in ${name}`).toBeGreaterThan(0);
    expect(inRoom.flatMap(faultsOf)).toEqual([]);
  });

  it('every file has a room', () => {
    expect(files.filter(({ file }) => !ruleFor(file)).map(({ file }) => file)).toEqual([]);
  });

  it('catches what it should', () => {
    const wrong = (file: string, from: string, typeOnly = false) =>
      faultsOf({ file, imports: [{ from, typeOnly }] });
    expect(wrong('server/model/sun.ts', 'luxon')).toHaveLength(1);
    expect(wrong('server/model/sun.ts', 'node:fs')).toHaveLength(1);
    expect(wrong('server/planning/need.ts', 'server/store/log.ts', true)).toHaveLength(1);
    expect(wrong('server/http/routes/props.ts', 'drizzle-orm')).toHaveLength(1);
    expect(wrong('server/http/routes/props.ts', 'server/planning/need.ts')).toHaveLength(1);
    expect(wrong('web/pages/tonight-page.tsx', 'server/http/schemas/props.ts')).toHaveLength(1);
    expect(wrong('web/pages/tonight-page.tsx', 'server/http/schemas/props.ts', true)).toEqual([]);
    expect(wrong('seed-demo/main.ts', 'server/http/errors.ts')).toHaveLength(1);
  });

  it('nothing goes round in a circle of values', () => {
    const edges = new Map(
      files.map(({ file, imports }) => [
        file,
        imports.filter(({ typeOnly }) => !typeOnly).map(({ from }) => from),
      ]),
    );
    const done = new Set<string>();
    const circles: string[] = [];
    const walk = (file: string, path: string[]) => {
      if (path.includes(file)) circles.push([...path.slice(path.indexOf(file)), file].join(' → '));
      if (done.has(file) || path.includes(file)) return;
      for (const next of edges.get(file) ?? []) walk(next, [...path, file]);
      done.add(file);
    };
    for (const file of edges.keys()) walk(file, []);
    expect(circles).toEqual([]);
  });
});
