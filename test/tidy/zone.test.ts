import { expect, it } from 'vitest';

it('runs in the zone its project says', () => {
  const zone = process.env.TZ;
  expect(zone).toBeDefined();
  expect(Intl.DateTimeFormat().resolvedOptions().timeZone).toBe(zone);
  expect(new Date(2026, 6, 1, 12).getTimezoneOffset()).toBe(zone === 'UTC' ? 0 : 150);
});
