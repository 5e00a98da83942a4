import fastifyMultipart from '@fastify/multipart';
import type { FastifyInstance, FastifyRequest } from 'fastify';
import type { Deps } from '../../actions/deps.ts';
import { importWeather } from '../../actions/import-weather.ts';
import { typeNight, untypeNight } from '../../actions/type-night.ts';
import { HttpProblem } from '../problems.ts';
import { NoContent } from '../responses.ts';
import { KeptTypedNight, TypedNight, WeatherImported, WeatherQuery } from '../schemas/sites.ts';

type OfSite = { Params: { siteId: string } };
type OfNight = { Params: { siteId: string; evening: string } };

const FILE_LIMIT_BYTES = 16 * 1024 * 1024;
const FORM = 'multipart/form-data';

/** In a scope of its own: files are read here and nowhere else. */
export function weatherRoutes(app: FastifyInstance, deps: Deps): void {
  app.addContentTypeParser(
    'text/csv',
    { parseAs: 'buffer', bodyLimit: FILE_LIMIT_BYTES },
    (_request, body, done) => done(null, body),
  );
  app.register(fastifyMultipart, { limits: { files: 1, fields: 4, parts: 5, fileSize: FILE_LIMIT_BYTES } });

  app.post<OfSite & { Querystring: WeatherQuery }>(
    '/api/sites/:siteId/weather',
    {
      bodyLimit: FILE_LIMIT_BYTES,
      config: { reads: ['text/csv', FORM] },
      schema: {
        operationId: 'importWeather',
        summary:
          'Take a weather file in: a typical year (EPW) or a CSV of time and temperature, as text/csv or a form upload',
        querystring: WeatherQuery,
        response: { 200: WeatherImported },
      },
    },
    async (request) => {
      const text = decoded(await fileIn(request));
      return importWeather(deps, { ...request.params, ...request.query, text });
    },
  );

  app.put<OfNight & { Body: TypedNight }>(
    '/api/sites/:siteId/weather/nights/:evening',
    {
      schema: {
        operationId: 'typeNight',
        summary: 'The low and high of a night, typed by hand; beats any file',
        body: TypedNight,
        response: { 200: KeptTypedNight },
      },
    },
    async (request) => typeNight(deps, { ...request.params, night: request.body }),
  );

  app.delete<OfNight>(
    '/api/sites/:siteId/weather/nights/:evening',
    {
      schema: {
        operationId: 'untypeNight',
        summary: 'Forget what was typed for a night',
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      untypeNight(deps, request.params);
      return reply.code(204).send();
    },
  );
}

async function fileIn(request: FastifyRequest): Promise<Buffer> {
  if (Buffer.isBuffer(request.body)) return request.body;
  let file: Buffer | undefined;
  // To the end, so that a second file is noticed.
  if (request.isMultipart()) for await (const part of request.files()) file = await part.toBuffer();
  if (file) return file;
  throw new HttpProblem(
    'invalid',
    'No file came. Send it as text/csv in the body, or as the one file of a form.',
    {
      faults: [{ field: 'file', message: 'The file is missing.' }],
    },
  );
}

// Weather files are UTF-8 or latin-1, and spreadsheets may write UTF-16; none says which.
function decoded(file: Buffer): string {
  if (file[0] === 0xff && file[1] === 0xfe) return new TextDecoder('utf-16le').decode(file);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(file);
  } catch {
    return file.toString('latin1');
  }
}
