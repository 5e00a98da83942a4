import type { Evening, Instant } from './evening.ts';

/** What calendars were last told of an evening on which sets must be swapped. */
export type DueEvent = {
  uid: string;
  siteId: string;
  evening: Evening;
  /** Counts the changes that were told, from 0. */
  sequence: number;
  createdAt: Instant;
  modifiedAt: Instant;
  state: 'due' | 'cancelled';
  /** The content last told, word for word: another one means a change. */
  fingerprint: string;
  propIds: string[];
};
