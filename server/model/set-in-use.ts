import type { Instant } from './evening.ts';
import type { LogEntry, Seen, Sighting, Swap } from './log-entry.ts';
import type { Prop } from './prop.ts';

/** The cells now in a prop, as the log tells it. */
export type SetInUse = {
  /** When the oldest cells in it went in: a set lasts as long as its oldest cells. */
  fittedAt: Instant;
  /** When anybody last had the cells out: an interval timer counts from then. */
  poweredAt: Instant;
  cellTypeId: string;
  /** Charge left when it went in; null = part-used and nobody knows. */
  leftShare: number | null;
  healthShare: number;
  /** Cells of a later, incomplete swap that share the holder with older ones. */
  partBatch: { newCells: number; ofCells: number } | null;
  mixedKinds: boolean;
  /** The last thing seen of this set. */
  lastSeen: { seen: Seen; at: Instant } | null;
  /** Seen dim or dark, and not bright since: an odd look takes nothing back. */
  failing: { seen: 'dim' | 'dark'; at: Instant } | null;
};

/** How many cells a prop holds, all its units together. */
export function cellsIn(prop: Pick<Prop, 'units' | 'series' | 'parallel'>): number {
  return prop.units * prop.series * prop.parallel;
}

/**
 * The set in use at a moment. @param log a prop's entries, oldest first, undone ones left out
 * @returns null when nothing has been fitted by then
 */
export function setInUse(prop: Prop, log: readonly LogEntry[], asOf: Instant): SetInUse | null {
  let set = null as SetInUse | null;
  for (const entry of log) {
    if (entry.at > asOf) break;
    if (entry.kind === 'swap') set = afterSwap(prop, set, entry);
    else if (set) set = afterSighting(set, entry);
  }
  return set;
}

function afterSighting(set: SetInUse, { seen, at }: Sighting): SetInUse {
  const lastSeen = { seen, at };
  if (seen === 'odd') return { ...set, lastSeen };
  return { ...set, lastSeen, failing: seen === 'bright' ? null : { seen, at } };
}

function afterSwap(prop: Prop, before: SetInUse | null, swap: Swap): SetInUse {
  const cellTypeId = swap.cellTypeId ?? prop.cellTypeId;
  const ofCells = cellsIn(prop);
  const newCells = swap.cells ?? ofCells;
  const partBatch = newCells < ofCells ? { newCells, ofCells } : null;
  if (before && partBatch) {
    const mixedKinds = before.mixedKinds || cellTypeId !== before.cellTypeId;
    return { ...before, poweredAt: swap.at, partBatch, mixedKinds, lastSeen: null, failing: null };
  }
  return {
    fittedAt: swap.at,
    poweredAt: swap.at,
    cellTypeId,
    leftShare: swap.state === 'part-used' ? (swap.leftShare ?? null) : 1,
    healthShare: swap.healthShare ?? 1,
    partBatch,
    mixedKinds: false,
    lastSeen: null,
    failing: null,
  };
}
