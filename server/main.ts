import { realpathSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { fileURLToPath } from 'node:url';
import { buildApp } from './app.ts';
import { type Clock, fixedClock, systemClock } from './clock.ts';
import { type Config, ConfigError, readConfig } from './config.ts';
import { openStore, type Store } from './store/open.ts';
import { StoreError } from './store/store-error.ts';

/** A running service: where it is, and how to end it. */
export type Served = { url: string; close(): Promise<void> };

/**
 * Opens the store, listens, and says so.
 * @param config the settings
 * @param given a store already open, a clock of one's own, or what to do as soon as it listens
 * @throws ConfigError when the port is taken or the address is not this machine's; StoreError for the database
 */
export async function serve(
  config: Config,
  given: { store?: Store; clock?: Clock; onListening?: (served: Served) => void } = {},
): Promise<Served> {
  const store = given.store ?? openStore(config.db, { onProgress: say });
  const clock = given.clock ?? (config.asOf === null ? systemClock() : fixedClock(config.asOf));
  const app = buildApp({ store, clock, publicUrl: config.publicUrl, logLevel: 'error' });
  let isClosing = false;
  const close = async () => {
    isClosing = true;
    await app.close();
    store.close();
  };
  try {
    await app.listen({ host: config.host, port: config.port });
  } catch (error) {
    await close();
    throw explained(error, config);
  }
  const { port } = app.server.address() as AddressInfo;
  const url = `http://${config.host.includes(':') ? `[${config.host}]` : config.host}:${port}/`;
  const served = { url, close };
  // Before anybody is told, since whoever reads that it serves may end it at once.
  given.onListening?.(served);
  say(`Duskround serves ${config.db} at ${url}`);
  await reckonAhead(app, () => isClosing);
  return served;
}

/** Sites whose forecast is reckoned before anybody asks: the first answer of a fresh process would be its slowest. */
const SITES_AHEAD = 3;

async function reckonAhead(app: ReturnType<typeof buildApp>, isClosing: () => boolean): Promise<void> {
  const headers = { host: 'localhost' };
  const sites = await app.inject({ url: `/api/sites?limit=${SITES_AHEAD}`, headers });
  if (sites.statusCode !== 200) return;
  for (const { id } of sites.json<{ id: string }[]>()) {
    if (isClosing()) return;
    await app.inject({ url: `/api/sites/${id}/forecast`, headers });
  }
}

/**
 * Ends a service cleanly when the process is asked to end.
 * @param served the running service
 */
export function closeOnSignal(served: Served): void {
  for (const signal of ['SIGTERM', 'SIGINT'] as const)
    process.once(signal, () => served.close().then(() => process.exit(0)));
}

function explained(error: unknown, { host, port }: Config): unknown {
  const code = (error as NodeJS.ErrnoException).code;
  if (code === 'EADDRINUSE')
    return new ConfigError(
      `Port ${port} is in use already, perhaps by another Duskround. Close that, or set DUSKROUND_PORT to another port.`,
    );
  if (code === 'EACCES')
    return new ConfigError(
      `Port ${port} may not be used by this account. Set DUSKROUND_PORT to one above 1023.`,
    );
  if (code === 'EADDRNOTAVAIL')
    return new ConfigError(`${host} is no address of this machine. Set DUSKROUND_HOST to 127.0.0.1.`);
  return error;
}

function say(text: string): void {
  console.log(text);
}

/**
 * Runs a program's main part; what was foreseen ends in a sentence, not in a stack.
 * @param run the main part
 */
export async function runMain(run: () => Promise<void>): Promise<void> {
  try {
    await run();
  } catch (error) {
    const foreseen = error instanceof ConfigError || error instanceof StoreError;
    console.error(foreseen ? error.message : error);
    process.exit(1);
  }
}

// The path it was started by may be a link to this file.
const startedBy = process.argv[1];
const isProgram = startedBy !== undefined && realpathSync(startedBy) === fileURLToPath(import.meta.url);
if (isProgram) {
  await runMain(async () => {
    await serve(readConfig(), { onListening: closeOnSignal });
  });
}
