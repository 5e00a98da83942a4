import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import { hasAlready } from '../not-modified.ts';
import { HttpProblem } from '../problems.ts';
import { NotModified } from '../responses.ts';

/** Reads the calendar that a secret opens, and the mark of its bytes; null for a secret nobody has, or has any more. */
export type CalendarReader = (secret: string) => { text: string; etag: string } | null;

/**
 * The calendar feed. Anybody may ask with any program: what counts is the secret in the path.
 * @param app the app
 * @param read opens the calendar behind a secret
 */
export function calendarRoutes(app: FastifyInstance, read: CalendarReader): void {
  app.get<{ Params: { token: string } }>(
    '/calendars/:token.ics',
    {
      schema: {
        operationId: 'readCalendar',
        summary: 'The calendar feed (RFC 5545) of a link',
        response: {
          200: { description: 'An iCalendar file', content: { 'text/calendar': { schema: Type.String() } } },
          304: NotModified,
        },
      },
    },
    async (request, reply) => {
      const calendar = read(request.params.token);
      if (!calendar) throw new HttpProblem('not-found', 'There is nothing at this address.');
      const { text, etag } = calendar;
      reply.headers({ etag, 'cache-control': 'private, no-cache', 'x-robots-tag': 'noindex' });
      if (hasAlready(request, etag)) return reply.code(304).send();
      return reply
        .type('text/calendar; charset=utf-8')
        .header('content-disposition', 'inline; filename="rounds.ics"')
        .send(Buffer.from(text, 'utf8'));
    },
  );
}
