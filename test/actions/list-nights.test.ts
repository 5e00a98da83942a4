import { describe, expect, test } from 'vitest';
import { listNights } from '../../server/actions/list-nights.ts';
import { localNoonAt } from '../../server/model/evening.ts';
import type { Site } from '../../server/model/site.ts';
import { sunAltitudeDeg } from '../../server/model/sun.ts';
import { aSiteIn, someDeps } from '../rig/deps.ts';

const HOUR_MS = 3_600_000;

function nightsAt(place: Partial<Site>, from: string, through = from) {
  const deps = someDeps();
  const site = aSiteIn(deps, place);
  const nights = listNights(deps, { siteId: site.id, from, through });
  deps.store.close();
  return nights;
}

const TROMSO = { latitudeDeg: 69.65, longitudeDeg: 18.96, timeZone: 'Europe/Oslo' };

describe('nights', () => {
  test('are the season’s own when no run is named, in order', () => {
    const deps = someDeps();
    const site = aSiteIn(deps, { seasonFrom: '2026-10-23', seasonThrough: '2026-10-27' });
    const evenings = listNights(deps, { siteId: site.id }).map((night) => night.evening);
    expect(evenings).toEqual(['2026-10-23', '2026-10-24', '2026-10-25', '2026-10-26', '2026-10-27']);
    deps.store.close();
  });

  test('go through sunset, dusk, dawn and sunrise, and their dark hours are a difference of instants', () => {
    for (const night of nightsAt({}, '2026-10-20', '2026-10-30')) {
      const order = [night.sunsetAt!, night.duskAt!, night.dawnAt!, night.sunriseAt!];
      expect(order).toEqual([...order].sort((a, b) => a - b));
      expect(night.darkHours).toBeCloseTo((night.dawnAt! - night.duskAt!) / HOUR_MS, 9);
      expect(night.sun).toBeUndefined();
    }
  });

  test('of the clock change are no hour longer than their neighbours: only the wall clock moves', () => {
    const [before, changing, after] = nightsAt({}, '2026-10-23', '2026-10-25').map(
      (night) => night.darkHours,
    );
    expect(Math.abs(changing! - before!)).toBeLessThan(0.1);
    expect(Math.abs(after! - changing!)).toBeLessThan(0.1);
  });

  test('of the midnight sun never get dark', () => {
    const [night] = nightsAt(TROMSO, '2026-06-21');
    expect(night).toMatchObject({
      sun: 'never-dark',
      sunsetAt: null,
      sunriseAt: null,
      duskAt: null,
      dawnAt: null,
      darkHours: 0,
    });
  });

  test('of the polar night still have civil dusk and dawn at Tromsø, but no sunset', () => {
    // At 69.65° N the midwinter sun stays 3° below the horizon at noon: under -0.833°, above -6°.
    const [night] = nightsAt(TROMSO, '2026-12-21');
    expect(night).toMatchObject({ sunsetAt: null, sunriseAt: null });
    expect(night!.duskAt).not.toBeNull();
    expect(night!.darkHours).toBeGreaterThan(17);
  });

  test('in the dead of winter near the pole are dark from noon to noon', () => {
    const svalbard = { latitudeDeg: 78.22, longitudeDeg: 15.65, timeZone: 'Arctic/Longyearbyen' };
    const [night] = nightsAt(svalbard, '2026-12-21');
    expect(night).toMatchObject({ sun: 'never-light', duskAt: null, dawnAt: null, darkHours: 24 });
  });

  test('have the dark hours that the altitude of the sun gives, minute by minute', () => {
    // Invented: clocks three hours ahead of the sun, where the polar night begins.
    const place = { latitudeDeg: 78.22, longitudeDeg: 75.9, timeZone: 'Asia/Shanghai' };
    // Civil: the sun 6° below the horizon. The altitude itself is held by the ephemerides of test/reference.
    for (const { evening, darkHours } of nightsAt(place, '2026-11-05', '2026-11-18')) {
      const noonAt = localNoonAt(evening, place.timeZone);
      const minutes = Array.from({ length: 24 * 60 }, (_, minute) => noonAt + (minute + 0.5) * 60_000);
      const dark = minutes.filter((at) => sunAltitudeDeg(at, place) < -6).length;
      expect([evening, Math.abs(darkHours - dark / 60) < 0.1]).toEqual([evening, true]);
    }
  });
});
