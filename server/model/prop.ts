import type { Load, Trips } from './load.ts';
import type { Switching } from './switching.ts';

export type Importance = 'must-not-fail' | 'feature' | 'background';

/** Anything lit that the crew counts as one; a row is a prop with more than one unit, each on its own set. */
export type Prop = {
  id: string;
  siteId: string;
  /** Short number, unique on its site: 'B-06'. */
  tag: string;
  name: string;
  zone: string;
  /** Metres east and north of the site's own origin. */
  xM?: number;
  yM?: number;
  units: number;
  importance: Importance;
  cellTypeId: string;
  /** Cells end to end, and rows side by side, in one unit's set. */
  series: number;
  parallel: number;
  /** Lit volts of the whole set at which it looks dim, and at which it is out. */
  dimVolts: number;
  stopVolts?: number;
  load: Load;
  switching: Switching;
  trips?: Trips;
  /** K warmer (+) or colder (-) than the prop's zone: an insulated box, a frosty corner. */
  offsetC?: number;
};
