import type { FastifyInstance, FastifyReply } from 'fastify';
import { Type } from 'typebox';
import type { Deps } from '../../actions/deps.ts';
import { exportForecast } from '../../actions/export-forecast.ts';
import { exportLog } from '../../actions/export-log.ts';
import { exportProps } from '../../actions/export-props.ts';
import { importProps } from '../../actions/import-props.ts';
import { asOfIn, readNewProp } from '../bodies.ts';
import { FILE_LIMIT_BYTES, FILE_TYPES, fileTextIn } from '../files.ts';
import { PropsImported, PropsImportQuery } from '../schemas/csv.ts';
import { SiteForecastQuery } from '../schemas/forecasts.ts';

type OfSite = { Params: { siteId: string } };

const CsvFile = { description: 'A CSV file', content: { 'text/csv': { schema: Type.String() } } };

/** For a scope that takes files. */
export function csvRoutes(app: FastifyInstance, deps: Deps): void {
  app.post<OfSite & { Querystring: PropsImportQuery }>(
    '/api/sites/:siteId/props/import',
    {
      bodyLimit: FILE_LIMIT_BYTES,
      config: { reads: FILE_TYPES },
      schema: {
        operationId: 'importProps',
        summary: 'Take a CSV of props in, all or nothing; a known tag changes that prop in the given columns',
        querystring: PropsImportQuery,
        response: { 200: PropsImported },
      },
    },
    async (request) => {
      const { dryRun = false } = request.query;
      const text = await fileTextIn(request);
      return importProps(deps, { ...request.params, text, dryRun, readProp: readNewProp });
    },
  );

  app.get<OfSite>(
    '/api/sites/:siteId/props.csv',
    {
      schema: {
        operationId: 'exportProps',
        summary: 'The props of a site as CSV, to be taken in again',
        response: { 200: CsvFile },
      },
    },
    async (request, reply) => sendCsv(reply, 'props.csv', exportProps(deps, request.params)),
  );

  app.get<OfSite>(
    '/api/sites/:siteId/log.csv',
    {
      schema: {
        operationId: 'exportLog',
        summary: 'Swaps and sightings of a site as CSV, prop by prop, without what was undone',
        response: { 200: CsvFile },
      },
    },
    async (request, reply) => sendCsv(reply, 'log.csv', exportLog(deps, request.params)),
  );

  app.get<OfSite & { Querystring: SiteForecastQuery }>(
    '/api/sites/:siteId/forecast.csv',
    {
      schema: {
        operationId: 'exportForecast',
        summary: 'The forecast of a site as CSV, a prop a row',
        querystring: SiteForecastQuery,
        response: { 200: CsvFile },
      },
    },
    async (request, reply) =>
      sendCsv(reply, 'forecast.csv', exportForecast(deps, { ...request.params, ...asOfIn(request.query) })),
  );
}

function sendCsv(reply: FastifyReply, fileName: string, text: string): FastifyReply {
  return reply
    .type('text/csv; charset=utf-8')
    .header('content-disposition', `attachment; filename="${fileName}"`)
    .send(Buffer.from(text, 'utf8'));
}
