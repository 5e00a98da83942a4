import { existsSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type Instant, parseInstant } from './model/evening.ts';

export type Config = {
  /** Path of the database file; a relative one counts from where the program was started. */
  db: string;
  /** A loopback address: there is no sign-in, so nobody else may reach this service. */
  host: string;
  /** 0 lets the machine choose a free one. */
  port: number;
  /** The moment to show everything as of; null = the real clock. */
  asOf: Instant | null;
  /** Where others reach this service, for calendar addresses; null = the address it listens on. */
  publicUrl: string | null;
};

/** A setting that cannot be used, told in one sentence. */
export class ConfigError extends Error {
  override name = 'ConfigError';
}

const DEFAULTS = { db: 'data/duskround.db', host: '127.0.0.1', port: 4680 };

/** The folder that holds package.json, whether this runs from the source or from the build below it. */
export function packageRoot(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'package.json'))) {
    const above = dirname(folder);
    if (above === folder)
      throw new ConfigError('No package.json lies above the program: it was moved apart.');
    folder = above;
  }
  return folder;
}

/**
 * The settings of this run.
 * @param environment names and values; blank counts as not given
 * @throws ConfigError naming the setting, its value and what is wanted
 */
export function readConfig(environment: Record<string, string | undefined> = process.env): Config {
  const given = (name: string) => environment[name]?.trim() || null;
  const db = given('DUSKROUND_DB') ?? join(packageRoot(), DEFAULTS.db);
  return {
    db: db === ':memory:' ? db : resolve(db),
    host: loopback(given('DUSKROUND_HOST') ?? DEFAULTS.host),
    port: portNumber(given('DUSKROUND_PORT') ?? String(DEFAULTS.port)),
    asOf: fixedMoment(given('DUSKROUND_AS_OF')),
    publicUrl: webAddress(given('DUSKROUND_PUBLIC_URL')),
  };
}

function loopback(host: string): string {
  const bare = host.replace(/^\[(.*)\]$/, '$1').toLowerCase();
  if (bare === 'localhost' || bare === '::1' || /^127(\.(25[0-5]|2[0-4]\d|1?\d?\d)){3}$/.test(bare))
    return bare;
  throw new ConfigError(
    `DUSKROUND_HOST is "${host}", which others on the network could reach, and Duskround has no sign-in: ` +
      'use 127.0.0.1, localhost or ::1.',
  );
}

function portNumber(text: string): number {
  const port = /^\d{1,5}$/.test(text) ? Number(text) : Number.NaN;
  if (port <= 65_535) return port;
  throw new ConfigError(`DUSKROUND_PORT is "${text}": a whole number from 0 to 65535 is wanted, like 4680.`);
}

function fixedMoment(text: string | null): Instant | null {
  if (text === null) return null;
  const at = parseInstant(text);
  if (at !== null) return at;
  throw new ConfigError(
    `DUSKROUND_AS_OF is "${text}": a moment with Z or an offset is wanted, like 2026-10-22T09:00:00Z.`,
  );
}

function webAddress(text: string | null): string | null {
  if (text === null) return null;
  const url = URL.canParse(text) ? new URL(text) : null;
  const plain = url && !url.username && !url.password && !url.search && !url.hash;
  if (plain && /^https?:$/.test(url.protocol)) return `${url.origin}${url.pathname.replace(/\/+$/, '')}`;
  throw new ConfigError(
    `DUSKROUND_PUBLIC_URL is "${text}": a web address without password or query is wanted, like https://lights.example.org.`,
  );
}
