import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import type { Deps } from '../../actions/deps.ts';
import { listCalendarLinks } from '../../actions/list-calendar-links.ts';
import { makeCalendarLink } from '../../actions/make-calendar-link.ts';
import { removeCalendarLink } from '../../actions/remove-calendar-link.ts';
import { linkAnswer } from '../answers.ts';
import { NoContent, ref } from '../responses.ts';
import { CalendarLink, MadeCalendarLink, NewCalendarLink } from '../schemas/calendar-links.ts';

type OfSite = { Params: { siteId: string } };

export function calendarLinkRoutes(app: FastifyInstance, deps: Deps, publicUrl: string | null): void {
  app.post<OfSite & { Body: NewCalendarLink }>(
    '/api/sites/:siteId/calendar-links',
    {
      // Everything in the body is optional, so the body is too.
      preValidation: async (request) => {
        if (request.body === undefined) request.body = {};
      },
      schema: {
        operationId: 'makeCalendarLink',
        summary: 'Make a secret calendar address; it is told this once',
        body: NewCalendarLink,
        response: { 201: MadeCalendarLink },
      },
    },
    async (request, reply) => {
      const { link, secret } = makeCalendarLink(deps, { ...request.body, siteId: request.params.siteId });
      const base = publicUrl ?? `http://${request.headers.host}`;
      return reply.code(201).send({ id: link.id, url: `${base}/calendars/${secret}.ics` });
    },
  );

  app.get<OfSite>(
    '/api/sites/:siteId/calendar-links',
    {
      schema: {
        operationId: 'listCalendarLinks',
        summary: 'Calendar links, without their secrets',
        response: { 200: Type.Array(ref(CalendarLink)) },
      },
    },
    async (request) => listCalendarLinks(deps, request.params).map(linkAnswer),
  );

  app.delete<OfSite & { Params: { linkId: string } }>(
    '/api/sites/:siteId/calendar-links/:linkId',
    {
      schema: {
        operationId: 'removeCalendarLink',
        summary: 'Revoke a calendar link',
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      removeCalendarLink(deps, request.params);
      return reply.code(204).send();
    },
  );
}
