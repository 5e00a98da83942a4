import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { addProp } from '../../server/actions/add-prop.ts';
import { changeSite } from '../../server/actions/change-site.ts';
import { createSite } from '../../server/actions/create-site.ts';
import { forecastProp } from '../../server/actions/forecast-prop.ts';
import { importWeather } from '../../server/actions/import-weather.ts';
import { recordSwap } from '../../server/actions/record-swap.ts';
import { typeNight } from '../../server/actions/type-night.ts';
import { A_SITE, aProp } from '../rig/a-site.ts';
import { someDeps } from '../rig/deps.ts';

const realFiles = path.join(import.meta.dirname, '..', '..', '..', 'shared', 'reference', 'weather');

/** A light-sensor prop at 47 N, fitted on 20 December; the twelve pairs say a mild winter. */
function aWinter() {
  const deps = someDeps(Date.parse('2026-12-21T18:00:00Z'));
  const site = createSite(deps, {
    ...A_SITE,
    latitudeDeg: 46.93,
    longitudeDeg: -96.82,
    timeZone: 'America/Chicago',
    seasonFrom: '2026-12-15',
    seasonThrough: '2027-01-20',
    monthlyMinC: Array(12).fill(6),
    monthlyMaxC: Array(12).fill(14),
  });
  const prop = addProp(deps, {
    ...aProp(site.id),
    load: { behaviour: 'steady', meanMa: 15, peakMa: 30, standbyMa: 0.05 },
    switching: { kind: 'light-sensor', onAltitudeDeg: -6 },
  } as Parameters<typeof addProp>[1]);
  recordSwap(deps, { propId: prop.id, at: Date.parse('2026-12-20T20:00:00Z'), state: 'new' });
  return { deps, site, dim: () => forecastProp(deps, { propId: prop.id }), prop };
}

describe('the weather moves the dates', () => {
  it('a typed frost makes that night the first dim one, and says it was the cold', () => {
    const { deps, site, dim } = aWinter();
    const before = dim();
    expect(before.dim.likely).not.toBeNull();
    expect(before.cause).toBe('used-up');
    typeNight(deps, { siteId: site.id, evening: '2026-12-26', night: { minC: -22, maxC: -18 } });
    const frost = dim();
    expect(frost.dim.likely).toBe('2026-12-26');
    expect(before.dim.likely! > '2026-12-26').toBe(true);
    expect(frost.cause).toBe('cold');
    const lit = (evening: string) => frost.nights.find((night) => night.evening === evening)!;
    expect(lit('2026-12-26').chanceLit).toBeLessThan(0.5);
    expect(lit('2026-12-27').chanceLit).toBeGreaterThan(0.95);
    expect(lit('2026-12-26').weather).toBe('forecast');
  });

  it('a zone and a prop of its own may be colder', () => {
    const { deps, site, dim, prop } = aWinter();
    const before = dim();
    changeSite(deps, { siteId: site.id, changes: { zoneOffsetsC: { [prop.zone]: -8 } } });
    const colder = dim();
    expect(colder.dim.likely! < before.dim.likely!).toBe(true);
    expect(before.nights[3]!.meanC - colder.nights[3]!.meanC).toBeCloseTo(8, 6);
  });

  it('logged hours are observed behind us and a forecast ahead', () => {
    const { deps, site, dim } = aWinter();
    const lines = Array.from({ length: 24 * 9 }, (_, hour) => {
      const at = new Date(Date.parse('2026-12-18T00:00:00Z') + hour * 3_600_000).toISOString();
      // Coldest before dawn, warmest in the early afternoon, as local days go.
      return `${at},${(-6 + 3 * Math.cos(((hour - 20.5) * Math.PI) / 12)).toFixed(1)}`;
    });
    importWeather(deps, { siteId: site.id, text: ['time,tempC', ...lines].join('\n') });
    const nights = dim().nights;
    const source = (evening: string) => nights.find((night) => night.evening === evening)!.weather;
    expect(source('2026-12-20')).toBe('observed');
    expect(source('2026-12-23')).toBe('forecast');
    expect(source('2027-01-05')).toBe('climate');
  });
});

// Source: Fargo's typical year, NREL/US DOE; its December nights average -13.2 °C.
describe.runIf(existsSync(realFiles))('a real EPW file', () => {
  it('changes the dates: dim many nights earlier than in the mild winter the twelve pairs told of', () => {
    const { deps, site, dim } = aWinter();
    const mild = dim();
    const text = readFileSync(path.join(realFiles, 'fargo_nd_727530_tmy3.epw'), 'latin1');
    const imported = importWeather(deps, { siteId: site.id, text });
    expect(imported).toMatchObject({ format: 'epw', rows: 8760, rejected: [] });
    const frost = dim();
    expect(frost.nights.find(({ evening }) => evening === '2026-12-25')!.meanC).toBeLessThan(-10);
    expect(frost.dim.likely! < mild.dim.likely!).toBe(true);
    expect(frost.usableMah!.tonight).toBeLessThan(0.7 * mild.usableMah!.tonight);
  });
});
