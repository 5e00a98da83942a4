import type { NewProp, Prop } from '../../server/http/schemas/props.ts';
import type { NewSite, Site } from '../../server/http/schemas/sites.ts';
import type { Rig } from './build-app.ts';

// Invented, except that the monthly temperatures are such as upland places at 54° N have.

export const A_SITE: NewSite = {
  name: 'Quarry Steps',
  latitudeDeg: 54.4,
  longitudeDeg: -2.4,
  timeZone: 'Europe/London',
  seasonFrom: '2026-10-01',
  seasonThrough: '2026-11-08',
  monthlyMinC: [-1, -1, 0, 2, 4, 7, 9, 9, 7, 5, 2, 0],
  monthlyMaxC: [5, 6, 8, 11, 15, 17, 19, 19, 16, 12, 8, 6],
  rounds: {
    weekdays: [3, 6],
    startsAt: '16:30',
    minutesFree: 90,
    minutesPerStop: 4,
    walkMinutes: 20,
    cost: 12,
  },
};

export const aProp = (siteId: string, changes: Partial<NewProp> = {}): NewProp => ({
  siteId,
  tag: 'C-02',
  name: 'Moth lantern',
  zone: 'Ferny Bank',
  cellTypeId: 'LR6',
  series: 3,
  parallel: 1,
  dimVolts: 3.3,
  load: { behaviour: 'fades', meanMa: 22, standbyMa: 0.05, measuredVolts: 4.5 },
  switching: { kind: 'light-sensor', onLux: 10, skyShare: 0.5, cutOffHours: 6 },
  ...changes,
});

/** A site with one prop on it, made through the API. */
export async function aSiteWithProp(
  rig: Rig,
  changes: Partial<NewProp> = {},
): Promise<{ site: Site; prop: Prop }> {
  const site: Site = (await rig.ask.post('/api/sites').send(A_SITE).expect(201)).body;
  const prop: Prop = (await rig.ask.post('/api/props').send(aProp(site.id, changes)).expect(201)).body;
  return { site, prop };
}
