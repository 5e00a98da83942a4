import { climateOf, climateTemperatureC } from '../../server/model/climate.ts';
import { type Evening, eveningsFrom, instantInEvening } from '../../server/model/evening.ts';
import type { LogEntry } from '../../server/model/log-entry.ts';
import type { Prop } from '../../server/model/prop.ts';
import type { Season } from '../../server/model/schedule.ts';
import type { ShowNight } from '../../server/model/switching.ts';
import { seasonWeather } from '../../server/model/weather.ts';

/** A made-up upland site at 54.4 N: twelve minima and maxima of a cool maritime place. */
export const CLIMATE = {
  monthlyMinC: [-1, -1, 0, 2, 4, 7, 9, 9, 7, 5, 2, 0],
  monthlyMaxC: [5, 6, 8, 11, 15, 17, 19, 19, 16, 12, 8, 6],
  latitudeDeg: 54.4,
  longitudeDeg: -2.4,
};
export const PLACE = { latitudeDeg: 54.4, longitudeDeg: -2.4, timeZone: 'Europe/London' };
const climate = climateOf(CLIMATE);
export const airC = (at: number) => climateTemperatureC(climate, at);

/** A season of that site: a show on every Friday to Sunday. */
export function aSeason(from: Evening, through: Evening): Season {
  const showNights = new Map<Evening, ShowNight>(
    eveningsFrom(from, through)
      .filter((_, n) => n % 7 < 3)
      .map((evening) => [evening, { evening, opensAt: '18:30', closesAt: '21:30', calledOff: false }]),
  );
  const weather = seasonWeather({
    place: PLACE,
    climate,
    hours: null,
    typedNights: new Map(),
    from,
    through,
    asOf: instantInEvening(from, '12:00', PLACE.timeZone),
  });
  return { place: PLACE, from, through, closes: through, weather, showNights };
}

const SORTS: Partial<Prop>[] = [
  {
    cellTypeId: 'LR6',
    series: 3,
    dimVolts: 3.3,
    stopVolts: 2.8,
    load: { behaviour: 'steady', meanMa: 21, peakMa: 34, standbyMa: 0.05 },
    switching: { kind: 'light-sensor', onAltitudeDeg: -6 },
  },
  {
    cellTypeId: 'LR6',
    series: 2,
    dimVolts: 2.3,
    stopVolts: 2,
    load: { behaviour: 'fades', meanMa: 14, peakMa: 28, standbyMa: 0.04, measuredVolts: 3, ledVolts: 1.9 },
    switching: { kind: 'light-sensor', onLux: 10, skyShare: 0.6, cutOffHours: 6 },
  },
  {
    cellTypeId: 'HR6',
    series: 3,
    dimVolts: 3.3,
    stopVolts: 3,
    load: { behaviour: 'steady', meanMa: 32, peakMa: 45, standbyMa: 0.01 },
    switching: { kind: 'interval-timer', onHours: 6 },
  },
  {
    cellTypeId: 'LR20',
    series: 4,
    dimVolts: 4.4,
    stopVolts: 4,
    load: { behaviour: 'steady', meanMa: 75, peakMa: 110, standbyMa: 0.02 },
    switching: { kind: 'clock', onAt: '17:30', offAt: '22:00' },
  },
  {
    cellTypeId: 'CR2032',
    series: 1,
    dimVolts: 2.4,
    stopVolts: 2.2,
    load: { behaviour: 'steady', meanMa: 1.1, peakMa: 3, standbyMa: 0.01 },
    switching: { kind: 'light-sensor', onAltitudeDeg: -4 },
  },
  {
    cellTypeId: 'ICR18650',
    series: 1,
    dimVolts: 3.2,
    stopVolts: 3,
    load: { behaviour: 'holds', meanMa: 30, peakMa: 90, standbyMa: 0.08, measuredVolts: 3.7 },
    switching: { kind: 'interval-timer', onHours: 5 },
  },
  {
    cellTypeId: 'LR6',
    series: 2,
    dimVolts: 2,
    stopVolts: 1.8,
    load: { behaviour: 'steady', meanMa: 2.1, peakMa: 18, standbyMa: 0 },
    switching: { kind: 'always' },
  },
  {
    cellTypeId: 'LR14',
    series: 4,
    parallel: 2,
    dimVolts: 4.6,
    stopVolts: 4,
    load: { behaviour: 'steady', meanMa: 160, peakMa: 300, standbyMa: 0 },
    switching: { kind: 'by-hand' },
  },
  {
    cellTypeId: 'LR6',
    series: 3,
    dimVolts: 3.3,
    stopVolts: 3,
    load: { behaviour: 'steady', standbyMa: 0.35 },
    switching: { kind: 'by-hand' },
    trips: { perShowNight: 120, perNightOff: 0, seconds: 12, runMa: 180 },
  },
  {
    cellTypeId: 'R14',
    series: 2,
    dimVolts: 2.3,
    stopVolts: 2,
    load: { behaviour: 'steady', meanMa: 15, peakMa: 28, standbyMa: 0.04 },
    switching: { kind: 'light-sensor', cutOffHours: 6 },
  },
];

/** `count` props of ten sorts, each with a draw of its own so that nothing but the switching is shared. */
export function manyProps(count: number): Prop[] {
  return Array.from({ length: count }, (_, i) => {
    const sort = SORTS[i % SORTS.length]!;
    const scale = 0.8 + (0.4 * ((i * 37) % 101)) / 101;
    const load = { ...sort.load! };
    if (load.meanMa !== undefined) load.meanMa *= scale;
    return {
      id: `p${i}`,
      siteId: 'site',
      tag: `P-${i}`,
      name: `Prop ${i}`,
      zone: 'Yard',
      units: 1,
      importance: 'feature',
      parallel: 1,
      ...sort,
      load,
    } as Prop;
  });
}

export function freshSet(prop: Prop, at: number): LogEntry[] {
  return [{ kind: 'swap', id: `s-${prop.id}`, propId: prop.id, at, recordedAt: at, state: 'new' }];
}
