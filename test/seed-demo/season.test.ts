import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { demoDeps } from '../../seed-demo/deps.ts';
import { DEMO_AS_OF, playSeason } from '../../seed-demo/season.ts';
import { swapTable } from '../../seed-demo/swap-table.ts';
import { forecastProp } from '../../server/actions/forecast-prop.ts';
import { forecastSite } from '../../server/actions/forecast-site.ts';
import { parseInstant } from '../../server/model/evening.ts';
import type { SiteForecast } from '../../server/model/forecast.ts';
import { siteLog } from '../../server/store/log.ts';
import { openStore } from '../../server/store/open.ts';
import { listProps } from '../../server/store/props.ts';
import { dumpOf } from '../rig/build-app.ts';

const asOf = parseInstant(DEMO_AS_OF)!;

function played() {
  const store = openStore(':memory:');
  const deps = demoDeps(store);
  const siteId = playSeason(deps);
  return { store, deps, siteId };
}

describe('the demo', () => {
  let demo: ReturnType<typeof played>;
  let forecast: SiteForecast;
  beforeAll(() => {
    demo = played();
    forecast = forecastSite(demo.deps, { siteId: demo.siteId, asOf });
  });
  const prop = (tag: string) => forecast.props.find((candidate) => candidate.tag === tag)!;
  const at = (moment: string) =>
    forecastSite(demo.deps, { siteId: demo.siteId, asOf: parseInstant(moment)! });
  const propAt = (tag: string, moment: string) =>
    at(moment).props.find((candidate) => candidate.tag === tag)!;

  it('has 42 props in six zones and 4 spares on the shelf', () => {
    const props = listProps(demo.store.db, demo.siteId);
    expect(props.filter(({ zone }) => zone !== 'Shelf')).toHaveLength(42);
    expect(props.filter(({ zone }) => zone === 'Shelf')).toHaveLength(4);
    expect(new Set(props.map(({ zone }) => zone)).size).toBe(7);
  });

  it('is the same to the byte each time', () => {
    const again = played();
    const hash = (text: string) => createHash('sha256').update(text).digest('hex');
    expect(hash(dumpOf(again.store))).toBe(hash(dumpOf(demo.store)));
    const table = swapTable(forecastSite(again.deps, { siteId: again.siteId, asOf }));
    expect(table).toBe(swapTable(forecast));
    again.store.close();
  });

  it('looks alive on its morning: every group has somebody in it', () => {
    const groups = new Set(forecast.props.map(({ group }) => group));
    expect(groups).toEqual(new Set(['at-risk', 'next-round', 'fine', 'unknown']));
    expect(forecast.evening).toBe('2026-10-22');
    expect(forecast.nextRound).toBe('2026-10-24');
  });

  it('tells the scripted moments', () => {
    // The fifty string is caught on its fourth night.
    expect(propAt('E-05', '2026-10-13T08:00:00Z').dim.likely! <= '2026-10-14').toBe(true);
    expect(propAt('E-05', '2026-10-13T20:00:00Z').group).toBe('at-risk');
    // Zinc-carbon entered as alkaline: fine by the sum until somebody sees it.
    expect(prop('B-11').group).toBe('fine');
    expect(propAt('B-11', '2026-10-22T20:00:00Z')).toMatchObject({ group: 'at-risk', lastSeen: 'dim' });
    expect(propAt('B-09', '2026-10-22T20:00:00Z').group).toBe('fine');
    // A wet joint, dried: bright again is bright again.
    expect(propAt('D-05', '2026-10-18T18:55:00Z').group).toBe('at-risk');
    expect(prop('D-05').group).toBe('fine');
    // Dark in the frost with two thirds left: maybe cold, not flat.
    expect(propAt('A-02', '2026-10-29T19:30:00Z').note).toMatch(/maybe cold, not flat/);
    expect(prop('F-03').note).toMatch(/wants a swap now/);
    // Moved to the graveyard, with its cells.
    expect(prop('B-06').zone).toBe('Graveyard');
    // The mill race is 3 °C colder: the lower wisp is dim before its twin would be.
    const upper = forecastProp(demo.deps, { propId: prop('D-02').propId, asOf });
    const gate = forecastProp(demo.deps, { propId: prop('A-01').propId, asOf });
    const night = upper.nights.at(-1)!.evening;
    const meanOn = (nights: typeof upper.nights) => nights.find(({ evening }) => evening === night)!.meanC;
    expect(meanOn(gate.nights) - meanOn(upper.nights)).toBeCloseTo(3, 6);
  });

  it('catches the label that no cell can keep, and the coin cells that are asked too much', () => {
    const codes = (tag: string) =>
      forecastProp(demo.deps, { propId: prop(tag).propId, asOf }).why.warnings.map(({ code }) => code);
    expect(codes('C-10')).toContain('label-unreal');
    expect(codes('F-03')).toContain('coin-over-rating');
    expect(codes('A-01')).not.toContain('label-unreal');
  });

  it('knows the called-off night only from its afternoon, and the added one from its evening', () => {
    const nightsOf = (moment: string) =>
      forecastProp(demo.deps, { propId: prop('F-02').propId, asOf: parseInstant(moment)! }).nights;
    const on = (nights: ReturnType<typeof nightsOf>, evening: string) =>
      nights.find((night) => night.evening === evening)!.showNight;
    expect(on(nightsOf('2026-10-24T09:00:00Z'), '2026-10-24')).toBe(true);
    expect(on(nightsOf('2026-10-24T15:00:00Z'), '2026-10-24')).toBe(false);
    expect(on(nightsOf('2026-10-26T09:00:00Z'), '2026-11-01')).toBe(false);
    expect(on(nightsOf('2026-10-27T09:00:00Z'), '2026-11-01')).toBe(true);
  });

  it('a part batch leaves the old set deciding', () => {
    const c03 = forecastProp(demo.deps, {
      propId: prop('C-03').propId,
      asOf: parseInstant('2026-10-26T09:00:00Z')!,
    });
    expect(c03.why.warnings.map(({ code }) => code)).toContain('part-batch');
    expect(c03.fittedAt).toBeLessThan(parseInstant('2026-10-11T00:00:00Z')!);
  });

  it('says of each prop in the list what its own page says, on any day', () => {
    for (const moment of ['2026-10-15T20:00:00Z', DEMO_AS_OF, '2026-10-30T09:00:00Z']) {
      for (const line of at(moment).props) {
        const { dim, dark, swapBy, cause } = forecastProp(demo.deps, {
          propId: line.propId,
          asOf: parseInstant(moment)!,
        });
        expect(
          { dim: line.dim, dark: line.dark, swapBy: line.swapBy, cause: line.cause },
          `${line.tag} ${moment}`,
        ).toEqual({ dim, dark, swapBy, cause });
      }
    }
  });

  it('fits every swap a prop can take', () => {
    expect([...siteLog(demo.store.db, demo.siteId).values()].flat().length).toBeGreaterThan(100);
  });
});

