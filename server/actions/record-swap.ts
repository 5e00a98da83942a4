import { HOUR_MS, wallTimeOf } from '../model/evening.ts';
import type { LogEntry, Swap } from '../model/log-entry.ts';
import type { Prop } from '../model/prop.ts';
import { cellsIn } from '../model/set-in-use.ts';
import { insertEntry, propLog } from '../store/log.ts';
import type { Db } from '../store/open.ts';
import { raiseRevision } from '../store/sites.ts';
import { momentFaults } from './check-entry.ts';
import type { Deps } from './deps.ts';
import { findCellTypeAnywhere, unknownCellTypeFault } from './find-cell-type.ts';
import { propOf } from './find-prop.ts';
import { siteOf } from './find-site.ts';
import { type Fault, refuseFaults } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

export type NewSwap = Omit<Swap, 'kind' | 'id' | 'recordedAt' | 'undoneAt'>;

const DOUBLE_MS = 10 * 60_000;

/**
 * Records that a prop's cells were changed.
 * @param deps what a deed needs
 * @param input which prop, when, and what went in
 * @returns the entry, and hints: what is worth knowing at once
 * @throws Refusal 'not-found'; 'invalid' for what cannot have happened
 */
export function recordSwap(deps: Deps, input: NewSwap): { swap: Swap; hints: string[] } {
  return deps.store.transact((db) => {
    const prop = propOf(db, input.propId);
    const { timeZone } = siteOf(db, prop.siteId);
    const now = deps.clock.now();
    refuseFaults([
      ...momentFaults(input.at, { now, timeZone }),
      ...swapFaults(db, { prop, swap: input, deps }),
    ]);
    const swap: Swap = { kind: 'swap', ...tidy(input), id: deps.newId(), recordedAt: now };
    const hints = hintsFor(swap, { prop, timeZone, log: propLog(db, prop.id) });
    insertEntry(db, swap);
    raiseRevision(db, prop.siteId, now);
    return { swap, hints };
  });
}

function tidy(swap: NewSwap): NewSwap {
  return {
    ...swap,
    ...(swap.note === undefined ? {} : { note: tidyText(swap.note) }),
    ...(swap.setId === undefined ? {} : { setId: tidyText(swap.setId) }),
  };
}

function swapFaults(db: Db, { prop, swap, deps }: { prop: Prop; swap: NewSwap; deps: Deps }): Fault[] {
  const faults: Fault[] = [];
  const holds = cellsIn(prop);
  if (swap.cells !== undefined && swap.cells > holds) {
    const message = `${prop.tag} takes ${holds} ${holds === 1 ? 'cell' : 'cells'}, and ${swap.cells} were given. Were some of them for another prop?`;
    faults.push({ field: 'cells', message });
  }
  if (swap.leftShare !== undefined && swap.state !== 'part-used') {
    const message = `leftShare ${swap.leftShare} says the set was part-used, and state says "${swap.state}". Set state to "part-used", or leave leftShare out.`;
    faults.push({ field: 'leftShare', message });
  }
  if (swap.cellTypeId !== undefined && !findCellTypeAnywhere(deps, swap.cellTypeId))
    faults.push(unknownCellTypeFault(db, swap.cellTypeId));
  return faults;
}

function hintsFor(swap: Swap, about: { prop: Prop; timeZone: string; log: LogEntry[] }): string[] {
  const { prop, timeZone, log } = about;
  const hints: string[] = [];
  const holds = cellsIn(prop);
  if (swap.cells !== undefined && swap.cells < holds)
    hints.push(
      `${swap.cells} of ${holds} changed: the oldest cells decide when it goes dim. Change them all together if you can.`,
    );
  const { switching } = prop;
  if (switching.kind === 'interval-timer' && (switching.setAt ?? 0) <= swap.at) {
    const offAt = swap.at + switching.onHours * HOUR_MS;
    hints.push(
      `This timer starts now: lit ${wallTimeOf(swap.at, timeZone)} to ${wallTimeOf(offAt, timeZone)} each day. Switch it off and on at dusk if it should light then.`,
    );
  }
  const double = log.find((entry) => entry.kind === 'swap' && Math.abs(entry.at - swap.at) < DOUBLE_MS);
  if (double)
    hints.push(
      `Two swaps of ${prop.tag} ${apart(double.at - swap.at)}: one or two? Undo one if it was noted twice.`,
    );
  return hints;
}

function apart(ms: number): string {
  const minutes = Math.round(Math.abs(ms) / 60_000);
  if (minutes === 0) return 'within a minute';
  return minutes === 1 ? 'a minute apart' : `${minutes} minutes apart`;
}
