import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import { addProp } from '../../actions/add-prop.ts';
import { changeProp } from '../../actions/change-prop.ts';
import type { Deps } from '../../actions/deps.ts';
import { propOf } from '../../actions/find-prop.ts';
import { listProps } from '../../actions/list-props.ts';
import { removeProp } from '../../actions/remove-prop.ts';
import { propAnswer } from '../answers.ts';
import { newPropOf, propChangesOf } from '../bodies.ts';
import { pageOf } from '../paging.ts';
import { NoContent, ref } from '../responses.ts';
import { NewProp, Prop, PropChanges, PropsQuery } from '../schemas/props.ts';

type OfProp = { Params: { propId: string } };

const WHOLE_SITE = 10_000;

export function propRoutes(app: FastifyInstance, deps: Deps): void {
  app.post<{ Body: NewProp }>(
    '/api/props',
    {
      schema: {
        operationId: 'addProp',
        summary: 'Add a prop to a site',
        body: NewProp,
        response: { 201: ref(Prop) },
      },
    },
    async (request, reply) => {
      const prop = addProp(deps, newPropOf(request.body));
      return reply.code(201).header('location', `/api/props/${prop.id}`).send(propAnswer(prop));
    },
  );

  app.get<{ Querystring: PropsQuery }>(
    '/api/props',
    {
      schema: {
        operationId: 'listProps',
        summary: 'The props of a site by tag; a Link header names the next page',
        querystring: PropsQuery,
        response: { 200: Type.Array(ref(Prop)) },
      },
    },
    async (request, reply) => {
      const { limit = WHOLE_SITE, ...which } = request.query;
      const props = listProps(deps, { limit: limit + 1, ...which });
      return pageOf(props, { limit, request, reply }).map(propAnswer);
    },
  );

  app.get<OfProp>(
    '/api/props/:propId',
    { schema: { operationId: 'getProp', summary: 'One prop', response: { 200: ref(Prop) } } },
    async (request) => propAnswer(propOf(deps.store.db, request.params.propId)),
  );

  app.patch<OfProp & { Body: PropChanges }>(
    '/api/props/:propId',
    {
      schema: {
        operationId: 'changeProp',
        summary: 'Replace the given fields of a prop; null takes an optional one away',
        body: PropChanges,
        response: { 200: ref(Prop) },
      },
    },
    async (request) =>
      propAnswer(changeProp(deps, { ...request.params, changes: propChangesOf(request.body) })),
  );

  app.delete<OfProp>(
    '/api/props/:propId',
    {
      schema: {
        operationId: 'removeProp',
        summary: 'Remove a prop with its log',
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      removeProp(deps, request.params);
      return reply.code(204).send();
    },
  );
}
