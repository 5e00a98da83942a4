import type { FastifyReply, FastifyRequest } from 'fastify';

/**
 * Cuts a list to a page, and says in a Link header where the next one is. Source: RFC 8288.
 * @param found one entry more than fits tells that there is a next page
 * @param page how many fit, and the request and reply it is for
 */
export function pageOf<Entry extends { id: string }>(
  found: Entry[],
  page: { limit: number; request: FastifyRequest; reply: FastifyReply },
): Entry[] {
  if (found.length <= page.limit) return found;
  const entries = found.slice(0, page.limit);
  const [path, query = ''] = page.request.url.split('?');
  const next = new URLSearchParams(query);
  next.set('after', entries.at(-1)!.id);
  page.reply.header('link', `<${path}?${next}>; rel="next"`);
  return entries;
}
