import { settableClock } from '../server/clock.ts';
import type { Store } from '../server/store/open.ts';
import type { DemoDeps } from './season.ts';

/** Deeds of the demo: ids and secrets are counted, so that the same season gives the same bytes. */
export function demoDeps(store: Store): DemoDeps {
  let made = 0;
  const next = () => {
    made += 1;
    return made.toString(16).padStart(12, '0');
  };
  return {
    store,
    clock: settableClock(0),
    newId: () => `00000000-0000-4000-8000-${next()}`,
    newSecret: () => `demo-link-that-everybody-knows-${next()}`,
  };
}
