import type { FastifyInstance } from 'fastify';
import { Type } from 'typebox';
import { addCellType } from '../../actions/add-cell-type.ts';
import { changeCellType } from '../../actions/change-cell-type.ts';
import type { Deps } from '../../actions/deps.ts';
import { cellTypeOf } from '../../actions/find-cell-type.ts';
import { listCellTypes } from '../../actions/list-cell-types.ts';
import { removeCellType } from '../../actions/remove-cell-type.ts';
import { NoContent, ref } from '../responses.ts';
import { CellType, CellTypeChanges, NewCellType } from '../schemas/cell-types.ts';

type OfCellType = { Params: { cellTypeId: string } };

export function cellTypeRoutes(app: FastifyInstance, deps: Deps): void {
  app.get(
    '/api/cell-types',
    {
      schema: {
        operationId: 'listCellTypes',
        summary: 'Your own cell types, then the built-in ones',
        response: { 200: Type.Array(ref(CellType)) },
      },
    },
    async () => listCellTypes(deps),
  );

  app.post<{ Body: NewCellType }>(
    '/api/cell-types',
    {
      schema: {
        operationId: 'addCellType',
        summary: 'Add a cell type of your own',
        body: NewCellType,
        response: { 201: ref(CellType) },
      },
    },
    async (request, reply) => {
      const type = addCellType(deps, request.body);
      return reply.code(201).header('location', `/api/cell-types/${type.id}`).send(type);
    },
  );

  app.get<OfCellType>(
    '/api/cell-types/:cellTypeId',
    {
      schema: {
        operationId: 'getCellType',
        summary: 'One cell type, built in or your own',
        response: { 200: ref(CellType) },
      },
    },
    async (request) => cellTypeOf(deps, request.params.cellTypeId),
  );

  app.patch<OfCellType & { Body: CellTypeChanges }>(
    '/api/cell-types/:cellTypeId',
    {
      schema: {
        operationId: 'changeCellType',
        summary: 'Replace the given fields of a cell type of your own',
        body: CellTypeChanges,
        response: { 200: ref(CellType) },
      },
    },
    async (request) => changeCellType(deps, { ...request.params, changes: request.body }),
  );

  app.delete<OfCellType>(
    '/api/cell-types/:cellTypeId',
    {
      schema: {
        operationId: 'removeCellType',
        summary: 'Remove a cell type of your own that nothing names',
        response: { 204: NoContent },
      },
    },
    async (request, reply) => {
      removeCellType(deps, request.params);
      return reply.code(204).send();
    },
  );
}
