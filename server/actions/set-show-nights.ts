import type { Evening, Instant } from '../model/evening.ts';
import type { ShowNight } from '../model/switching.ts';
import { listShowNights, replaceShowNights, type StoredShowNight } from '../store/show-nights.ts';
import { raiseRevision } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { eveningFaults } from './known-years.ts';
import { type Fault, refuseFaults } from './refusal.ts';

/**
 * Replaces the list of show nights. Of each it is remembered when it was added and when called off, so that an earlier
 * moment does not know it yet; nights taken out and hours changed are not remembered.
 * @param deps what a deed needs
 * @param input the site and its nights, wall times 'HH:MM' of the site, in any order
 * @returns the nights by evening
 * @throws Refusal 'not-found'; 'invalid' for dates that do not exist, a night listed twice, no time between the gates
 */
export function setShowNights(
  deps: Deps,
  input: { siteId: string; nights: (Omit<ShowNight, 'calledOff'> & { calledOff?: boolean })[] },
): ShowNight[] {
  const nights = input.nights.map((night) => ({ ...night, calledOff: night.calledOff ?? false }));
  return deps.store.transact((db) => {
    siteOf(db, input.siteId);
    refuseFaults(nights.flatMap((night, index) => nightFaults(night, { index, nights })));
    nights.sort((a, b) => (a.evening < b.evening ? -1 : 1));
    const now = deps.clock.now();
    const before = listShowNights(db, input.siteId);
    replaceShowNights(db, input.siteId, nights.map(remembering(before, now)));
    raiseRevision(db, input.siteId, now);
    return nights;
  });
}

function nightFaults(night: ShowNight, among: { index: number; nights: ShowNight[] }): Fault[] {
  const at = `${among.index}`;
  const unknown = eveningFaults(night.evening, `${at}.evening`);
  if (unknown.length > 0) return unknown;
  const first = among.nights.findIndex((other) => other.evening === night.evening);
  if (first !== among.index) {
    const message = `${night.evening} is listed twice, at places ${first + 1} and ${among.index + 1}. Keep one: an evening has one opening time.`;
    return [{ field: `${at}.evening`, message }];
  }
  // Within an evening a time before noon is of the morning after.
  const order = (wallTime: string) => (wallTime < '12:00' ? `1${wallTime}` : `0${wallTime}`);
  if (order(night.opensAt) > order(night.closesAt)) {
    const message = `${night.evening} opens at ${night.opensAt} and closes at ${night.closesAt}, which comes before it in an evening, noon to noon. Were the two swapped?`;
    return [{ field: `${at}.closesAt`, message }];
  }
  if (night.opensAt !== night.closesAt) return [];
  const message = `${night.evening} closes at ${night.closesAt}, the moment it opens. To cancel a night set calledOff to true.`;
  return [{ field: `${at}.closesAt`, message }];
}

// The first list ever is the plan the season started with, so it was known all along.
function remembering(before: StoredShowNight[], now: Instant) {
  const known = new Map<Evening, StoredShowNight>(before.map((night) => [night.evening, night]));
  return (night: ShowNight): StoredShowNight => {
    const earlier = known.get(night.evening);
    const addedAt = earlier?.addedAt ?? (before.length === 0 ? 0 : now);
    return { ...night, addedAt, calledOffAt: night.calledOff ? (earlier?.calledOffAt ?? now) : null };
  };
}
