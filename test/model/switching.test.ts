import { describe, expect, test } from 'vitest';
import { formatInstant, HOUR_MS, parseInstant } from '../../server/model/evening.ts';
import type { ShowNight, Switching } from '../../server/model/switching.ts';
import { litEvening, thresholdsOf } from '../../server/model/switching.ts';

const london = { latitudeDeg: 51.5074, longitudeDeg: -0.1278, timeZone: 'Europe/London' };
const newYork = { latitudeDeg: 40.7128, longitudeDeg: -74.006, timeZone: 'America/New_York' };
const tromso = { latitudeDeg: 69.6492, longitudeDeg: 18.9553, timeZone: 'Europe/Oslo' };
const helsinki = { latitudeDeg: 60.1699, longitudeDeg: 24.9384, timeZone: 'Europe/Helsinki' };
const MINUTE = 1 / 60;

type Setting = { place?: typeof london; showNight?: ShowNight | null; poweredSince?: string };

function lit(switching: Switching, evening: string, setting: Setting = {}) {
  return litEvening(switching, {
    evening,
    place: setting.place ?? london,
    showNight: setting.showNight ?? null,
    poweredSinceAt: setting.poweredSince === undefined ? -Infinity : parseInstant(setting.poweredSince)!,
  });
}

const spelled = (answer: ReturnType<typeof lit>) =>
  answer.spells.map(({ fromAt, untilAt }) => `${formatInstant(fromAt)}/${formatInstant(untilAt)}`);

describe('light sensor', () => {
  // Expected lengths: data/dusk-dawn.csv (ERFA 2.0.0).
  test('is lit from civil dusk to civil dawn when nothing else is known', () => {
    expect(lit({ kind: 'light-sensor' }, '2024-01-15').litHours).toBeCloseTo(51_722 / 3600, 2);
    expect(lit({ kind: 'light-sensor' }, '2024-01-15').reason).toBeNull();
    // Over the end of summer time the wall clock would say an hour less.
    expect(lit({ kind: 'light-sensor' }, '2026-10-31', { place: newYork }).litHours).toBeCloseTo(
      45_372 / 3600,
      2,
    );
  });

  test('cut-off counts from dusk, and dawn ends it where that comes first', () => {
    const sensor = { kind: 'light-sensor', onAltitudeDeg: -6 } as const;
    const answer = lit({ ...sensor, cutOffHours: 6 }, '2024-01-15');
    expect(answer.litHours).toBe(6);
    expect(Math.abs(answer.spells[0]!.fromAt - parseInstant('2024-01-15T16:58:35Z')!)).toBeLessThan(5000);
    expect(lit({ ...sensor, cutOffHours: 20 }, '2024-01-15').litHours).toBeCloseTo(51_722 / 3600, 2);
  });

  // data/dusk-dawn.csv: London 2024-01-15, -6 deg at 16:58:35 and 07:20:37, -4 deg at 16:43:59 and 07:35:09.
  test('off at another light than on', () => {
    const later = lit({ kind: 'light-sensor', onAltitudeDeg: -6, offAltitudeDeg: -4 }, '2024-01-15');
    expect(later.litHours).toBeCloseTo((51_722 + 14 * 60 + 32) / 3600, 2);
  });

  test('shade brings dusk forward and puts dawn off', () => {
    const open = lit({ kind: 'light-sensor', onLux: 10 }, '2024-01-15').spells[0]!;
    const porch = lit({ kind: 'light-sensor', onLux: 10, skyShare: 0.1 }, '2024-01-15').spells[0]!;
    // 10 lux through a tenth of the sky is 100 lux: -2.743 deg instead of -5.036 (data/lux-to-altitude.csv). Between -4
    // and -0.833 deg London's sun takes 24 min 0 s that day, between -6 and -4 deg 14 min 36 s (data/dusk-dawn.csv).
    const minutes = (open.fromAt - porch.fromAt) / 60_000;
    expect(minutes).toBeGreaterThan(2.293 * 7.3 - 1);
    expect(minutes).toBeLessThan(2.293 * 7.6 + 1);
    expect(porch.untilAt).toBeGreaterThan(open.untilAt);
    expect(thresholdsOf({ kind: 'light-sensor', onAltitudeDeg: -4, skyShare: 0.1 }).onDeg).toBe(-4);
    expect(thresholdsOf({ kind: 'light-sensor', skyShare: 0.5 }).onDeg).toBeGreaterThan(-6);
  });

  test('polar night: the whole evening, with the reason', () => {
    const answer = lit({ kind: 'light-sensor', onAltitudeDeg: -0.833 }, '2025-12-21', { place: tromso });
    expect(answer.litHours).toBe(24);
    expect(answer.reason).toMatch(/never rises high enough/);
    expect(answer.spells).toHaveLength(1);
  });

  test('polar night with a cut-off: it never sets itself again, so it is not lit', () => {
    const sensor = { kind: 'light-sensor', onAltitudeDeg: -0.833, cutOffHours: 6 } as const;
    const answer = lit(sensor, '2025-12-21', { place: tromso });
    expect(answer.spells).toEqual([]);
    expect(answer.reason).toMatch(/cut-off/);
  });

  test('midnight sun: nothing, with the reason', () => {
    const answer = lit({ kind: 'light-sensor' }, '2026-06-21', { place: tromso });
    expect(answer).toMatchObject({ spells: [], litHours: 0 });
    expect(answer.reason).toMatch(/never sinks low enough/);
  });

  // data/dusk-dawn.csv: Helsinki at the June solstice reaches -6 but never -12.
  test('white night: turns on but finds no dark to stay on in', () => {
    const answer = lit({ kind: 'light-sensor', onAltitudeDeg: -6, offAltitudeDeg: -12 }, '2026-06-21', {
      place: helsinki,
    });
    expect(answer.spells).toEqual([]);
    expect(answer.reason).toMatch(/never gets dark enough/);
  });

  // data/dusk-dawn-grazing.csv: Tromso at -0.833 has its last dusk of 2026 on the evening of 11-27, the first dawn on
  // 2026-01-14 (10:29:21Z on the 15th).
  test('the night polar night begins is lit to its end, the one it ends from its beginning', () => {
    const sensor = { kind: 'light-sensor', onAltitudeDeg: -0.833 } as const;
    const last = lit(sensor, '2026-11-27', { place: tromso });
    expect(last.spells.at(-1)!.untilAt).toBe(parseInstant('2026-11-28T11:00:00Z'));
    const first = lit(sensor, '2026-01-14', { place: tromso });
    expect(first.spells[0]!.fromAt).toBe(parseInstant('2026-01-14T11:00:00Z'));
    expect(Math.abs(first.spells[0]!.untilAt - parseInstant('2026-01-15T10:29:21Z')!)).toBeLessThan(60_000);
  });

  test('a threshold brighter than daylight never turns off, one darker than night never on', () => {
    expect(lit({ kind: 'light-sensor', onLux: 1e6 }, '2026-10-25').litHours).toBe(24);
    expect(lit({ kind: 'light-sensor', onLux: 1e-5 }, '2026-10-25').litHours).toBe(0);
  });

  test('nothing before the cells went in', () => {
    const answer = lit({ kind: 'light-sensor' }, '2024-01-15', { poweredSince: '2024-01-16T00:00:00Z' });
    expect(answer.litHours).toBeCloseTo(7 + 20.62 * MINUTE, 2);
    const before = lit({ kind: 'light-sensor' }, '2024-01-15', { poweredSince: '2024-01-16T13:00:00Z' });
    expect(before).toMatchObject({ spells: [], litHours: 0 });
    expect(before.reason).toMatch(/no cells yet/);
  });
});

