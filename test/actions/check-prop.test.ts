import { describe, expect, test } from 'vitest';
import { propFaults } from '../../server/actions/check-prop.ts';
import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import type { Prop } from '../../server/model/prop.ts';
import { aProp } from '../rig/a-site.ts';

const prop = (changes: Partial<Prop>): Prop => ({
  ...(aProp('s') as Prop),
  id: 'p',
  units: 1,
  importance: 'feature',
  ...changes,
});
const fieldsOf = (changes: Partial<Prop>) => {
  const one = prop(changes);
  return propFaults(one, builtInCellType(one.cellTypeId)!).map((fault) => fault.field);
};

describe('what cannot be is refused, what is only unlikely passes', () => {
  test.each([
    ['LR6', 3, 3.3],
    // Three nickel cells fall below 3.8 V soon after they are lit, but fresh off the charger they reach it: unlikely, not impossible.
    ['HR6', 3, 3.8],
    ['6LR61', 1, 9],
    ['PB12V7', 1, 12.6],
    ['CR2032', 1, 3],
    ['IFR12V7', 1, 13],
    ['INR21700', 2, 8.2],
  ])('%s × %i may look dim at %f V', (cellTypeId, series, dimVolts) => {
    expect(fieldsOf({ cellTypeId, series, dimVolts })).toEqual([]);
  });

  // Fresh open-circuit volts: alkaline 1.65 at most, nickel 1.45, coin 3.3, lead 2.14 a cell (common practice, no source).
  test.each([
    ['LR6', 3, 5.6],
    ['HR6', 3, 4.8],
    ['6LR61', 1, 11.5],
    ['PB12V7', 1, 15],
    ['CR2032', 1, 4],
  ])('%s × %i cannot look dim at %f V', (cellTypeId, series, dimVolts) => {
    expect(fieldsOf({ cellTypeId, series, dimVolts })).toEqual(['dimVolts']);
  });

  test('any one thing that draws is enough', () => {
    const nothing = { behaviour: 'steady', standbyMa: 0 } as const;
    const trips = { perShowNight: 50, perNightOff: 0, seconds: 10, runMa: 60 };
    expect(fieldsOf({ load: nothing })).toEqual(['load.meanMa']);
    expect(fieldsOf({ load: { ...nothing, standbyMa: 0.05 } })).toEqual(['load.meanMa']);
    expect(fieldsOf({ load: { ...nothing, meanMa: 0, standbyMa: 0.05 } })).toEqual(['load.meanMa']);
    expect(fieldsOf({ load: { ...nothing, meanMa: 0.022 } })).toEqual([]);
    expect(fieldsOf({ load: nothing, trips })).toEqual([]);
    expect(fieldsOf({ load: { ...nothing, lowMa: 2, peakMa: 40, wave: 'even-fade' } })).toEqual([]);
    // Low and wave may be taken as usual, and are then marked; a low without a peak says nothing.
    expect(fieldsOf({ load: { ...nothing, lowMa: 2, peakMa: 40 } })).toEqual([]);
    expect(fieldsOf({ load: { ...nothing, peakMa: 40 } })).toEqual([]);
    expect(fieldsOf({ load: { ...nothing, lowMa: 2 } })).toEqual(expect.arrayContaining(['load.peakMa']));
    expect(fieldsOf({ load: { ...nothing, lowMa: 2, peakMa: 40, meanMa: 20 } })).toEqual([]);
  });

  test('what waits for a hand may draw next to nothing; what lights by itself, and trips that never come, may not', () => {
    const waiting = { behaviour: 'steady', standbyMa: 0.05 } as const;
    expect(fieldsOf({ load: waiting, switching: { kind: 'by-hand' } })).toEqual([]);
    expect(fieldsOf({ load: waiting, switching: { kind: 'always' } })).toEqual(['load.meanMa']);
    const nothing = { ...waiting, standbyMa: 0 };
    expect(fieldsOf({ load: nothing, switching: { kind: 'by-hand' } })).toEqual(['load.meanMa']);
    const trips = { perShowNight: 0, perNightOff: 0, seconds: 10, runMa: 60 };
    expect(fieldsOf({ load: nothing, trips })).toEqual(['load.meanMa']);
    expect(fieldsOf({ load: { ...nothing, meanMa: 0, peakMa: 40 } })).toEqual(['load.meanMa']);
  });

  test('numbers that contradict each other are told', () => {
    const load = { behaviour: 'steady', standbyMa: 0 } as const;
    expect(fieldsOf({ load: { ...load, meanMa: 50, peakMa: 40 } })).toEqual(['load.meanMa']);
    expect(fieldsOf({ load: { ...load, meanMa: 5, lowMa: 10, peakMa: 40 } })).toEqual(['load.meanMa']);
    const led = { behaviour: 'fades', standbyMa: 0, meanMa: 20, measuredVolts: 4.5 } as const;
    expect(fieldsOf({ load: { ...led, ledVolts: 6 } })).toEqual(['load.ledVolts']);
    expect(fieldsOf({ load: { ...led, ledVolts: 2.9 } })).toEqual([]);
    // Three fresh alkaline cells end to end stay below 5.2 V.
    const { measuredVolts: _, ...unmeasured } = led;
    expect(fieldsOf({ load: { ...unmeasured, ledVolts: 6 } })).toEqual(['load.ledVolts']);
    expect(fieldsOf({ load: { ...unmeasured, ledVolts: 2.9 } })).toEqual([]);
    const trips = { perShowNight: 9000, perNightOff: 0, seconds: 60, runMa: 60 };
    expect(fieldsOf({ load, trips })).toEqual(['trips.perShowNight']);
  });
});
