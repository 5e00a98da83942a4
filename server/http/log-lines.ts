import type { FastifyRequest } from 'fastify';

/** What a request looks like in the log: never with the secret of a calendar link. */
export const logSerializers = {
  req: (request: FastifyRequest) => ({ method: request.method, url: withoutSecret(request.url) }),
};

/**
 * An address without the secret in it.
 * @param url as it was asked for
 */
export function withoutSecret(url: string): string {
  return url.replace(/^(\/calendars\/)[^/?#]+/i, '$1[secret]');
}
