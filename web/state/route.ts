/**
 * Where the pages are, in the address bar: the path says what, `site` whose, `asOf` as of when.
 * Everything that changes what is shown is in the address, so that any view can be linked.
 */
export type Route =
  | { page: 'tonight' }
  | { page: 'props' }
  | { page: 'new-prop' }
  | { page: 'prop'; propId: string }
  | { page: 'change-prop'; propId: string }
  | { page: 'site' }
  | { page: 'new-site' }
  | { page: 'nowhere' };

export type Place = { route: Route; siteId: string | null; asOf: string | null };

/** @param address path and query, as in `location.pathname + location.search` */
export function readPlace(address: string): Place {
  const url = new URL(address, 'http://here');
  return {
    route: routeOf(url.pathname),
    siteId: url.searchParams.get('site'),
    asOf: url.searchParams.get('asOf'),
  };
}

function routeOf(path: string): Route {
  const [first = '', second, third, ...rest] = path.split('/').slice(1);
  if (rest.length > 0) return { page: 'nowhere' };
  if (first === '' && second === undefined) return { page: 'tonight' };
  if (first === 'props' && second === undefined) return { page: 'props' };
  if (first === 'props' && second === 'new' && third === undefined) return { page: 'new-prop' };
  if (first === 'props' && second && third === undefined) return { page: 'prop', propId: second };
  if (first === 'props' && second && third === 'change') return { page: 'change-prop', propId: second };
  if (first === 'site' && second === undefined) return { page: 'site' };
  if (first === 'site' && second === 'new' && third === undefined) return { page: 'new-site' };
  return { page: 'nowhere' };
}

/** The address of a path that keeps the chosen site and moment, unless `changes` says otherwise. */
export function addressOf(
  path: string,
  place: Place,
  changes: { siteId?: string | null; asOf?: string | null } = {},
): string {
  const siteId = changes.siteId === undefined ? place.siteId : changes.siteId;
  const asOf = changes.asOf === undefined ? place.asOf : changes.asOf;
  const query = new URLSearchParams();
  if (siteId) query.set('site', siteId);
  if (asOf) query.set('asOf', asOf);
  const tail = query.toString().replaceAll('%3A', ':');
  return tail ? `${path}?${tail}` : path;
}
