import swagger from '@fastify/swagger';
import type { FastifyInstance, FastifySchema } from 'fastify';
import { Type } from 'typebox';
import { isWrite } from './guards.ts';
import { PROBLEMS } from './problems.ts';
import { CalendarLink } from './schemas/calendar-links.ts';
import { CellType } from './schemas/cell-types.ts';
import { Problem } from './schemas/errors.ts';
import { PropForecast, SiteForecast } from './schemas/forecasts.ts';
import { Sighting, Swap } from './schemas/log.ts';
import { Prop } from './schemas/props.ts';
import { Site } from './schemas/sites.ts';

const SHARED = [CalendarLink, CellType, Problem, Prop, PropForecast, Sighting, Site, SiteForecast, Swap];
const READ_PROBLEMS = [400, 404, 405, 414, 421, 500];
const WRITE_PROBLEMS = [400, 403, 404, 405, 409, 413, 414, 415, 421, 422, 429, 500];

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
    transform: ({ schema, url, route }) => {
      const isWriting = [route.method].flat().some(isWrite);
      const described = withProblems(schema ?? {}, isWriting ? WRITE_PROBLEMS : READ_PROBLEMS);
      return { schema: withFile(described, route.config?.reads ?? []), url };
    },
    refResolver: {
      buildLocalReference: (json, _baseUri, _fragment, index) =>
        typeof json.$id === 'string' ? json.$id : `schema-${index}`,
    },
  });
  app.get('/api/openapi.json', { schema: { hide: true } }, async () => app.swagger());
}

/** Every route can say no in the same ways. They are added here, since a serializer each would make starting slow. */
function withProblems(schema: FastifySchema, statuses: readonly number[]): FastifySchema {
  const problems = statuses.map((status) => [
    status,
    {
      description: titlesOf(status),
      content: { 'application/problem+json': { schema: Type.Ref('Problem') } },
    },
  ]);
  return { ...schema, response: { ...(schema.response as object), ...Object.fromEntries(problems) } };
}

/** A file has no schema to be checked by, so what may be sent is only described. */
function withFile(schema: FastifySchema, types: readonly string[]): FastifySchema {
  if (types.length === 0) return schema;
  const file = { type: 'string', description: 'The file as it is.' };
  const form = { type: 'object', required: ['file'], properties: { file } };
  const content = types.map((type) => [type, { schema: type.startsWith('multipart/') ? form : file }]);
  return { ...schema, body: { content: Object.fromEntries(content) } };
}

function titlesOf(status: number): string {
  const rows = Object.values(PROBLEMS).filter((row) => row.status === status);
  return rows.map((row) => row.title).join('; or: ');
}
