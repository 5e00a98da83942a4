import { execFileSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { ROOT, sourceFiles } from './source-files.ts';

const product = sourceFiles('server', 'web', 'seed-demo');

/** Banned outside its one home, and what to use instead. */
const BANS: { pattern: RegExp; home: RegExp; instead: string }[] = [
  {
    pattern: /\bDate\.now\(/,
    home: /^server\/clock\.ts$|^web\/state\/clock\.ts$/,
    instead: 'the clock handed down',
  },
  { pattern: /new Date\(\)/, home: /^$/, instead: 'the clock handed down' },
  { pattern: /Math\.random\(/, home: /^$/, instead: 'a seed that is an argument' },
  {
    pattern: /process\.env\b/,
    home: /^server\/config\.ts$|^seed-demo\/main\.ts$/,
    instead: 'a value of config.ts',
  },
  {
    pattern: /console\.(log|info|warn|error)\(/,
    home: /^(server|seed-demo)\/main\.ts$/,
    instead: 'an answer, or the log',
  },
  { pattern: /from 'luxon'/, home: /^server\/model\/evening\.ts$/, instead: 'evening.ts' },
  {
    pattern: /\.innerHTML|dangerouslySetInnerHTML/,
    home: /^web\/parts\/picture\.tsx$|^$/,
    instead: 'elements',
  },
];

/** Words of other kinds of software, kept out of names and texts. */
const STRANGE_WORDS =
  /\b(asset|inventory|ticket|work ?order|telemetry|sku|kpi|dashboard|workflow|sprint|tenant|playlist)s?\b/i;

describe('house rules a command can see', () => {
  it.each(BANS.map((ban) => [ban.pattern.source, ban] as const))('%s has one home', (_, ban) => {
    const found = product.filter(({ file, text }) => !ban.home.test(file) && ban.pattern.test(text));
    expect(found.map(({ file }) => `${file}: use ${ban.instead}`)).toEqual([]);
  });

  it('no file is over 400 lines, and none is called for what is left over', () => {
    const long = product.filter(({ text }) => text.split('\n').length > 401).map(({ file }) => file);
    expect(long).toEqual([]);
    const leftovers = product.filter(({ file }) =>
      /(^|\/)(utils?|helpers?|common|misc|index)\.tsx?$/.test(file),
    );
    expect(leftovers.map(({ file }) => file)).toEqual([]);
  });

  it('keeps to its own words', () => {
    const strange = product.filter(({ text }) => STRANGE_WORDS.test(text));
    expect(strange.map(({ file, text }) => `${file}: ${text.match(STRANGE_WORDS)?.[0]}`)).toEqual([]);
  });

  it('keeps the top level as it is meant to be', () => {
    const visible = readdirSync(ROOT).filter(
      (name) => !name.startsWith('.') && !['node_modules', 'dist', 'data'].includes(name),
    );
    const config =
      /^(package-lock\.json|tsconfig(\.build)?\.json|biome\.json|vitest\.config\.ts|drizzle\.config\.ts)$/;
    expect(visible.filter((name) => !config.test(name)).sort()).toEqual(
      [
        'package.json',
        'README.md',
        'DEVELOPERS.md',
        'server',
        'web',
        'migrations',
        'test',
        'seed-demo',
      ].sort(),
    );
  });

  it('every file of numbers in the model has a partner outside the project', () => {
    const partners = readdirSync(path.join(ROOT, 'test', 'reference')).filter((name) =>
      name.endsWith('.reference.test.ts'),
    );
    expect(partners.sort()).toEqual([
      'cells.reference.test.ts',
      'sun.reference.test.ts',
      'weather.reference.test.ts',
    ]);
    const readme = readFileSync(path.join(ROOT, 'test', 'reference', 'data', 'README.md'), 'utf8');
    for (const name of readdirSync(path.join(ROOT, 'test', 'reference', 'data'))) {
      if (name !== 'README.md') expect(readme, `${name} has no origin`).toContain(name);
    }
  });

  it('every public function of the model says what it gives', () => {
    const bare = product
      .filter(({ file }) => /^server\/(model|planning)\//.test(file))
      .flatMap(({ file, text }) =>
        [...text.matchAll(/(^|\n)(.*)\nexport (async )?function (\w+)/g)]
          .filter(([, , before]) => !before!.trim().endsWith('*/'))
          .map(([, , , , name]) => `${file}: ${name}`),
      );
    expect(bare).toEqual([]);
  });
});

describe('documents are true', () => {
  const scripts: Record<string, string> = JSON.parse(
    readFileSync(path.join(ROOT, 'package.json'), 'utf8'),
  ).scripts;
  const readme = readFileSync(path.join(ROOT, 'README.md'), 'utf8');
  const developers = readFileSync(path.join(ROOT, 'DEVELOPERS.md'), 'utf8');

  it('every npm command they name exists', () => {
    const named = [...`${readme}\n${developers}`.matchAll(/npm run ([\w:-]+)/g)].map(([, name]) => name!);
    expect(named.length).toBeGreaterThan(2);
    expect(named.filter((name) => !(name in scripts))).toEqual([]);
  });

  it('every file they point to exists', () => {
    const named = [
      ...`${readme}\n${developers}`.matchAll(/`((?:server|web|test|seed-demo|migrations)\/[\w./-]+)`/g),
    ].map(([, name]) => name!);
    expect(named.length).toBeGreaterThan(10);
    expect(named.filter((name) => !existsSync(path.join(ROOT, name)))).toEqual([]);
  });

  it('every table and every unit is in the glossary', () => {
    const schema = product
      .filter(({ file }) => file.startsWith('server/store/'))
      .map(({ text }) => text)
      .join('\n');
    const tables = [...schema.matchAll(/sqliteTable\(\s*'(\w+)'/g)].map(([, name]) => name!);
    expect(tables.length).toBeGreaterThan(8);
    expect(tables.filter((name) => !developers.includes(`\`${name}\``))).toEqual([]);
  });

  it('names no machine and no registry', () => {
    const tracked = execFileSync('git', ['ls-files'], { cwd: ROOT, encoding: 'utf8' })
      .split('\n')
      .filter(Boolean);
    const texts = tracked.filter(
      (name) => /\.(ts|tsx|md|json|css|html|yml|sql)$/.test(name) && name !== 'package-lock.json',
    );
    const faults = texts.filter((name) => {
      const file = path.join(ROOT, name);
      return (
        existsSync(file) &&
        /bash_jobs|registry\.(npmjs|yarnpkg)/.test(readFileSync(file, 'utf8')) &&
        name !== 'test/tidy/tidy.test.ts'
      );
    });
    expect(faults).toEqual([]);
  });
});
