import type { FastifyRequest } from 'fastify';

/**
 * Whether the asker already has what would be sent. Source: RFC 9110 section 13.1.2, weak comparison; a date alone
 * (If-Modified-Since) says too little here and is not looked at.
 * @param request its If-None-Match may be a list, or `*`
 * @param etag of what would be sent, with its quotes
 */
export function hasAlready(request: FastifyRequest, etag: string): boolean {
  const given = request.headers['if-none-match'];
  if (given === undefined) return false;
  if (given.trim() === '*') return true;
  const opaque = (tag: string) => tag.trim().replace(/^W\//, '');
  return given.split(',').some((tag) => opaque(tag) === opaque(etag));
}
