import { randomBytes, randomUUID } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import fastify, { type FastifyInstance, type FastifyServerOptions } from 'fastify';
import type { Deps } from './actions/deps.ts';
import { readCalendar } from './actions/read-calendar.ts';
import type { Clock } from './clock.ts';
import { packageRoot } from './config.ts';
import { answerErrors, answerFrameworkError, answerUnreadable } from './http/errors.ts';
import { takeFiles } from './http/files.ts';
import { guard } from './http/guards.ts';
import { logSerializers } from './http/log-lines.ts';
import { describeApi } from './http/openapi.ts';
import { servePages } from './http/pages.ts';
import { limitRates } from './http/rate-limit.ts';
import { calendarRoutes } from './http/routes/calendar.ts';
import { calendarLinkRoutes } from './http/routes/calendar-links.ts';
import { cellTypeRoutes } from './http/routes/cell-types.ts';
import { csvRoutes } from './http/routes/csv.ts';
import { forecastRoutes } from './http/routes/forecasts.ts';
import { healthRoutes } from './http/routes/health.ts';
import { logRoutes } from './http/routes/log.ts';
import { nightRoutes } from './http/routes/nights.ts';
import { propRoutes } from './http/routes/props.ts';
import { siteRoutes } from './http/routes/sites.ts';
import { weatherRoutes } from './http/routes/weather.ts';
import { addSecurityHeaders } from './http/security-headers.ts';
import { validatorCompiler } from './http/validate.ts';
import type { Store } from './store/open.ts';

export type AppOptions = {
  store: Store;
  clock: Clock;
  /** Base of calendar addresses, and a further name the service goes by. */
  publicUrl?: string | null;
  /** The lowest level that is logged; nothing is when absent. */
  logLevel?: 'info' | 'warn' | 'error';
  /** Absolute path of the built pages; where the build puts them when absent. */
  webRoot?: string;
  /** Changes a minute taken from one address. */
  writesPerMinute?: number;
};

const BODY_LIMIT_BYTES = 1024 * 1024;
const REQUEST_TIMEOUT_MS = 120_000;

/**
 * The whole service, wired, not yet listening. Closing it leaves the store open: whoever opened that closes it.
 * @param options the store, the clock, and what is not as usual
 */
export function buildApp(options: AppOptions): FastifyInstance {
  const deps: Deps = {
    store: options.store,
    clock: options.clock,
    newId: randomUUID,
    newSecret: () => randomBytes(32).toString('base64url'),
  };
  const publicUrl = options.publicUrl ?? null;
  const root = packageRoot();
  const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { version: string };
  const app = fastify(serverOptions(options));

  app.setValidatorCompiler(validatorCompiler);
  addSecurityHeaders(app);
  guard(app, publicUrl);
  answerErrors(app);
  limitRates(app, options.writesPerMinute ?? 3000);
  describeApi(app, version);
  app.register(async (routes) => {
    healthRoutes(routes, deps, version);
    siteRoutes(routes, deps);
    nightRoutes(routes, deps);
    cellTypeRoutes(routes, deps);
    propRoutes(routes, deps);
    logRoutes(routes, deps);
    forecastRoutes(routes, deps, version);
    calendarLinkRoutes(routes, deps, publicUrl);
    calendarRoutes(routes, (secret) => readCalendar(deps, { secret }));
  });
  app.register(async (routes) => {
    takeFiles(routes);
    weatherRoutes(routes, deps);
    csvRoutes(routes, deps);
  });
  servePages(app, options.webRoot ?? join(root, 'dist', 'web'));
  return app;
}

function serverOptions({ logLevel }: AppOptions): FastifyServerOptions {
  return {
    logger: logLevel ? { level: logLevel, serializers: logSerializers } : false,
    bodyLimit: BODY_LIMIT_BYTES,
    requestTimeout: REQUEST_TIMEOUT_MS,
    frameworkErrors: answerFrameworkError,
    clientErrorHandler: answerUnreadable,
  };
}
