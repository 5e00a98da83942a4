import type { Sighting } from '../model/log-entry.ts';
import { insertEntry } from '../store/log.ts';
import { raiseRevision } from '../store/sites.ts';
import { momentFaults } from './check-entry.ts';
import type { Deps } from './deps.ts';
import { propOf } from './find-prop.ts';
import { siteOf } from './find-site.ts';
import { type Fault, refuseFaults } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

export type NewSighting = Omit<Sighting, 'kind' | 'id' | 'recordedAt' | 'undoneAt'>;

/**
 * Records how somebody saw a prop, perhaps with a meter in hand.
 * @param deps what a deed needs
 * @param input which prop, when, and what was seen
 * @returns the entry, and hints: what is worth knowing at once
 * @throws Refusal 'not-found'; 'invalid' for what cannot have been seen
 */
export function recordSighting(deps: Deps, input: NewSighting): { sighting: Sighting; hints: string[] } {
  return deps.store.transact((db) => {
    const prop = propOf(db, input.propId);
    const { timeZone } = siteOf(db, prop.siteId);
    const now = deps.clock.now();
    refuseFaults([...momentFaults(input.at, { now, timeZone }), ...readingFaults(input)]);
    const note = input.note === undefined ? {} : { note: tidyText(input.note) };
    const sighting: Sighting = { kind: 'sighting', ...input, ...note, id: deps.newId(), recordedAt: now };
    insertEntry(db, sighting);
    raiseRevision(db, prop.siteId, now);
    return { sighting, hints: hintsFor(sighting) };
  });
}

function readingFaults({ volts, taken }: NewSighting): Fault[] {
  if (volts !== undefined && taken === undefined) {
    const message = `${volts} V, with the light on or off? Set taken to "lit" or "resting": a resting set reads higher.`;
    return [{ field: 'taken', message }];
  }
  if (volts === undefined && taken !== undefined) {
    const message = `taken is "${taken}", but no volts were given. Give the volts, or leave taken out.`;
    return [{ field: 'volts', message }];
  }
  return [];
}

function hintsFor({ volts, taken }: Sighting): string[] {
  if (taken !== 'resting') return [];
  return [
    `${volts} V resting says little: most cells recover when nothing draws. Measure once more while it is lit?`,
  ];
}
