import type { Prop } from '../model/prop.ts';
import { findProp, listProps as listStoredProps } from '../store/props.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { listChanged } from './list-changed.ts';

/**
 * A site's props by tag, A-2 before A-10.
 * @param deps what a deed needs
 * @param input.limit at most so many
 * @param input.after id of the last prop of the page before
 * @throws Refusal 'not-found' for the site; 'invalid' when `after` is not on it
 */
export function listProps(deps: Deps, input: { siteId: string; limit: number; after?: string }): Prop[] {
  const { siteId, ...page } = input;
  const { db } = deps.store;
  siteOf(db, siteId);
  const { after } = page;
  if (after !== undefined && findProp(db, after)?.siteId !== siteId) throw listChanged(after);
  return listStoredProps(db, siteId, page);
}
