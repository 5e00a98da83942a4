import type { FastifyInstance } from 'fastify';
import { Compile } from 'typebox/schema';

type Schema = { [keyword: string]: unknown };
type Content = { [type: string]: { schema: Schema } };
export type ApiDocument = {
  paths: {
    [path: string]: {
      [method: string]: { operationId: string; responses: { [status: string]: { content?: Content } } };
    };
  };
  components: { schemas: { [name: string]: Schema } };
};

/** An answer as it left the app. */
export type Sent = { method: string; route: string | undefined; status: number; type: string; body: string };

/**
 * Writes down every answer an app gives.
 * @param app before it is ready
 */
export function listenIn(app: FastifyInstance): Sent[] {
  const sent: Sent[] = [];
  app.addHook('onSend', async (request, reply, payload) => {
    sent.push({
      method: request.method,
      route: request.routeOptions.url,
      status: reply.statusCode,
      type: String(reply.getHeader('content-type') ?? '').split(';')[0]!,
      body: typeof payload === 'string' ? payload : '',
    });
  });
  return sent;
}

const validators = new Map<string, { Check(value: unknown): boolean; Errors(value: unknown): unknown }>();

/**
 * What an answer has that its description has not, or the other way round; null when they agree.
 * @param document the API's own description
 * @param sent the answer
 */
export function undocumented(document: ApiDocument, sent: Sent): string | null {
  const path = sent.route?.replace(/:(\w+)/g, '{$1}');
  const operation = path === undefined ? undefined : document.paths[path]?.[sent.method.toLowerCase()];
  if (!operation) return sent.status >= 400 ? problemFault(document, sent) : null;
  const response = operation.responses[sent.status];
  const what = `${sent.method} ${path} ${sent.status}`;
  if (!response) return `${what} is not described`;
  const content = response.content ?? {};
  if (sent.body === '') return null;
  const schema = content[sent.type]?.schema;
  if (!schema) return `${what} is described as ${Object.keys(content).join(', ')}, and was ${sent.type}`;
  return bodyFault(document, {
    what,
    schema,
    body: sent.type.includes('json') ? JSON.parse(sent.body) : sent.body,
  });
}

function problemFault(document: ApiDocument, sent: Sent): string | null {
  const what = `${sent.method} ${sent.status} without a route`;
  if (sent.type !== 'application/problem+json') return `${what} is no problem document but ${sent.type}`;
  return bodyFault(document, {
    what,
    schema: { $ref: '#/components/schemas/Problem' },
    body: JSON.parse(sent.body),
  });
}

function bodyFault(
  document: ApiDocument,
  sent: { what: string; schema: Schema; body: unknown },
): string | null {
  let validator = validators.get(sent.what);
  if (!validator) {
    const components = closed(document.components) as Schema;
    validator = Compile({ ...(closed(sent.schema) as Schema), components } as never);
    validators.set(sent.what, validator);
  }
  if (validator.Check(sent.body)) return null;
  return `${sent.what} is not as described: ${JSON.stringify(validator.Errors(sent.body)).slice(0, 1500)}`;
}

// A description may leave room for more; a test may not: what is sent and not described would never be noticed.
function closed(schema: unknown): unknown {
  if (Array.isArray(schema)) return schema.map(closed);
  if (typeof schema !== 'object' || schema === null) return schema;
  const inner = Object.fromEntries(Object.entries(schema).map(([key, value]) => [key, closed(value)]));
  return inner.type === 'object' && inner.properties && !('additionalProperties' in inner)
    ? { ...inner, additionalProperties: false }
    : inner;
}
