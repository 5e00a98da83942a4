import { describe, expect, it } from 'vitest';
import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import { instantInEvening } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';
import { type NotProjected, type PropProjection, projectProp } from '../../server/model/prop-forecast.ts';
import { scheduleOf } from '../../server/model/schedule.ts';
import { aSeason, freshSet, manyProps, PLACE } from '../rig/many-props.ts';

// Shows on the first three evenings of each week from 10 October, 18:30 to 21:30.
const season = aSeason('2026-10-10', '2026-12-10');
const at = (evening: string, wallTime: string) => instantInEvening(evening, wallTime, PLACE.timeZone);
const trips = { perShowNight: 120, perNightOff: 30, seconds: 12, runMa: 180 };
const byHand = { kind: 'by-hand' } as const;
const tripSchedule = (since: number, through = '2026-10-16') =>
  scheduleOf(season, { switching: byHand, trips, from: '2026-10-10', through, since });
const prop: Prop = {
  ...manyProps(1)[0]!,
  load: { behaviour: 'steady', standbyMa: 0.35 },
  switching: byHand,
  trips,
};
const project = (changes: Partial<Prop>, of: { season?: typeof season; since?: number } = {}) => {
  const changed = { ...prop, ...changes };
  return projectProp({
    prop: changed,
    log: freshSet(changed, of.since ?? at('2026-10-10', '15:00')),
    cellTypeOf: builtInCellType,
    zoneOffsetC: 0,
    season: of.season ?? season,
    asOf: at('2026-10-10', '20:00'),
    shelf: new Map(),
    wholeSeason: true,
  });
};

describe('trips', () => {
  it('come by kind of evening, and are looked at where they come', () => {
    const schedule = tripSchedule(at('2026-10-10', '12:00'));
    expect(schedule.trips).toEqual([120, 120, 120, 30, 30, 30, 30]);
    for (let n = 0; n < schedule.count; n += 1) {
      expect(schedule.checkFrom[n + 1]! - schedule.checkFrom[n]!).toBeGreaterThan(2);
    }
  });
  it('a set that goes in after the gate has closed takes none of that show, half way its half', () => {
    expect(tripSchedule(at('2026-10-10', '01:30')).trips[0]).toBe(0);
    expect(tripSchedule(at('2026-10-10', '20:00')).trips[0]).toBeCloseTo(60, 6);
  });
  it('a prop set off on nights off alone can run down', () => {
    const quiet = { ...season, showNights: new Map() };
    const worn = project({ trips: { ...trips, perNightOff: 200 } }, { season: quiet }) as PropProjection;
    expect(worn.brightOn.at(-1)).toBeLessThan(0.01);
  });
});

describe('the current a rate is looked up for', () => {
  it('does not depend on how long a run of evenings was prepared', () => {
    const longer = aSeason('2026-09-01', '2027-02-10');
    const one = project({}) as PropProjection;
    const other = project(
      {},
      { season: { ...longer, closes: season.closes, showNights: season.showNights } },
    ) as PropProjection;
    expect(other.rateMa).toBeCloseTo(one.rateMa, 9);
  });
});

describe('a prop without a draw', () => {
  it.each([[{ standbyMa: 0.05 }], [{ standbyMa: 0, meanMa: 0 }], [{ standbyMa: 1, meanMa: 0 }]])(
    'is not known rather than fine: %j',
    (load) => {
      const { trips: _, ...lit } = prop;
      const outcome = projectProp({
        prop: { ...lit, load: { behaviour: 'steady', ...load }, switching: { kind: 'always' } },
        log: freshSet(prop, at('2026-10-10', '15:00')),
        cellTypeOf: builtInCellType,
        zoneOffsetC: 0,
        season,
        asOf: at('2026-10-11', '15:00'),
        shelf: new Map(),
        wholeSeason: true,
      });
      expect((outcome as NotProjected).reason).toBe('no-draw');
    },
  );
});