// Expected times by hand from the law: summer time ends 2026-10-25 01:00Z in Europe, and starts 2026-03-29 01:00Z.
describe('clock', () => {
  test.each([
    ['an evening', '18:00', '22:30', '2026-10-23', ['2026-10-23T17:00:00Z/2026-10-23T21:30:00Z']],
    ['past midnight', '18:00', '02:00', '2026-10-23', ['2026-10-23T17:00:00Z/2026-10-24T01:00:00Z']],
    [
      'over the hour that comes twice',
      '18:00',
      '06:00',
      '2026-10-24',
      ['2026-10-24T17:00:00Z/2026-10-25T06:00:00Z'],
    ],
    [
      'off in the repeated hour: at its first',
      '18:00',
      '01:30',
      '2026-10-24',
      ['2026-10-24T17:00:00Z/2026-10-25T00:30:00Z'],
    ],
    [
      'on in the skipped hour: after the skip',
      '01:30',
      '05:00',
      '2026-03-28',
      ['2026-03-29T01:30:00Z/2026-03-29T04:00:00Z'],
    ],
    [
      'early morning belongs to the evening before',
      '05:00',
      '08:00',
      '2026-12-01',
      ['2026-12-02T05:00:00Z/2026-12-02T08:00:00Z'],
    ],
    [
      'across noon: the end of one spell, the start of the next',
      '10:00',
      '14:00',
      '2026-12-01',
      ['2026-12-01T12:00:00Z/2026-12-01T14:00:00Z', '2026-12-02T10:00:00Z/2026-12-02T12:00:00Z'],
    ],
    [
      'off when it goes on is round the clock',
      '18:00',
      '18:00',
      '2026-12-01',
      ['2026-12-01T12:00:00Z/2026-12-02T12:00:00Z'],
    ],
  ])('%s', (_, onAt, offAt, evening, expected) => {
    const answer = lit({ kind: 'clock', onAt, offAt }, evening);
    expect(spelled(answer)).toEqual(expected);
    expect(answer.reason).toBeNull();
  });

  test('the hour that comes twice is lit twice', () => {
    expect(lit({ kind: 'clock', onAt: '18:00', offAt: '06:00' }, '2026-10-24').litHours).toBe(13);
    expect(lit({ kind: 'clock', onAt: '18:00', offAt: '06:00' }, '2026-03-28').litHours).toBe(11);
  });
});

