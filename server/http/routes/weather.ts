import type { FastifyInstance } from 'fastify';
import type { Deps } from '../../actions/deps.ts';
import { importWeather } from '../../actions/import-weather.ts';
import { removeWeather } from '../../actions/remove-weather.ts';
import { typeNight, untypeNight } from '../../actions/type-night.ts';
import { weatherInUse } from '../../actions/weather-in-use.ts';
import { FILE_LIMIT_BYTES, FILE_TYPES, fileTextIn } from '../files.ts';
import { NoContent } from '../responses.ts';
import {
  KeptTypedNight,
  TypedNight,
  WeatherImported,
  WeatherInUse,
  WeatherQuery,
  WeatherRemovalQuery,
} from '../schemas/sites.ts';

type OfSite = { Params: { siteId: string } };
type OfNight = { Params: { siteId: string; evening: string } };

/** For a scope that takes files. */
export function weatherRoutes(app: FastifyInstance, deps: Deps): void {
  app.post<OfSite & { Querystring: WeatherQuery }>(
    '/api/sites/:siteId/weather',
    {
      bodyLimit: FILE_LIMIT_BYTES,
      config: { reads: FILE_TYPES },
      schema: {
        operationId: 'importWeather',
        summary:
          'Take a weather file in: a typical year (EPW) or a CSV of time and temperature, as text/csv or a form upload',
        querystring: WeatherQuery,
        response: { 200: WeatherImported },
      },
    },
    async (request) => {
      const text = await fileTextIn(request);
      return importWeather(deps, { ...request.params, ...request.query, text });
    },
  );

  app.get<OfSite>(
    '/api/sites/:siteId/weather',
    {
      schema: {
        operationId: 'weatherInUse',
        summary: 'Which files and typed nights the forecasts of a site rest on',
        response: { 200: WeatherInUse },
      },
    },
    async (request) => weatherInUse(deps, request.params),
  );

  app.delete<OfSite & { Querystring: WeatherRemovalQuery }>(
    '/api/sites/:siteId/weather',
    {
      schema: {
        operationId: 'removeWeather',
        summary: 'Take the typical year, or every imported hour, out again',
        querystring: WeatherRemovalQuery,
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      removeWeather(deps, { ...request.params, ...request.query });
      return reply.code(204).send();
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