describe('the sum behind a date', () => {
  it('can be redone on paper within 2 % or one night, for every prop of the demo that is lit tonight', () => {
    const { store, deps, siteId } = played();
    let redone = 0;
    for (const { id, tag } of listProps(store.db, siteId)) {
      const { why, usableMah, usedMah, nights, dim, asOf: moment } = forecastProp(deps, { propId: id, asOf });
      if (!usableMah || usedMah === null || why.litHoursTonight === 0) continue;
      const usable =
        why.capacityMah *
        why.coldShare *
        why.rateShare *
        why.cutOffShare *
        why.weakestShare *
        why.healthShare;
      expect(Math.abs(usable / usableMah.tonight - 1), tag).toBeLessThan(0.001);
      // Paper: what is left over what an evening takes, from tonight on, while the nights stay as they are.
      const tonight = nights.findIndex(({ evening }) => evening === '2026-10-22');
      const likely = nights.findIndex((night) => night.likely === 'dim' || night.likely.startsWith('dark'));
      if (likely < tonight || dim.likely === null) continue;
      // Each night takes its standby round the clock and, by its lit hours, its share of tonight's lit charge.
      const standbyMah = (litHours: number) => why.standbyMa * (24 - litHours);
      const litMahTonight = why.mahTonight - standbyMah(why.litHoursTonight);
      const takenMah = (litHours: number) =>
        (litMahTonight * litHours) / why.litHoursTonight + standbyMah(litHours);
      let usedOnPaper = usedMah;
      let night = tonight;
      for (; night < nights.length; night += 1) {
        const { litHours, usableMah: holds } = nights[night]!;
        usedOnPaper += takenMah(litHours);
        if (litHours > 0 && usedOnPaper > holds) break;
      }
      expect(
        Math.abs(night - likely),
        `${tag}: paper ${night}, sum ${likely}, as of ${moment}`,
      ).toBeLessThanOrEqual(1);
      redone += 1;
    }
    expect(redone).toBeGreaterThan(15);
    store.close();
  });
});
