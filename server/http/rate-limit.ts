import rateLimit from '@fastify/rate-limit';
import type { FastifyInstance } from 'fastify';
import { isWrite } from './guards.ts';
import { HttpProblem } from './problems.ts';

/**
 * Slows down whoever writes without end or guesses calendar secrets. Reads are not counted: counting costs a quarter
 * of the throughput.
 * @param app the app, before its routes are added
 * @param perMinute requests a minute from one address
 */
export function limitRates(app: FastifyInstance, perMinute: number): void {
  app.addHook('onRoute', (route) => {
    const counted = [route.method].flat().some(isWrite) || route.url.startsWith('/calendars/');
    if (counted) route.config = { ...route.config, rateLimit: { max: perMinute, timeWindow: '1 minute' } };
  });
  app.register(rateLimit, {
    global: false,
    // Only Retry-After is a settled name; how much is left is nobody's business.
    addHeaders: { 'x-ratelimit-limit': false, 'x-ratelimit-remaining': false, 'x-ratelimit-reset': false },
    addHeadersOnExceeding: {
      'x-ratelimit-limit': false,
      'x-ratelimit-remaining': false,
      'x-ratelimit-reset': false,
    },
    errorResponseBuilder: (_request, { ttl }) =>
      new HttpProblem(
        'too-many',
        `More than ${perMinute} requests in a minute came from here. Try again in ${Math.ceil(ttl / 1000)} s.`,
      ),
  });
}
