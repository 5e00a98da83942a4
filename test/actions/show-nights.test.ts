import { expect, test } from 'vitest';
import { siteSeason } from '../../server/actions/prepare-season.ts';
import { setShowNights } from '../../server/actions/set-show-nights.ts';
import { siteRevision } from '../../server/store/sites.ts';
import { aSiteIn, someDeps, type TestDeps } from '../rig/deps.ts';

const FRIDAY = { evening: '2026-10-23', opensAt: '18:30', closesAt: '21:30' };
const SATURDAY = { ...FRIDAY, evening: '2026-10-24' };
const at = (day: number, hour = 9) => Date.UTC(2026, 9, day, hour);

/** The list as somebody looking back at a moment would have known it. */
function knownAt(deps: TestDeps, siteId: string, asOf: number) {
  const { showNights } = siteSeason(deps, siteId, { asOf, from: '2026-10-20', through: '2026-10-25' });
  return [...showNights.values()].map((night) => `${night.evening}${night.calledOff ? ' off' : ''}`);
}

test('what was known when is kept: added nights, called-off nights, and nights on again', () => {
  const deps = someDeps(at(1));
  const { id: siteId } = aSiteIn(deps);
  const set = (day: number, nights: (typeof FRIDAY & { calledOff?: boolean })[]) => {
    deps.clock.set(at(day));
    setShowNights(deps, { siteId, nights });
  };
  set(5, [FRIDAY]);
  set(10, [SATURDAY, FRIDAY]);
  set(15, [{ ...FRIDAY, calledOff: true }, SATURDAY]);
  set(18, [{ ...FRIDAY, calledOff: true, closesAt: '22:00' }, SATURDAY]);
  // The first list is the plan of the season: it counts as known before anybody typed it.
  expect(knownAt(deps, siteId, at(2))).toEqual(['2026-10-23']);
  expect(knownAt(deps, siteId, at(12))).toEqual(['2026-10-23', '2026-10-24']);
  expect(knownAt(deps, siteId, at(15, 8))).toEqual(['2026-10-23', '2026-10-24']);
  expect(knownAt(deps, siteId, at(16))).toEqual(['2026-10-23 off', '2026-10-24']);
  set(20, [FRIDAY, SATURDAY]);
  expect(knownAt(deps, siteId, at(21))).toEqual(['2026-10-23', '2026-10-24']);
  deps.store.close();
});

test('a night taken off the list and put back counts as added anew', () => {
  const deps = someDeps(at(5));
  const { id: siteId } = aSiteIn(deps);
  setShowNights(deps, { siteId, nights: [FRIDAY, SATURDAY] });
  deps.clock.set(at(10));
  setShowNights(deps, { siteId, nights: [SATURDAY] });
  deps.clock.set(at(12));
  setShowNights(deps, { siteId, nights: [FRIDAY, SATURDAY] });
  expect(knownAt(deps, siteId, at(11))).toEqual(['2026-10-24']);
  expect(knownAt(deps, siteId, at(13))).toEqual(['2026-10-23', '2026-10-24']);
  deps.store.close();
});

test('a refused list leaves the list and the revision as they were', () => {
  const deps = someDeps(at(5));
  const { id: siteId } = aSiteIn(deps);
  setShowNights(deps, { siteId, nights: [FRIDAY] });
  const before = siteRevision(deps.store.db, siteId);
  expect(() => setShowNights(deps, { siteId, nights: [FRIDAY, FRIDAY] })).toThrow('listed twice');
  expect(knownAt(deps, siteId, at(6))).toEqual(['2026-10-23']);
  expect(siteRevision(deps.store.db, siteId)).toBe(before);
  setShowNights(deps, { siteId, nights: [SATURDAY] });
  expect(siteRevision(deps.store.db, siteId)).toBe(before + 1);
  deps.store.close();
});
