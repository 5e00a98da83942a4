import type { Socket } from 'node:net';
import type { FastifyError, FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';
import { wantsPage } from './pages.ts';
import { HttpProblem, PROBLEM_TYPE, PROBLEMS, problemBody, problemOf } from './problems.ts';
import { SECURITY_HEADERS } from './security-headers.ts';

/**
 * Sends a no.
 * @param reply where to
 * @param problem which
 */
export function sendProblem(reply: FastifyReply, problem: HttpProblem): FastifyReply {
  return reply
    .code(PROBLEMS[problem.code].status)
    .headers(problem.headers)
    .type(PROBLEM_TYPE)
    .serializer((body) => JSON.stringify(body))
    .send(problemBody(problem));
}

/**
 * Makes every no of the app a problem document: thrown ones, unknown addresses, methods not offered.
 * @param app the app, before its routes are added, since it has to see them
 */
export function answerErrors(app: FastifyInstance): void {
  const offered = rememberRoutes(app);
  app.setErrorHandler((error, request, reply) => {
    const problem = problemOf(error);
    if (problem.code === 'failed') request.log.error(error);
    return sendProblem(reply, problem);
  });
  app.setNotFoundHandler((request, reply) => {
    const path = request.url.split('?')[0]!;
    const methods = offered(path);
    if (methods.length > 0 && !methods.includes(request.method)) {
      const allow = methods.join(', ');
      throw new HttpProblem('method-not-offered', `${request.method} is not offered here, but ${allow}.`, {
        headers: { allow },
      });
    }
    if (wantsPage(request, path)) return reply.sendPage();
    throw new HttpProblem('not-found', 'There is nothing at this address.');
  });
}

// The router answers a wrong method as if the address were unknown, so the addresses are kept beside it.
function rememberRoutes(app: FastifyInstance): (path: string) => string[] {
  const routes = new Map<string, { pattern: RegExp; methods: Set<string> }>();
  app.addHook('onRoute', ({ url, method }) => {
    if (url.includes('*')) return;
    const route = routes.get(url) ?? { pattern: patternOf(url), methods: new Set<string>() };
    for (const one of [method].flat()) route.methods.add(one.toUpperCase());
    routes.set(url, route);
  });
  return (path) => {
    const found = [...routes.values()].filter((route) => route.pattern.test(path));
    return [...new Set(found.flatMap((route) => [...route.methods]))].sort();
  };
}

function patternOf(url: string): RegExp {
  const parts = url.split(/(:\w+)/).map((part) => {
    return part.startsWith(':') ? '[^/]+' : part.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');
  });
  return new RegExp(`^${parts.join('')}$`);
}

/** For what goes wrong before there is a route: an address that cannot be decoded, or is too long. */
export function answerFrameworkError(
  error: FastifyError,
  _request: FastifyRequest,
  reply: FastifyReply,
): void {
  reply.headers(SECURITY_HEADERS);
  sendProblem(reply, problemOf(error));
}

/** For what is no HTTP at all: the answer is written by hand, and the connection ends. */
export function answerUnreadable(error: NodeJS.ErrnoException, socket: Socket): void {
  if (error.code === 'ECONNRESET' || socket.destroyed || !socket.writable) return;
  const { status, headers, body } = unreadable(error.code ?? '');
  const lines = [
    `HTTP/1.1 ${status} ${headers}`,
    `content-type: ${PROBLEM_TYPE}`,
    'x-content-type-options: nosniff',
  ];
  socket.end(
    `${lines.join('\r\n')}\r\ncontent-length: ${Buffer.byteLength(body)}\r\nconnection: close\r\n\r\n${body}`,
  );
}

function unreadable(code: string): { status: number; headers: string; body: string } {
  const known = {
    HPE_HEADER_OVERFLOW: [
      'headers-too-large',
      'Request Header Fields Too Large',
      'The headers are larger than 16 KiB.',
    ],
    ERR_HTTP_REQUEST_TIMEOUT: ['too-slow', 'Request Timeout', 'The request did not arrive in time.'],
  } as const;
  const [problemCode, phrase, message] = known[code as keyof typeof known] ?? [
    'unreadable',
    'Bad Request',
    'This is no HTTP request.',
  ];
  const body = problemBody({ code: problemCode, message, faults: [] });
  return { status: body.status, headers: phrase, body: JSON.stringify(body) };
}
