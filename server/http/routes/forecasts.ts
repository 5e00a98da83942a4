import type { FastifyInstance } from 'fastify';
import type { Deps } from '../../actions/deps.ts';
import { forecastProp } from '../../actions/forecast-prop.ts';
import { presentMoment } from '../../actions/forecast-season.ts';
import { forecastSite, siteForecastMark } from '../../actions/forecast-site.ts';
import { propForecastAnswer, siteForecastAnswer } from '../answers.ts';
import { asOfIn } from '../bodies.ts';
import { keptBodies } from '../kept-bodies.ts';
import { hasAlready } from '../not-modified.ts';
import { NotModified, ref } from '../responses.ts';
import { ForecastQuery, PropForecast, SiteForecast, SiteForecastQuery } from '../schemas/forecasts.ts';

const MOST_KEPT_LENGTH = 16_000_000;

/**
 * @param version of this program: another one may reckon otherwise, so what it sent is no longer good
 */
export function forecastRoutes(app: FastifyInstance, deps: Deps, version: string): void {
  const kept = keptBodies(MOST_KEPT_LENGTH);

  app.get<{ Params: { siteId: string }; Querystring: SiteForecastQuery }>(
    '/api/sites/:siteId/forecast',
    {
      schema: {
        operationId: 'forecastSite',
        summary: 'Every prop of a site: which go dim before the next round',
        querystring: SiteForecastQuery,
        response: { 200: ref(SiteForecast), 304: NotModified },
      },
    },
    async (request, reply) => {
      // Asked once: across a quarter of an hour the mark and the body would else be of two moments.
      const { siteId } = request.params;
      const which = { siteId, asOf: asOfIn(request.query).asOf ?? presentMoment(deps, siteId) };
      const mark = siteForecastMark(deps, which);
      const etag = `W/"${version}-${mark}"`;
      reply.headers({ etag, 'cache-control': 'private, no-cache' });
      if (hasAlready(request, etag)) return reply.code(304).send();
      const body = kept.bodyOf(mark, () => JSON.stringify(siteForecastAnswer(forecastSite(deps, which))));
      return reply
        .type('application/json; charset=utf-8')
        .serializer((text: string) => text)
        .send(body);
    },
  );

  app.get<{ Params: { propId: string }; Querystring: ForecastQuery }>(
    '/api/props/:propId/forecast',
    {
      schema: {
        operationId: 'forecastProp',
        summary: 'One prop: when it goes dim and dark, by when to swap it, and the sum behind that',
        querystring: ForecastQuery,
        response: { 200: ref(PropForecast) },
      },
    },
    async (request) => {
      const { asOf: _, ...run } = request.query;
      return propForecastAnswer(forecastProp(deps, { ...request.params, ...run, ...asOfIn(request.query) }));
    },
  );
}
