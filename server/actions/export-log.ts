import { logCsv } from '../exchange/log-csv.ts';
import { siteLog } from '../store/log.ts';
import { listProps } from '../store/props.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';

/**
 * A site's log as a CSV file: prop by prop, oldest first, without what was undone.
 * @param deps what a deed needs
 * @throws Refusal 'not-found'
 */
export function exportLog(deps: Deps, input: { siteId: string }): string {
  const { db } = deps.store;
  const { timeZone } = siteOf(db, input.siteId);
  const logs = siteLog(db, input.siteId);
  const entries = listProps(db, input.siteId).flatMap((prop) =>
    (logs.get(prop.id) ?? []).map((entry) => ({ prop, entry })),
  );
  return logCsv(entries, timeZone);
}
