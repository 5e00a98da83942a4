import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import fastifyStatic from '@fastify/static';
import type { FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';

declare module 'fastify' {
  interface FastifyReply {
    /** Sends the one HTML document; it finds out by itself which page the address means. */
    sendPage(): FastifyReply;
  }
}

// The build puts such files in a folder of their own: index-CVKq2CBX.js
const HASHED = /-[\w-]{8}\.\w+$/;
const YEAR_SECONDS = 31_536_000;

/**
 * Whether an address nobody else answers means one of the pages.
 * @param request the request
 * @param path its address without the query
 */
export function wantsPage(request: FastifyRequest, path: string): boolean {
  if (request.method !== 'GET' && request.method !== 'HEAD') return false;
  if (!request.server.hasReplyDecorator('sendPage') || /^\/(api|calendars)(\/|$)/.test(path)) return false;
  return request.headers.accept?.includes('text/html') ?? false;
}

/**
 * Serves the built pages. Files with a hash in their name never change; everything else is asked for again each time.
 * @param app the app
 * @param webRoot absolute path of the built pages; when nothing is built there, there are no pages
 */
export function servePages(app: FastifyInstance, webRoot: string): void {
  if (!existsSync(join(webRoot, 'index.html'))) return;
  app.register(fastifyStatic, {
    root: webRoot,
    wildcard: false,
    cacheControl: false,
    setHeaders: (reply, path) => {
      const isHashed = dirname(path) !== webRoot && HASHED.test(path);
      reply.header('cache-control', isHashed ? `public, max-age=${YEAR_SECONDS}, immutable` : 'no-cache');
    },
  });
  app.decorateReply('sendPage', function sendPage(this: FastifyReply) {
    return this.sendFile('index.html');
  });
}