describe('interval timer', () => {
  const timer = { kind: 'interval-timer', onHours: 6 } as const;

  test('counts real days from when the cells went in, whatever the clocks do', () => {
    const poweredSince = '2026-10-10T16:00:00Z';
    expect(spelled(lit(timer, '2026-10-10', { poweredSince }))).toEqual([
      '2026-10-10T16:00:00Z/2026-10-10T22:00:00Z',
    ]);
    expect(spelled(lit(timer, '2026-10-25', { poweredSince }))).toEqual([
      '2026-10-25T16:00:00Z/2026-10-25T22:00:00Z',
    ]);
    expect(lit(timer, '2026-10-09', { poweredSince }).spells).toEqual([]);
  });

  test('set later than powered counts from the setting', () => {
    const setAt = parseInstant('2026-12-01T09:00:00Z')!;
    const poweredSince = '2026-11-20T16:00:00Z';
    expect(spelled(lit({ ...timer, setAt }, '2026-12-02', { poweredSince }))).toEqual([
      '2026-12-02T12:00:00Z/2026-12-02T15:00:00Z',
      '2026-12-03T09:00:00Z/2026-12-03T12:00:00Z',
    ]);
    // Until then it ran by the count that began when the cells went in, and that count ends where the new one begins.
    expect(spelled(lit({ ...timer, setAt }, '2026-11-25', { poweredSince }))).toEqual([
      '2026-11-25T16:00:00Z/2026-11-25T22:00:00Z',
    ]);
    expect(lit({ ...timer, setAt }, '2026-11-19', { poweredSince }).spells).toEqual([]);
  });

  test('round the clock is one spell', () => {
    const all = { kind: 'interval-timer', onHours: 24 } as const;
    expect(lit(all, '2026-12-02', { poweredSince: '2026-11-20T16:00:00Z' })).toMatchObject({ litHours: 24 });
    expect(lit(all, '2026-12-02', { poweredSince: '2026-11-20T16:00:00Z' }).spells).toHaveLength(1);
  });

  test('needs to know when it started', () => {
    expect(() => lit(timer, '2026-12-02')).toThrow(/setAt or poweredSinceAt/);
  });
});

describe('by hand and always', () => {
  const show = { evening: '2026-10-24', opensAt: '18:30', closesAt: '21:30', calledOff: false };

  test('by hand: the gate hours', () => {
    expect(spelled(lit({ kind: 'by-hand' }, '2026-10-24', { showNight: show }))).toEqual([
      '2026-10-24T17:30:00Z/2026-10-24T20:30:00Z',
    ]);
    const late = { ...show, closesAt: '01:30' };
    expect(lit({ kind: 'by-hand' }, '2026-10-24', { showNight: late }).litHours).toBe(7);
  });

  test('by hand: nothing without a show, with one called off, or with the gate closed before it opens', () => {
    expect(lit({ kind: 'by-hand' }, '2026-10-24').reason).toMatch(/No show/);
    const calledOff = lit({ kind: 'by-hand' }, '2026-10-24', { showNight: { ...show, calledOff: true } });
    expect(calledOff).toMatchObject({ spells: [], litHours: 0 });
    expect(calledOff.reason).toMatch(/called off/);
    const muddled = lit({ kind: 'by-hand' }, '2026-10-24', {
      showNight: { ...show, opensAt: '10:00', closesAt: '16:00' },
    });
    expect(muddled.reason).toMatch(/before it opens/);
  });

  test('a show night of another evening is a mistake of the caller', () => {
    expect(() => lit({ kind: 'by-hand' }, '2026-10-25', { showNight: show })).toThrow(/2026-10-24/);
  });

  test('always: the whole evening, 25 h when the clocks go back', () => {
    expect(lit({ kind: 'always' }, '2026-10-24').litHours).toBe(25);
    expect(lit({ kind: 'always' }, '2026-03-28').litHours).toBe(23);
    const since = lit({ kind: 'always' }, '2026-12-01', { poweredSince: '2026-12-01T18:00:00Z' });
    expect(since.litHours).toBe(18);
    expect(since.spells[0]!.untilAt - since.spells[0]!.fromAt).toBe(18 * HOUR_MS);
  });
});
