import { CELL_KINDS } from '../model/cell-kinds.ts';
import type { CellType } from '../model/cell-type.ts';
import type { Load } from '../model/load.ts';
import type { Prop } from '../model/prop.ts';
import type { Switching } from '../model/switching.ts';
import { yearFaults } from './known-years.ts';
import type { Fault } from './refusal.ts';

// A fresh set may read a little above its curve; beyond this no set of the kind can be.
const FRESH_MARGIN = 1.05;
// Fresh cells of every kind read less than this share above their nominal volts.
const FRESH_OVER_NOMINAL = 1.2;

/**
 * What cannot be true of a prop, beyond single fields. What is only unlikely passes: the forecast warns of it.
 * @param prop the prop as it would be kept
 * @param cellType the cells it usually has
 */
export function propFaults(prop: Prop, cellType: CellType): Fault[] {
  return [
    ...voltsFaults(prop, cellType),
    ...ledFaults(prop, cellType),
    ...loadFaults(prop),
    ...switchingFaults(prop.switching),
  ];
}

function voltsFaults(prop: Prop, cellType: CellType): Fault[] {
  const faults: Fault[] = [];
  const { dimVolts, stopVolts } = prop;
  if (stopVolts !== undefined && stopVolts > dimVolts) {
    const message = `stopVolts ${stopVolts} is above dimVolts ${dimVolts}: the light would be out before it looks dim. Were the two swapped?`;
    faults.push({ field: 'stopVolts', message });
  }
  const freshVolts = freshSetVolts(prop.series, cellType);
  if (dimVolts > freshVolts) {
    const message = `${dimVolts} V is more than a fresh set gives: ${prop.series} × ${cellType.id} end to end is about ${freshVolts.toFixed(1)} V at most, so it would never look bright. Other cells, or more of them in series?`;
    faults.push({ field: 'dimVolts', message });
  }
  return faults;
}

function ledFaults({ load, series }: Prop, cellType: CellType): Fault[] {
  const { behaviour, ledVolts, measuredVolts } = load;
  if (behaviour !== 'fades' || ledVolts === undefined) return [];
  const freshVolts = freshSetVolts(series, cellType);
  if (ledVolts < (measuredVolts ?? freshVolts)) return [];
  const message =
    measuredVolts === undefined
      ? `LEDs that stop at ${ledVolts} V would never be lit: ${series} × ${cellType.id} end to end is about ${freshVolts.toFixed(1)} V at most. Is this the volts of the whole set?`
      : `LEDs that stop at ${ledVolts} V could not have been lit at ${measuredVolts} V, where the draw was measured. Are the two swapped?`;
  return [{ field: 'load.ledVolts', message }];
}

function freshSetVolts(series: number, cellType: CellType): number {
  const byCurve = (CELL_KINDS[cellType.kind].curve.volts[0] ?? 0) * cellType.cellsInside * FRESH_MARGIN;
  return series * Math.max(byCurve, cellType.nominalVolts * FRESH_OVER_NOMINAL);
}

function loadFaults({ load, switching, trips }: Prop): Fault[] {
  const faults = [...waveFaults(load), ...meanFaults(load), ...tripFaults(trips)];
  // What is switched by hand may wait all night and never be lit; anything else is lit by itself.
  const waits = switching.kind === 'by-hand' && load.standbyMa > 0;
  const isTripped = trips !== undefined && trips.perShowNight + trips.perNightOff > 0;
  if (!waits && !isTripped && (load.meanMa ?? load.peakMa ?? 0) === 0) {
    const message =
      "Nothing says what this takes. Give meanMa, the meter's average with the light on, or lowMa, peakMa and wave for a light that fades or blinks, or trips for one that visitors set off.";
    faults.push({ field: 'load.meanMa', message });
  }
  return faults;
}

function meanFaults({ meanMa, lowMa, peakMa }: Load): Fault[] {
  const faults: Fault[] = [];
  if (meanMa !== undefined && peakMa !== undefined && meanMa > peakMa) {
    const message = `meanMa ${meanMa} is above peakMa ${peakMa}, and an average cannot be above the highest. Were the two swapped?`;
    faults.push({ field: 'load.meanMa', message });
  }
  if (meanMa !== undefined && lowMa !== undefined && meanMa < lowMa) {
    const message = `meanMa ${meanMa} is below lowMa ${lowMa}, and an average cannot be below the lowest. Were the two swapped?`;
    faults.push({ field: 'load.meanMa', message });
  }
  return faults;
}

const NIGHT_SECONDS = 24 * 3600;

function tripFaults(trips: Prop['trips']): Fault[] {
  if (!trips) return [];
  return (['perShowNight', 'perNightOff'] as const).flatMap((name) => {
    const seconds = trips[name] * trips.seconds;
    if (seconds <= NIGHT_SECONDS) return [];
    const message = `${trips[name]} trips of ${trips.seconds} s are ${Math.round(seconds / 3600)} h in one night. Is the count of the whole season, or the length too long?`;
    return [{ field: `trips.${name}`, message }];
  });
}

function waveFaults({ meanMa, lowMa, peakMa }: Load): Fault[] {
  const faults: Fault[] = [];
  if (lowMa !== undefined && peakMa !== undefined && peakMa < lowMa) {
    const message = `peakMa ${peakMa} is below lowMa ${lowMa}. Were the two swapped?`;
    faults.push({ field: 'load.peakMa', message });
  }
  if (lowMa !== undefined && peakMa === undefined && meanMa === undefined) {
    const message = `lowMa ${lowMa} alone makes no average. Give peakMa, the highest of the fade, as well, or meanMa, the meter's average.`;
    faults.push({ field: 'load.peakMa', message });
  }
  return faults;
}

function switchingFaults(switching: Switching): Fault[] {
  if (switching.kind === 'clock' && switching.onAt === switching.offAt) {
    const message = `On and off are both ${switching.onAt}. For a light that is never off use the kind "always"; otherwise give the time it goes off.`;
    return [{ field: 'switching.offAt', message }];
  }
  if (switching.kind === 'interval-timer')
    return switching.setAt === undefined ? [] : yearFaults(switching.setAt, 'switching.setAt');
  if (switching.kind !== 'light-sensor') return [];
  const faults: Fault[] = [];
  for (const way of ['on', 'off'] as const) {
    const lux = switching[`${way}Lux`];
    const altitudeDeg = switching[`${way}AltitudeDeg`];
    if (lux === undefined || altitudeDeg === undefined) continue;
    const message = `${way}Lux ${lux} and ${way}AltitudeDeg ${altitudeDeg} say the same thing twice, and may not agree. Keep one.`;
    faults.push({ field: `switching.${way}AltitudeDeg`, message });
  }
  return faults;
}
