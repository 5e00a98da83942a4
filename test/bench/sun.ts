import * as SunCalc from 'suncalc';
import { addEvenings } from '../../server/model/evening.ts';
import { darkSpell, darkSpellIn, nightOf } from '../../server/model/sun.ts';
import { tableNights } from '../reference/dusk-dawn-table.ts';

// Both do the same work: a year of one place, dusk and dawn at each altitude. Ours includes finding local noon in the
// place's zone; suncalc counts days by UTC and needs none. Its times come in one call for all altitudes it is set to.
const place = { latitudeDeg: 51.5074, longitudeDeg: -0.1278, timeZone: 'Europe/London' };
const ALTITUDES_DEG = [-0.833, -4, -6, -12];
const evenings = Array.from({ length: 365 }, (_, day) => addEvenings('2026-01-01', day));
const dates = evenings.map((evening) => new Date(`${evening}T12:00:00Z`));
const kept = { sum: 0 };

function setSuncalc(altitudesDeg: number[]): void {
  SunCalc.times.length = 0;
  for (const altitudeDeg of altitudesDeg)
    SunCalc.addTime(altitudeDeg, `rise${altitudeDeg}`, `set${altitudeDeg}`);
}

function oursFourAltitudes(): void {
  for (const evening of evenings) {
    const night = nightOf(evening, place);
    for (const altitudeDeg of ALTITUDES_DEG) kept.sum += darkSpellIn(night, altitudeDeg).duskAt ?? 0;
  }
}

function oursOneAltitude(): void {
  for (const evening of evenings) kept.sum += darkSpell(evening, place, -6).duskAt ?? 0;
}

function suncalcYear(): void {
  for (const date of dates) {
    kept.sum += Number(SunCalc.getTimes(date, place.latitudeDeg, place.longitudeDeg)['set-6']);
  }
}

function cpuNsPerCrossing(year: () => void, crossings: number): number {
  for (let round = 0; round < 50; round += 1) year();
  const runs = Array.from({ length: 9 }, () => {
    const before = process.cpuUsage().user;
    for (let round = 0; round < 40; round += 1) year();
    return ((process.cpuUsage().user - before) * 1000) / (40 * crossings);
  });
  return runs.sort((a, b) => a - b)[4]!;
}

// Suncalc's nearest answer of three days is taken, so that only its exactness counts, not its naming of days.
function suncalcAt(
  day: string,
  altitudeDeg: number,
  at: { expectedAt: number; side: string; latitudeDeg: number; longitudeDeg: number },
): number {
  const noonAt = Date.parse(`${day}T12:00:00Z`);
  const apart = [-1, 0, 1, 2].map((days) => {
    const times = SunCalc.getTimes(new Date(noonAt + days * 86_400_000), at.latitudeDeg, at.longitudeDeg);
    const time = times[`${at.side}${altitudeDeg}`];
    return time instanceof Date ? Math.abs(Number(time) - at.expectedAt) / 1000 : Infinity;
  });
  return Math.min(...apart);
}

function printErrors(): void {
  setSuncalc(ALTITUDES_DEG);
  const ours: number[] = [];
  const theirs: number[] = [];
  let theirsMissing = 0;
  for (const { place: site, evening, altitudeDeg, dusk, dawn } of tableNights()) {
    const spell = darkSpell(evening, site, altitudeDeg);
    for (const [side, text, at] of [
      ['set', dusk, spell.duskAt],
      ['rise', dawn, spell.dawnAt],
    ] as const) {
      if (!text.endsWith('Z')) continue;
      const expectedAt = Date.parse(text);
      ours.push(Math.abs(at! - expectedAt) / 1000);
      const apart = suncalcAt(evening, altitudeDeg, { ...site, expectedAt, side });
      if (apart < 3600) theirs.push(apart);
      else theirsMissing += 1;
    }
  }
  const line = (name: string, seconds: number[]) =>
    `${name}: mean ${(seconds.reduce((a, b) => a + b, 0) / seconds.length).toFixed(2)} s, max ${Math.max(...seconds).toFixed(2)} s over ${seconds.length} crossings`;
  console.log(
    `against the ephemerides' table\n  ${line('ours', ours)}\n  ${line('suncalc', theirs)}, ${theirsMissing} missing`,
  );
}

function printSpeed(): void {
  const four = {
    ours: cpuNsPerCrossing(oursFourAltitudes, 365 * 8),
    suncalc: cpuNsPerCrossing(suncalcYear, 365 * 8),
  };
  setSuncalc([-6]);
  const one = {
    ours: cpuNsPerCrossing(oursOneAltitude, 365 * 2),
    suncalc: cpuNsPerCrossing(suncalcYear, 365 * 2),
  };
  for (const [name, { ours, suncalc }] of Object.entries({
    'four altitudes a night': four,
    'one altitude a night': one,
  })) {
    console.log(
      `${name}: ours ${ours.toFixed(0)} ns a crossing, suncalc ${suncalc.toFixed(0)} ns, ${(suncalc / ours).toFixed(1)} times as fast`,
    );
  }
}

/** Exactness against the ephemerides' table and CPU time per crossing, beside suncalc 2 from npm. */
export function benchSun(): void {
  printErrors();
  printSpeed();
}
