import type { Instant } from './model/evening.ts';

/** Where the present comes from. `fixed` tells readers that it stands still. */
export type Clock = { now(): Instant; fixed: boolean };

/** The running machine's clock; the only place that reads it. */
export function systemClock(): Clock {
  return { now: () => Date.now(), fixed: false };
}

/**
 * A clock that stands still.
 * @param at the moment it shows, epoch milliseconds
 */
export function fixedClock(at: Instant): Clock {
  return { now: () => at, fixed: true };
}

/**
 * A clock that stands still until it is set again: for tests and for building a demo day by day.
 * @param at the moment it shows first, epoch milliseconds
 */
export function settableClock(at: Instant): Clock & { set(at: Instant): void } {
  let shown = at;
  return {
    now: () => shown,
    fixed: true,
    set(next) {
      shown = next;
    },
  };
}
