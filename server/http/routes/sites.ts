import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import { changeSite } from '../../actions/change-site.ts';
import { createSite } from '../../actions/create-site.ts';
import type { Deps } from '../../actions/deps.ts';
import { siteOf } from '../../actions/find-site.ts';
import { listSites } from '../../actions/list-sites.ts';
import { removeSite } from '../../actions/remove-site.ts';
import { pageOf } from '../paging.ts';
import { NoContent, ref } from '../responses.ts';
import { NewSite, Site, SiteChanges, SitesQuery } from '../schemas/sites.ts';

type OfSite = { Params: { siteId: string } };

export function siteRoutes(app: FastifyInstance, deps: Deps): void {
  app.post<{ Body: NewSite }>(
    '/api/sites',
    {
      schema: {
        operationId: 'createSite',
        summary: 'Make a site',
        body: NewSite,
        response: { 201: ref(Site) },
      },
    },
    async (request, reply) => {
      const site = createSite(deps, request.body);
      return reply.code(201).header('location', `/api/sites/${site.id}`).send(site);
    },
  );

  app.get<{ Querystring: SitesQuery }>(
    '/api/sites',
    {
      schema: {
        operationId: 'listSites',
        summary: 'Sites by name; a Link header names the next page',
        querystring: SitesQuery,
        response: { 200: Type.Array(ref(Site)) },
      },
    },
    async (request, reply) => {
      const { limit = 100, ...after } = request.query;
      return pageOf(listSites(deps, { limit: limit + 1, ...after }), { limit, request, reply });
    },
  );

  app.get<OfSite>(
    '/api/sites/:siteId',
    { schema: { operationId: 'getSite', summary: 'One site', response: { 200: ref(Site) } } },
    async (request) => siteOf(deps.store.db, request.params.siteId),
  );

  app.patch<OfSite & { Body: SiteChanges }>(
    '/api/sites/:siteId',
    {
      schema: {
        operationId: 'changeSite',
        summary: 'Replace the given fields of a site',
        body: SiteChanges,
        response: { 200: ref(Site) },
      },
    },
    async (request) => changeSite(deps, { siteId: request.params.siteId, changes: request.body }),
  );

  app.delete<OfSite>(
    '/api/sites/:siteId',
    {
      schema: {
        operationId: 'removeSite',
        summary: 'Remove a site with everything on it',
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      removeSite(deps, { siteId: request.params.siteId });
      return reply.code(204).send();
    },
  );
}
