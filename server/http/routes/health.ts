import type { FastifyInstance } from 'fastify';
import type { Deps } from '../../actions/deps.ts';
import { formatInstant } from '../../model/evening.ts';
import { Health } from '../schemas/health.ts';

export function healthRoutes(app: FastifyInstance, deps: Deps, version: string): void {
  app.get(
    '/api/health',
    {
      schema: {
        operationId: 'getHealth',
        summary: 'Whether the service runs',
        response: { 200: Health },
      },
    },
    async (): Promise<Health> => ({
      status: 'ok',
      version,
      schemaVersion: deps.store.schemaVersion,
      timeZoneData: process.versions.tz ?? 'unknown',
      asOf: deps.clock.fixed ? formatInstant(deps.clock.now()) : null,
    }),
  );
}
