import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import type { Deps } from '../../actions/deps.ts';
import { listNights } from '../../actions/list-nights.ts';
import { listShowNights } from '../../actions/list-show-nights.ts';
import { setShowNights } from '../../actions/set-show-nights.ts';
import { nightAnswer } from '../answers.ts';
import { asOfIn } from '../bodies.ts';
import { SiteForecastQuery } from '../schemas/forecasts.ts';
import { Night, NightsQuery, ShowNights } from '../schemas/sites.ts';

type OfSite = { Params: { siteId: string } };

export function nightRoutes(app: FastifyInstance, deps: Deps): void {
  app.get<OfSite & { Querystring: NightsQuery }>(
    '/api/sites/:siteId/nights',
    {
      schema: {
        operationId: 'listNights',
        summary: 'Sun, visitors and weather of each evening of the season, or of another run of at most 400',
        querystring: NightsQuery,
        response: { 200: Type.Array(Night) },
      },
    },
    async (request) => {
      const { asOf: _, ...run } = request.query;
      return listNights(deps, { ...request.params, ...run, ...asOfIn(request.query) }).map(nightAnswer);
    },
  );

  app.get<OfSite & { Querystring: SiteForecastQuery }>(
    '/api/sites/:siteId/show-nights',
    {
      schema: {
        operationId: 'listShowNights',
        summary: 'The show nights as they stand, or stood',
        querystring: SiteForecastQuery,
        response: { 200: ShowNights },
      },
    },
    async (request) => listShowNights(deps, { ...request.params, ...asOfIn(request.query) }),
  );

  app.put<OfSite & { Body: ShowNights }>(
    '/api/sites/:siteId/show-nights',
    {
      schema: {
        operationId: 'setShowNights',
        summary: 'Replace the list of show nights',
        body: ShowNights,
        response: { 200: ShowNights },
      },
    },
    async (request) => setShowNights(deps, { ...request.params, nights: request.body }),
  );
}
