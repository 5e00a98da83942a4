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
    home: /^$/,
    instead: 'elements',
  },
];

/** Words of other kinds of software, kept out of names and texts. */
const STRANGE_WORDS =
  /\b(asset|inventory|ticket|work ?order|telemetry|sku|kpi|dashboard|workflow|sprint|tenant|playlist)s?\b/i;

/** Functions that are over 80 lines, each with the reason why it is let be. A new one is split instead. */
const LONG_FUNCTIONS: Record<string, string> = {
  'server/http/routes/log.ts logRoutes': 'seven routes in a row, each with its schema; nothing nests',
};

/** The functions that begin at the margin, by the closing brace that stands there again. */
function functionLengths({ file, text }: { file: string; text: string }): { name: string; lines: number }[] {
  const lines = text.split('\n');
  return lines.flatMap((line, start) => {
    const [, name] =
      line.match(/^(?:export )?(?:default )?(?:async )?function\*? (\w+)/) ??
      line.match(/^(?:export )?const (\w+)\b.*=.*(?:=> \{|\()$/) ??
      [];
    if (!name) return [];
    const length = lines.slice(start).findIndex((each) => /^\}\)?;?$|^\);?$/.test(each)) + 1;
    // A function on one line has no brace of its own.
    return [{ name: `${file} ${name}`, lines: /[;}]$/.test(line) ? 1 : length }];
  });
}

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

  it('no function is over 80 lines but those known, and those still are', () => {
    const lengths = product.flatMap(functionLengths);
    expect(lengths.length).toBeGreaterThan(400);
    const long = lengths.filter(({ lines }) => lines > 80).map(({ name }) => name);
    expect(long.sort()).toEqual(Object.keys(LONG_FUNCTIONS).sort());
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

const OWN = 'test/tidy/tidy.test.ts';

/** The names of working papers; the product, its tests and its documents say what they need themselves. */
const PAPERS = /\b(users|cells|interop|design|weather|sun|stack|style|planning)\.md\b/;
/** Large weather files stay outside the checkout; the tests that read them may say where. */
const BESIDE = /\.\.\/shared\/|'shared'/;
const WEATHER_BESIDE = /'\.\.', 'shared', 'reference', 'weather'/;

function tracked(): string[] {
  return execFileSync('git', ['ls-files'], { cwd: ROOT, encoding: 'utf8' })
    .split('\n')
    .filter((name) => name && existsSync(path.join(ROOT, name)));
}

/** Names of the API's numbers, but whole ones: those count what their name says. */
async function measuresOfTheApi(): Promise<string[]> {
  const folder = path.join(ROOT, 'server', 'http', 'schemas');
  const found = new Set<string>();
  const seen = new Set<object>();
  const isMeasure = (schema: Schema): boolean =>
    schema.type === 'number' || [...(schema.anyOf ?? []), ...[schema.items ?? []].flat()].some(isMeasure);
  const look = (part: unknown): void => {
    if (typeof part !== 'object' || part === null || seen.has(part)) return;
    seen.add(part);
    for (const [name, schema] of Object.entries((part as Schema).properties ?? {})) {
      if (isMeasure(schema)) found.add(name);
    }
    for (const each of Object.values(part)) look(each);
  };
  for (const name of readdirSync(folder)) look({ ...(await import(path.join(folder, name))) });
  return [...found].sort();
}

type Schema = {
  type?: string;
  anyOf?: Schema[];
  items?: Schema | Schema[];
  properties?: Record<string, Schema>;
};

// Put together from pieces, so that this file does not hold what it looks for.
const FOREIGN_PLACES = new RegExp(
  [['bash', 'jobs'].join('_'), ['registry', '(npmjs|yarnpkg)'].join('\\.')].join('|'),
);

describe('documents are true', () => {
  const scripts: Record<string, string> = JSON.parse(
    readFileSync(path.join(ROOT, 'package.json'), 'utf8'),
  ).scripts;
  const readme = readFileSync(path.join(ROOT, 'README.md'), 'utf8');
  const developers = readFileSync(path.join(ROOT, 'DEVELOPERS.md'), 'utf8');
  const glossary = developers.slice(
    developers.indexOf('## Glossary'),
    developers.indexOf('## Reference data'),
  );

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

  it('every table is in the glossary', () => {
    const schema = product
      .filter(({ file }) => file.startsWith('server/store/'))
      .map(({ text }) => text)
      .join('\n');
    const tables = [...schema.matchAll(/sqliteTable\(\s*'(\w+)'/g)].map(([, name]) => name!);
    expect(tables.length).toBeGreaterThan(8);
    expect(tables.filter((name) => !glossary.includes(`\`${name}\``))).toEqual([]);
  });

  it('every number of the API ends in a unit of the glossary, or is there by name', async () => {
    const measures = await measuresOfTheApi();
    expect(measures.length).toBeGreaterThan(40);
    const told = (name: string) => {
      const [unit = ''] = name.replace(/Tonight$/, '').match(/[A-Z]?[a-z]*$/) ?? [];
      const ending = `\`…${unit.charAt(0).toUpperCase()}${unit.slice(1)}\``;
      return glossary.includes(`\`${name}\``) || glossary.includes(ending);
    };
    expect(measures.filter((name) => !told(name) && !/^chance[A-Z]/.test(name))).toEqual([]);
  });

  it('the product, its tests and its documents stand without papers that are not in it', () => {
    const named = tracked().filter((name) => /\.(ts|tsx|md|css|html|sql)$/.test(name) && name !== OWN);
    const faults = named.flatMap((name) =>
      readFileSync(path.join(ROOT, name), 'utf8')
        .split('\n')
        .filter((line) => PAPERS.test(line) || (BESIDE.test(line) && !WEATHER_BESIDE.test(line)))
        .map((line) => `${name}: ${line.trim()}`),
    );
    expect(named.length).toBeGreaterThan(150);
    expect(faults).toEqual([]);
  });

  it('names no machine and no registry', () => {
    const texts = tracked().filter(
      (name) => /\.(ts|tsx|md|json|css|html|yml|sql)$/.test(name) && name !== 'package-lock.json',
    );
    const faults = texts.filter((name) => {
      const file = path.join(ROOT, name);
      return FOREIGN_PLACES.test(readFileSync(file, 'utf8')) && name !== OWN;
    });
    expect(faults).toEqual([]);
  });
});
