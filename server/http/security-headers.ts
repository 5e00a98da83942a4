import type { FastifyInstance } from 'fastify';

export const SECURITY_HEADERS = {
  'content-security-policy':
    "default-src 'self'; frame-ancestors 'none'; base-uri 'none'; form-action 'self'; object-src 'none'",
  'x-content-type-options': 'nosniff',
  'referrer-policy': 'no-referrer',
  'cross-origin-resource-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), geolocation=()',
};

/**
 * Puts the headers on every answer that keep browsers from doing more with it than show it. No cross-origin reading
 * is allowed to anybody, so there is no header for it.
 * @param app the app
 */
export function addSecurityHeaders(app: FastifyInstance): void {
  app.addHook('onSend', async (_request, reply) => {
    reply.headers(SECURITY_HEADERS);
    // What the API says is about this moment; routes that know better have said so already.
    if (!reply.hasHeader('cache-control')) reply.header('cache-control', 'no-store');
  });
}
