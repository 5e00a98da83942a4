import { describe, expect, it } from 'vitest';
import { type CellSet, usableShares } from '../../server/model/cell.ts';
import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import { COURSE_WORDS, deplete } from '../../server/model/depletion.ts';
import { instantInEvening } from '../../server/model/evening.ts';
import { type PropProjection, projectProp } from '../../server/model/prop-forecast.ts';
import { stepHourByHour } from '../bench/hour-by-hour.ts';
import { holdTo } from '../reference/accuracy.ts';
import { constantNights } from '../rig/constant-nights.ts';
import { aSeason, freshSet, manyProps } from '../rig/many-props.ts';
import { plainQuestion } from '../rig/plainly.ts';

const oneCell: CellSet = { type: builtInCellType('LR6')!, series: 1, parallel: 1, healthShare: 1 };
const demand = { rateMa: 20, peakMa: 40 };
const steadily = { reckonedOf: (mah: number) => mah, usedOf: (mah: number) => mah, drawShareAt: () => 1 };

function follow(nightsC: number[]) {
  const schedule = constantNights(nightsC, 14);
  const shares = usableShares(oneCell, demand, 1.1);
  return deplete({
    schedule,
    start: 0,
    firstEvening: schedule,
    offsetC: 0,
    drawDown: steadily,
    dim: shares,
    dark: shares,
    meanMa: 20,
    standbyMa: 0,
    mahPerTrip: 0,
    usedAtStartMah: 0,
    selfDischargeMah: () => 0,
    spread: 0.2,
    untilSpent: false,
  });
}

describe('a cold snap', () => {
  // Worked by hand from the tables: three LR6 at 1.10 V a cell, 20 mA mean, 40 mA peak, 14 h nights.
  const nightsC = [8, 7, 6, 5, 4, -2, -8, -12, -9, 3, 8, 8];
  const course = follow(nightsC);
  const words = [...course.likely].map((index) => COURSE_WORDS[index]);

  it('uses 280 mAh a night until the cold takes it out on the sixth', () => {
    [280, 560, 840, 1120, 1400].forEach((mah, n) => {
      expect(course.usedMah[n]).toBeCloseTo(mah, 6);
    });
    expect(words.slice(0, 5)).toEqual(Array(5).fill('bright'));
    expect(course.usedMah[5]! / 1621).toBeCloseTo(1, 2);
    expect(course.brightShare[5]! * 14).toBeCloseTo(11.07, 1);
  });

  it('stays dark through nights 7 to 9 although 20 °C would give 2057 mAh: that is the cold', () => {
    expect(words.slice(5, 9)).toEqual(Array(4).fill('dark-cold'));
    [6, 7, 8].forEach((n) => {
      expect(course.usedMah[n]).toBe(course.usedMah[5]);
    });
  });

  it('comes back by itself on milder nights and ends used up', () => {
    expect(course.usedMah[9]! / 1757).toBeCloseTo(1, 2);
    expect(course.usedMah[10]! / 1864).toBeCloseTo(1, 2);
    expect(course.usedMah[11]).toBe(course.usedMah[10]);
    expect(words[11]).toBe('dark-used-up');
  });

  it('a prop that draws less than the sum lives through it: cold lowers the limit and uses nothing up', () => {
    // On the coldest night the limit is 1251 mAh and 8 nights are 2240 mAh: bright through it below 0.559.
    expect(course.brightBelow[7]).toBeCloseTo(1251 / 2240, 2);
    // Two milder nights later a prop drawing 0.59 of the sum, dark for part of the snap, is lit right through again.
    expect(course.litBelow[10]!).toBeGreaterThan(0.59);
  });
});

describe('chances and thresholds', () => {
  it('the threshold falls by use alone, night by night, on nights of one temperature', () => {
    const course = follow(Array(12).fill(20));
    course.brightBelow.forEach((threshold, n) => {
      expect(threshold).toBeCloseTo(2057.5 / (280 * (n + 1)), 6);
    });
  });

  it('a fresh set that is warm is bright whatever it draws up to seven times the sum', () => {
    expect(follow([20]).brightBelow[0]).toBeCloseTo(2057.5 / 280, 6);
  });
});

