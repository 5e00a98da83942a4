import type { FastifyInstance, FastifyRequest } from 'fastify';
import { HttpProblem } from './problems.ts';

declare module 'fastify' {
  interface FastifyContextConfig {
    /** Kinds of content the route reads; JSON when not said. */
    reads?: readonly string[];
  }
}

const LOOPBACK = /^(localhost|\[::1\]|127(\.\d{1,3}){3})$/;
const WRITES = new Set(['POST', 'PUT', 'PATCH', 'DELETE']);
const JSON_ONLY = ['application/json'];

export const isWrite = (method: string): boolean => WRITES.has(method);

/**
 * Keeps strangers out of a service without sign-in: it answers to its own names only, and takes changes from its own
 * pages and from programs, never from another site open in the same browser.
 * @param app the app
 * @param publicUrl where others reach it, when that is another name than loopback
 */
export function guard(app: FastifyInstance, publicUrl: string | null): void {
  const known = publicUrl === null ? null : new URL(publicUrl);
  app.addHook('onRequest', async (request) => {
    checkHost(request, known);
    if (!isWrite(request.method)) return;
    checkOrigin(request, known);
    checkContentType(request);
  });
}

function checkHost(request: FastifyRequest, known: URL | null): void {
  const host = (request.headers.host ?? '').toLowerCase();
  if (known && host === known.host) return;
  const [, name = '', port] = /^(.*?)(?::(\d+))?$/.exec(host) ?? [];
  // Without a socket (a request made inside the process) the port is HTTP's own.
  const listening = String(request.raw.socket.localPort ?? 80);
  if (LOOPBACK.test(name) && (port === undefined || port === listening)) return;
  throw new HttpProblem(
    'wrong-host',
    `This service answers to 127.0.0.1, localhost and [::1] on port ${listening} only. To reach it by another name set DUSKROUND_PUBLIC_URL.`,
  );
}

function checkOrigin(request: FastifyRequest, known: URL | null): void {
  const { host, origin, 'sec-fetch-site': site } = request.headers;
  const own = [`http://${host}`.toLowerCase()];
  if (known && host?.toLowerCase() === known.host) own.push(known.origin);
  const foreign =
    origin === undefined
      ? site !== undefined && site !== 'same-origin' && site !== 'none'
      : !own.includes(origin.toLowerCase());
  if (foreign)
    throw new HttpProblem(
      'foreign-origin',
      'The browser says that another site sent this. Make the change on Duskround’s own pages.',
    );
}

function checkContentType(request: FastifyRequest): void {
  const { headers } = request;
  const hasBody = headers['transfer-encoding'] !== undefined || Number(headers['content-length'] ?? 0) > 0;
  if (!hasBody) {
    // Some programs name a kind of content even where there is none; nothing is no broken JSON.
    delete headers['content-type'];
    return;
  }
  // An address nobody offers is answered as such, whatever was sent.
  if (request.is404) return;
  const reads = request.routeOptions.config.reads ?? JSON_ONLY;
  const given = (headers['content-type'] ?? '').split(';')[0]!.trim().toLowerCase();
  if (reads.includes(given)) return;
  throw new HttpProblem(
    'wrong-content-type',
    `${given ? `"${given.slice(0, 60)}"` : 'Content of no named kind'} is not read here. Send ${reads.join(' or ')}, and say so in Content-Type.`,
  );
}
