import swagger from '@fastify/swagger';
import type { FastifyInstance } from 'fastify';
import { CalendarLink } from './schemas/calendar-links.ts';
import { CellType } from './schemas/cell-types.ts';
import { Problem } from './schemas/errors.ts';
import { PropForecast, SiteForecast } from './schemas/forecasts.ts';
import { Sighting, Swap } from './schemas/log.ts';
import { Prop } from './schemas/props.ts';
import { Site } from './schemas/sites.ts';

const SHARED = [CalendarLink, CellType, Problem, Prop, PropForecast, Sighting, Site, SiteForecast, Swap];

/**
 * Describes the API from the schemas its routes are checked with.
 * @param app the app, before its routes are added. Shared schemas belong to it and to no plugin: a plugin with a
 *   schema of its own would go back to a validator that turns 5 into "5".
 * @param version of this program
 */
export function describeApi(app: FastifyInstance, version: string): void {
  for (const schema of SHARED) app.addSchema(schema);
  app.register(swagger, {
    openapi: {
      openapi: '3.1.0',
      info: {
        title: 'Duskround',
        version,
        description:
          'Which battery-lit props go dim before somebody can reach them, and by when each must be swapped.',
      },
    },
    refResolver: {
      buildLocalReference: (json, _baseUri, _fragment, index) =>
        typeof json.$id === 'string' ? json.$id : `schema-${index}`,
    },
  });
  app.get('/api/openapi.json', { schema: { hide: true } }, async () => app.swagger());
}
