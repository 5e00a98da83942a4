import type { Clock } from '../clock.ts';
import type { Store } from '../store/open.ts';

/** What a deed needs from outside. Chance is handed in, so that the same seed gives the same bytes. */
export type Deps = {
  store: Store;
  clock: Clock;
  /** An id nobody has yet: letters, digits and dashes. */
  newId: () => string;
  /** 256 bits that nobody can guess, in letters fit for a path. */
  newSecret: () => string;
};
