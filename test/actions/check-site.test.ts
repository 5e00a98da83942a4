import { expect, test } from 'vitest';
import { siteFaults } from '../../server/actions/check-site.ts';
import type { Site } from '../../server/model/site.ts';
import { A_SITE } from '../rig/a-site.ts';

const at = (timeZone: string, longitudeDeg: number, latitudeDeg = A_SITE.latitudeDeg) =>
  siteFaults({
    ...(A_SITE as Site),
    id: 's',
    confidence: 0.9,
    marginNights: 1,
    zoneOffsetsC: {},
    timeZone,
    longitudeDeg,
    latitudeDeg,
  });

// Longitudes from memory of an atlas; all belong to places that keep the zone named.
test.each([
  ['Europe/London', -2.4],
  ['Europe/Madrid', -9.2],
  ['Asia/Shanghai', 75.9],
  ['Asia/Kolkata', 88.4],
  ['America/St_Johns', -52.7],
  ['Pacific/Kiritimati', -157.4],
  ['Pacific/Apia', -171.8],
  ['Pacific/Auckland', 174.8],
  ['America/Adak', -176.6],
  ['Pacific/Fiji', 178.4],
  ['Pacific/Fiji', -179.9],
])('%s at longitude %f belongs together', (timeZone, longitudeDeg) => {
  expect(at(timeZone, longitudeDeg)).toEqual([]);
});

test.each([
  ['America/New_York', 74, 'west (-74)'],
  ['America/Los_Angeles', 118.2, 'west (-118.2)'],
  ['Asia/Tokyo', -139.7, 'east (139.7)'],
  ['Australia/Sydney', -151.2, 'east (151.2)'],
])('%s at longitude %f has its sign wrong', (timeZone, longitudeDeg, says) => {
  expect(at(timeZone, longitudeDeg)).toEqual([
    { field: 'longitudeDeg', message: expect.stringContaining(says) },
  ]);
});

test('near a pole every longitude goes with every zone', () => {
  expect(at('Pacific/Auckland', -45, -89.9)).toEqual([]);
  expect(at('Pacific/Auckland', -45, -60)).toHaveLength(1);
});
