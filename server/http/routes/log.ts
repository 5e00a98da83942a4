import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import type { Deps } from '../../actions/deps.ts';
import { entryOf } from '../../actions/find-entry.ts';
import { listLog } from '../../actions/list-log.ts';
import { once } from '../../actions/once.ts';
import { recordSighting } from '../../actions/record-sighting.ts';
import { recordSwap } from '../../actions/record-swap.ts';
import { undoEntry } from '../../actions/undo-entry.ts';
import { entryAnswer } from '../answers.ts';
import { instantOf } from '../bodies.ts';
import { pageOf } from '../paging.ts';
import { ReplayHeaders, replayOf, sendOnce } from '../replay.ts';
import { ref } from '../responses.ts';
import { LogQuery, NewSighting, NewSwap, Sighting, Swap } from '../schemas/log.ts';

type OfProp = { Params: { propId: string } };
type OfEntry = { Params: { propId: string; entryId: string } };

const AnyEntry = Type.Union([ref(Swap), ref(Sighting)]);
export function logRoutes(app: FastifyInstance, deps: Deps): void {
  app.post<OfProp & { Body: NewSwap }>(
    '/api/props/:propId/swaps',
    {
      schema: {
        operationId: 'recordSwap',
        summary: 'Cells were changed',
        headers: ReplayHeaders,
        body: NewSwap,
        response: { 201: ref(Swap) },
      },
    },
    async (request, reply) => {
      const { body, params } = request;
      const answer = once(deps, {
        replay: replayOf(request),
        deed: () => recordSwap(deps, { ...body, propId: params.propId, at: instantOf(body.at) }),
        answer: ({ swap, hints }) => ({ status: 201, body: JSON.stringify(entryAnswer(swap, hints)) }),
      });
      return sendOnce(reply, answer);
    },
  );

  app.post<OfProp & { Body: NewSighting }>(
    '/api/props/:propId/sightings',
    {
      schema: {
        operationId: 'recordSighting',
        summary: 'Somebody saw the prop',
        headers: ReplayHeaders,
        body: NewSighting,
        response: { 201: ref(Sighting) },
      },
    },
    async (request, reply) => {
      const { body, params } = request;
      const answer = once(deps, {
        replay: replayOf(request),
        deed: () => recordSighting(deps, { ...body, propId: params.propId, at: instantOf(body.at) }),
        answer: ({ sighting, hints }) => ({
          status: 201,
          body: JSON.stringify(entryAnswer(sighting, hints)),
        }),
      });
      return sendOnce(reply, answer);
    },
  );

  app.get<OfProp & { Querystring: LogQuery }>(
    '/api/props/:propId/log',
    {
      schema: {
        operationId: 'listLog',
        summary: 'Swaps and sightings, newest first',
        querystring: LogQuery,
        response: { 200: Type.Array(AnyEntry) },
      },
    },
    async (request, reply) => {
      const { limit = 100, undone = false, ...from } = request.query;
      const found = listLog(deps, { ...request.params, ...from, limit: limit + 1, undone });
      return pageOf(found, { limit, request, reply }).map((entry) => entryAnswer(entry));
    },
  );

  app.get<OfEntry>(
    '/api/props/:propId/log/:entryId',
    {
      schema: {
        operationId: 'getEntry',
        summary: 'One swap or sighting',
        response: { 200: AnyEntry },
      },
    },
    async (request) => entryAnswer(entryOf(deps.store.db, request.params)),
  );

  app.delete<OfEntry>(
    '/api/props/:propId/log/:entryId',
    {
      schema: {
        operationId: 'undoEntry',
        summary: 'Take a swap or sighting back; it stays in the log, marked',
        response: { 200: AnyEntry },
      },
    },
    async (request) => entryAnswer(undoEntry(deps, request.params)),
  );
}
