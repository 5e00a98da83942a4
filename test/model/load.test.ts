import { describe, expect, it } from 'vitest';
import { drawShareAtVolts, type Load, reckonLoad, waveMeanMa } from '../../server/model/load.ts';

const about = { nominalVolts: 4.5, dimVolts: 3.3, waits: false };
const reckon = (load: Partial<Load>) => reckonLoad({ behaviour: 'steady', standbyMa: 0, ...load }, about);

describe('a load with its gaps filled', () => {
  it('takes a measured mean as it is and marks nothing', () => {
    expect(reckon({ meanMa: 21, peakMa: 34 })).toMatchObject({ meanMa: 21, peakMa: 34, defaults: [] });
  });
  it('works the mean out from low, peak and wave, and marks a wave nobody gave', () => {
    expect(reckon({ lowMa: 6, peakMa: 40, wave: 'even-fade' })).toMatchObject({ meanMa: 23, defaults: [] });
    expect(reckon({ lowMa: 6, peakMa: 40 })).toMatchObject({ meanMa: 23, defaults: ['load.wave'] });
    expect(reckon({ peakMa: 40, lowMa: 0, wave: 'blink' })).toMatchObject({
      meanMa: 20,
      defaults: ['load.onShare'],
    });
    expect(reckon({ peakMa: 40, wave: 'blink', onShare: 0.25 })).toMatchObject({
      meanMa: 10,
      defaults: ['load.lowMa'],
    });
  });
  it('is wider the less is known', () => {
    const spreads = [
      reckon({ meanMa: 21 }),
      reckon({ lowMa: 6, peakMa: 40, wave: 'even-fade' }),
      reckon({ lowMa: 6, peakMa: 40 }),
    ].map(({ spread }) => spread);
    expect(spreads).toEqual([...spreads].sort((a, b) => a - b));
    expect(new Set(spreads).size).toBe(3);
    expect(reckon({ behaviour: 'fades', meanMa: 21 }).spread).toBeGreaterThan(
      reckon({ behaviour: 'fades', meanMa: 21, measuredVolts: 4.2 }).spread,
    );
  });
  it('knows no mean where nothing says one', () => {
    expect(reckon({}).meanMa).toBeNull();
    expect(reckon({ meanMa: 0 }).meanMa).toBe(0);
  });
  it('reads a standby of 0 as too small to measure only where a circuit waits', () => {
    expect(reckon({ meanMa: 5 }).standbyMa).toBe(0);
    const waiting = reckonLoad({ behaviour: 'steady', meanMa: 5, standbyMa: 0 }, { ...about, waits: true });
    expect(waiting).toMatchObject({ standbyMa: 0.05, defaults: ['load.standbyMa'] });
  });
  it('marks the volts of a fading light it had to assume', () => {
    expect(reckon({ behaviour: 'fades', meanMa: 21 }).defaults).toEqual([
      'load.measuredVolts',
      'load.ledVolts',
    ]);
    expect(reckon({ behaviour: 'fades', meanMa: 21, measuredVolts: 4.4, ledVolts: 2.9 }).defaults).toEqual(
      [],
    );
  });
});

describe('current as the set falls', () => {
  // Ohm's law, by hand: (V - 1.9) ÷ (3.1 - 1.9).
  const fades = reckon({ behaviour: 'fades', meanMa: 25.5, measuredVolts: 3.1, ledVolts: 1.9 });
  it('fades with the voltage above the LED', () => {
    expect(drawShareAtVolts(fades, 3.1)).toBeCloseTo(1, 10);
    expect(drawShareAtVolts(fades, 2.5)).toBeCloseTo(0.5, 10);
    expect(drawShareAtVolts(fades, 1.5)).toBe(0.02);
  });
  it('holds its power, so the current rises', () => {
    const holds = reckon({ behaviour: 'holds', meanMa: 30, measuredVolts: 2.4 });
    expect(drawShareAtVolts(holds, 2.4)).toBe(1);
    expect(drawShareAtVolts(holds, 2)).toBeCloseTo(1.2, 10);
  });
  it('is steady where it is steady', () => {
    expect(drawShareAtVolts(reckon({ meanMa: 30 }), 1)).toBe(1);
  });
});

it('a wave whose peak is below its low is a slip of the program', () => {
  expect(() => waveMeanMa('even-fade', { lowMa: 5, peakMa: 4, onShare: 0.5 })).toThrow();
});
