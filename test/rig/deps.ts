import { createSite } from '../../server/actions/create-site.ts';
import type { Deps } from '../../server/actions/deps.ts';
import { settableClock } from '../../server/clock.ts';
import type { Instant } from '../../server/model/evening.ts';
import type { Site } from '../../server/model/site.ts';
import { openStore } from '../../server/store/open.ts';
import { A_SITE } from './a-site.ts';
import { NOW } from './build-app.ts';

/** What deeds need, with ids that count up, a clock to set and a database in memory. */
export type TestDeps = Deps & { clock: ReturnType<typeof settableClock> };

export function someDeps(at: Instant = NOW): TestDeps {
  let count = 0;
  return {
    store: openStore(':memory:'),
    clock: settableClock(at),
    newId: () => `id-${++count}`,
    newSecret: () => `secret-${++count}`,
  };
}

export function aSiteIn(deps: Deps, changes: Partial<Site> = {}): Site {
  return createSite(deps, { ...(A_SITE as Site), ...changes });
}
