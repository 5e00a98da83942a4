import type { Instant } from './evening.ts';

export type Seen = 'bright' | 'dim' | 'dark' | 'odd';
export type SetState = 'new' | 'charged' | 'part-used';

/** Cells changed. */
export type Swap = {
  kind: 'swap';
  id: string;
  propId: string;
  at: Instant;
  recordedAt: Instant;
  state: SetState;
  /** Charge left in a part-used set, 0..1; absent when nobody knows. */
  leftShare?: number;
  /** The cells now in the prop; the prop's usual type when absent. */
  cellTypeId?: string;
  /** How many cells were changed; fewer than the prop holds means the rest stayed in. */
  cells?: number;
  /** Letter or name of a rechargeable set. */
  setId?: string;
  /** Measured ÷ label capacity of this set, 0.05..1.2; 1 when absent. */
  healthShare?: number;
  /** How the old set looked when it came out. */
  oldSet?: 'bright' | 'dim' | 'dark';
  note?: string;
  undoneAt?: Instant;
};

/** Somebody saw the prop, perhaps with a meter in hand. */
export type Sighting = {
  kind: 'sighting';
  id: string;
  propId: string;
  at: Instant;
  recordedAt: Instant;
  seen: Seen;
  /** Volts of the whole set, and whether the light was on when they were read. */
  volts?: number;
  taken?: 'lit' | 'resting';
  note?: string;
  undoneAt?: Instant;
};

export type LogEntry = Swap | Sighting;
