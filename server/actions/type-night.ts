import type { Evening } from '../model/evening.ts';
import type { TypedNight } from '../model/weather.ts';
import { raiseRevision } from '../store/sites.ts';
import { removeTypedNight, saveTypedNight } from '../store/weather.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { eveningFaults } from './known-years.ts';
import { type Fault, refuseFaults } from './refusal.ts';

/**
 * Keeps a night's low and high as somebody typed them; they beat any file.
 * @param deps what a deed needs
 * @param input the evening, and the lowest and highest air of its dark hours, °C
 * @throws Refusal 'not-found'; 'invalid' for a date that does not exist or a low above the high
 */
export function typeNight(
  deps: Deps,
  input: { siteId: string; evening: Evening; night: TypedNight },
): { evening: Evening } & TypedNight {
  const { siteId, evening, night } = input;
  refuseFaults([...eveningFaults(evening, 'evening'), ...lowHighFaults(night)]);
  return deps.store.transact((db) => {
    siteOf(db, siteId);
    const now = deps.clock.now();
    saveTypedNight(db, siteId, evening, night, now);
    raiseRevision(db, siteId, now);
    return { evening, minC: night.minC, maxC: night.maxC };
  });
}

/**
 * Forgets what was typed for a night; files and climate count again.
 * @param deps what a deed needs
 * @param input which evening
 * @throws Refusal 'not-found' for the site; 'invalid' for a date that does not exist
 */
export function untypeNight(deps: Deps, input: { siteId: string; evening: Evening }): void {
  refuseFaults(eveningFaults(input.evening, 'evening'));
  deps.store.transact((db) => {
    siteOf(db, input.siteId);
    removeTypedNight(db, input.siteId, input.evening);
    raiseRevision(db, input.siteId, deps.clock.now());
  });
}

function lowHighFaults({ minC, maxC }: TypedNight): Fault[] {
  if (maxC >= minC) return [];
  return [
    { field: 'maxC', message: `The high ${maxC} °C is below the low ${minC} °C. Were the two swapped?` },
  ];
}
