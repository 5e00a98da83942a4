import fc from 'fast-check';
import { expect, test } from 'vitest';
import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import { instantInEvening } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';
import { type PropProjection, projectProp, rangeOf } from '../../server/model/prop-forecast.ts';
import { aSeason, freshSet, manyProps } from '../rig/many-props.ts';

const season = aSeason('2026-10-10', '2027-01-10');
const fittedAt = instantInEvening('2026-10-10', '15:00', 'Europe/London');

function project(prop: Prop, of: { zoneOffsetC?: number; leftShare?: number } = {}): PropProjection {
  const [swap] = freshSet(prop, fittedAt);
  const log =
    of.leftShare === undefined
      ? [swap!]
      : [{ ...swap!, state: 'part-used' as const, leftShare: of.leftShare }];
  return projectProp({
    prop,
    log,
    cellTypeOf: builtInCellType,
    zoneOffsetC: of.zoneOffsetC ?? 0,
    season,
    asOf: fittedAt,
    shelf: new Map(),
    wholeSeason: true,
  }) as PropProjection;
}

const props = fc.integer({ min: 0, max: 29 }).map((i) => manyProps(30)[i]!);
const scaled = (prop: Prop, factor: number): Prop => ({
  ...prop,
  load: {
    ...prop.load,
    ...(prop.load.meanMa === undefined ? {} : { meanMa: prop.load.meanMa * factor }),
    standbyMa: prop.load.standbyMa * factor,
  },
  ...(prop.trips
    ? {
        trips: {
          ...prop.trips,
          perShowNight: prop.trips.perShowNight * factor,
          perNightOff: prop.trips.perNightOff * factor,
        },
      }
    : {}),
});
/**
 * Evening by evening, one course of chances is nowhere above another. Factors are followed to four spreads either
 * way, beyond which lies a chance of 0.00003 that is not kept track of.
 */
function nowhereAbove(lower: PropProjection, higher: PropProjection): void {
  lower.brightOn.forEach((chance, n) => {
    expect(chance, `evening ${n}`).toBeLessThanOrEqual(higher.brightOn[n]! + 1e-4);
  });
}

test('what is used never falls, and lit is at least as likely as bright', () => {
  fc.assert(
    fc.property(props, fc.double({ min: 0.3, max: 3, noNaN: true }), (prop, factor) => {
      const { depletion, brightOn, litOn } = project(scaled(prop, factor));
      for (let n = 1; n < depletion.count; n += 1) {
        expect(depletion.usedMah[n]!).toBeGreaterThanOrEqual(depletion.usedMah[n - 1]! - 1e-9);
        expect(litOn[n]!).toBeGreaterThanOrEqual(brightOn[n]!);
        expect(litOn[n]!).toBeLessThanOrEqual(1);
        expect(brightOn[n]!).toBeGreaterThanOrEqual(0);
      }
    }),
    { numRuns: 60 },
  );
});

test('a larger draw never lasts longer', () => {
  fc.assert(
    fc.property(props, fc.double({ min: 1.02, max: 3, noNaN: true }), (prop, factor) => {
      nowhereAbove(project(scaled(prop, factor)), project(prop));
    }),
    { numRuns: 60 },
  );
});

test('a colder place never lasts longer, nor does a set with less left', () => {
  fc.assert(
    fc.property(
      props,
      fc.double({ min: 0.5, max: 12, noNaN: true }),
      fc.double({ min: 0.1, max: 0.9, noNaN: true }),
      (prop, colder, leftShare) => {
        const here = project(prop);
        // A set with less left is also less certain, so thresholds are compared and not chances.
        const edge = Math.exp(3.5 * here.belief.spread);
        const followed = (threshold: number) => Math.min(edge, Math.max(1 / edge, threshold));
        const colderBelow = project(prop, { zoneOffsetC: -colder }).depletion.brightBelow;
        const lessBelow = project(prop, { leftShare }).depletion.brightBelow;
        here.depletion.brightBelow.forEach((threshold, n) => {
          const limit = followed(threshold * 1.005);
          expect(followed(colderBelow[n]!), `colder, evening ${n}`).toBeLessThanOrEqual(limit);
          expect(followed(lessBelow[n]!), `less, evening ${n}`).toBeLessThanOrEqual(limit);
        });
      },
    ),
    { numRuns: 60 },
  );
});

test('a range is in order, and dim comes no later than dark', () => {
  fc.assert(
    fc.property(props, fc.double({ min: 0.3, max: 4, noNaN: true }), (prop, factor) => {
      const projection = project(scaled(prop, factor));
      const range = (chances: number[]) =>
        rangeOf({ from: projection.from, first: 0, evenings: chances.length, chanceOn: (n) => chances[n]! });
      const dim = range(projection.brightOn);
      const dark = range(projection.litOn);
      const late = (evening: string | null) => evening ?? '9999-12-31';
      expect(late(dim.early) <= late(dim.likely) && late(dim.likely) <= late(dim.late)).toBe(true);
      expect(late(dark.early) <= late(dark.likely) && late(dark.likely) <= late(dark.late)).toBe(true);
      expect(late(dim.early) <= late(dark.early) && late(dim.likely) <= late(dark.likely)).toBe(true);
    }),
    { numRuns: 60 },
  );
});
