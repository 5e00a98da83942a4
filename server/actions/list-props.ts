import type { Prop } from '../model/prop.ts';
import { listProps as listStoredProps } from '../store/props.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's props by tag, A-2 before A-10.
 * @param deps what a deed needs
 * @param input.limit at most so many
 * @param input.after id of the last prop of the page before
 * @throws Refusal 'not-found' for the site
 */
export function listProps(deps: Deps, input: { siteId: string; limit: number; after?: string }): Prop[] {
  const { siteId, ...page } = input;
  siteOf(deps.store.db, siteId);
  return listStoredProps(deps.store.db, siteId, page);
}
