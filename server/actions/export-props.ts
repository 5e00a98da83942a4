import { propsCsv } from '../exchange/props-csv.ts';
import { listProps } from '../store/props.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's props as a CSV file, by tag, to look at in a spreadsheet or to take in again.
 * @param deps what a deed needs
 * @throws Refusal 'not-found'
 */
export function exportProps(deps: Deps, input: { siteId: string }): string {
  const { db } = deps.store;
  siteOf(db, input.siteId);
  return propsCsv(listProps(db, input.siteId));
}