describe('against the plain hour-by-hour sum', () => {
  const season = aSeason('2026-10-10', '2027-02-06');
  const fittedAt = instantInEvening('2026-10-10', '15:00', 'Europe/London');
  const shelf = new Map();
  const projected = manyProps(30).map((prop) => {
    const log = freshSet(prop, fittedAt);
    const question = {
      prop,
      log,
      cellTypeOf: builtInCellType,
      zoneOffsetC: 0,
      season,
      asOf: fittedAt,
      shelf,
      wholeSeason: true,
    };
    return { prop, projection: projectProp(question) as PropProjection };
  });

  // A prop may go dim at the cold end of one night or, spared by a hair, well into the next: the moment jumps, the
  // charge does not. So 0.1 night is counted in charge: the plain sum brackets ours when it draws that much more or less.
  it.each(projected.map(({ prop, projection }) => [prop.tag, prop, projection] as const))(
    '%s goes dim within 0.1 night of it',
    (_, prop, projection) => {
      const { depletion } = projection;
      const dimNight = depletion.brightBelow.findIndex((threshold) => threshold < 1);
      expect(dimNight).toBeGreaterThan(0);
      const ours = dimNight + depletion.brightShare[dimNight]!;
      const plainly = (factor: number) =>
        stepHourByHour(plainQuestion({ prop, season, fittedAt, projection }, factor)).dimAfterNights!;
      const tenth = (0.1 * depletion.eveningMah[dimNight]!) / depletion.usedMah[dimNight]!;
      expect(plainly(1 + tenth)).toBeLessThanOrEqual(ours + 1e-6);
      expect(plainly(1 - tenth)).toBeGreaterThanOrEqual(ours - 1e-6);
    },
    30_000,
  );

  it('first dim moments lie close together', (context) => {
    const differences = projected.map(({ prop, projection }) => {
      const { depletion } = projection;
      const dimNight = depletion.brightBelow.findIndex((threshold) => threshold < 1);
      const plain = stepHourByHour(plainQuestion({ prop, season, fittedAt, projection }, 1));
      return dimNight + depletion.brightShare[dimNight]! - plain.dimAfterNights!;
    });
    holdTo(
      { rms: 0.15, maxAbs: 0.6 },
      {
        context,
        what: 'first dim moment, 30 props of ten sorts over 120 nights',
        against: 'a plain hour-by-hour sum',
        unit: 'nights',
        differences,
      },
    );
  }, 30_000);

  it.each(['dim', 'dark'] as const)(
    'thresholds are the drain factors at which the plain sum goes %s: not at 1 %% less, but at 1 %% more',
    (limit) => {
      let compared = 0;
      for (const { prop, projection } of projected.slice(0, 10)) {
        const { depletion } = projection;
        const thresholds = limit === 'dim' ? depletion.brightBelow : depletion.litBelow;
        for (const n of [10, 25, 60]) {
          // The smallest so far: the plain sum tells only when it fails first. Thresholds are kept to four spreads.
          const threshold = Math.min(...thresholds.slice(0, n + 1));
          const near = Math.abs(Math.log(threshold)) < 3.5 * projection.belief.spread;
          if (!near) continue;
          const failsBy = (factor: number) => {
            const question = plainQuestion({ prop, season, fittedAt, projection }, factor);
            const plain = stepHourByHour({ ...question, through: '2026-12-20' });
            const nights = limit === 'dim' ? plain.dimAfterNights : plain.darkAfterNights;
            return nights !== null && nights < n + 1;
          };
          expect(failsBy(threshold * 1.01), `${prop.tag} night ${n} above ${threshold}`).toBe(true);
          expect(failsBy(threshold * 0.99), `${prop.tag} night ${n} below ${threshold}`).toBe(false);
          compared += 1;
        }
      }
      expect(compared).toBeGreaterThan(3);
    },
    60_000,
  );
});
