import { createHash } from 'node:crypto';
import type { FastifyReply, FastifyRequest } from 'fastify';
import { Type } from 'typebox';
import type { Answer, Replay } from '../actions/once.ts';

/** Headers of a deed that may be sent twice. */
export const ReplayHeaders = Type.Object({
  'idempotency-key': Type.Optional(
    Type.String({
      pattern: '^[\\x20-\\x7e]{1,255}$',
      description:
        'Made by the sender, one for each deed: sent again with the same body it gets the first answer.',
      slip: 'An Idempotency-Key is 1 to 255 printable ASCII characters.',
    }),
  ),
});

/**
 * How a request wants to be known, should it come again; null when it does not say.
 * @param request a checked request
 */
export function replayOf(request: FastifyRequest): Replay | null {
  const key = request.headers['idempotency-key'];
  if (typeof key !== 'string') return null;
  const path = request.url.split('?')[0];
  const bodyHash = createHash('sha256').update(canonical(request.body)).digest('hex');
  return { key: `${request.method} ${path} ${key}`, bodyHash };
}

/** JSON with its keys in order: the same body may be written in another one. */
function canonical(value: unknown): string {
  return JSON.stringify(value, (_key, inner: unknown) =>
    typeof inner === 'object' && inner !== null && !Array.isArray(inner)
      ? Object.fromEntries(Object.entries(inner).sort(([a], [b]) => (a < b ? -1 : 1)))
      : inner,
  );
}

/**
 * Sends the answer of a deed done once, saying so when it was done before.
 * @param reply where to
 * @param answer what `once` gave; its body is JSON text
 */
export function sendOnce(reply: FastifyReply, answer: Answer & { replayed: boolean }): FastifyReply {
  if (answer.replayed) reply.header('idempotency-replayed', 'true');
  const { id, propId } = JSON.parse(answer.body) as { id: string; propId: string };
  return reply
    .code(answer.status)
    .header('location', `/api/props/${propId}/log/${id}`)
    .type('application/json; charset=utf-8')
    .serializer((body: string) => body)
    .send(answer.body);
}
