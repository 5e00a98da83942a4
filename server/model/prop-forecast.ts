import { type Belief, chanceBelow, priorBelief } from './belief.ts';
import { type CellSet, coldSpread, dailyLossOf, labelMah, type UsableShares, usableShares } from './cell.ts';
import { CELL_KINDS } from './cell-kinds.ts';
import type { CellType } from './cell-type.ts';
import { type Depletion, deplete, limitAt } from './depletion.ts';
import { drawDownOf } from './draw-down.ts';
import { addEvenings, type Evening, eveningOf, eveningsBetween, type Instant } from './evening.ts';
import type { EveningRange } from './forecast.ts';
import { type ReckonedLoad, reckonLoad } from './load.ts';
import type { LogEntry } from './log-entry.ts';
import type { Prop } from './prop.ts';
import { type Schedule, type Season, scheduleOf } from './schedule.ts';
import { type SetInUse, setInUse } from './set-in-use.ts';
import type { Switching } from './switching.ts';

/** Schedules of a site by switching, so that props lit alike share one. Lives as long as one season's forecast. */
export type ScheduleShelf = Map<string, Schedule>;

/** A prop's set, followed from the evening it went in to the end of the season, with chances. */
export type PropProjection = {
  set: SetInUse;
  cellSet: CellSet;
  load: ReckonedLoad;
  stopVolts: number;
  offsetC: number;
  from: Evening;
  depletion: Depletion;
  dimShares: UsableShares;
  darkShares: UsableShares;
  rateMa: number;
  belief: Belief;
  leftAtStartShare: number;
  /** Chance bright on this and every earlier evening; chance lit on this evening. By evenings since `from`. */
  chanceBright: number[];
  chanceLit: number[];
  schedule: Schedule;
  start: number;
  firstEvening: Schedule;
  defaults: string[];
};

/** Why a prop cannot be projected. */
export type NotProjected = { reason: 'no-set' | 'no-draw' | 'set-too-old'; set: SetInUse | null };

export type PropQuestion = {
  prop: Prop;
  /** Entries of the prop, oldest first, undone ones left out. */
  log: readonly LogEntry[];
  /** The type of the cells in use; null when it is no longer known. */
  cellTypeOf(id: string): CellType | null;
  zoneOffsetC: number;
  season: Season;
  asOf: Instant;
  shelf: ScheduleShelf;
  /** Follow it to the end of the season, or only until it is surely spent (enough for its line in a list). */
  wholeSeason: boolean;
};

/**
 * Projects one prop: what it draws, when it is lit, what its cells give in the cold, and with what chance it is
 * still bright on each evening. Not valid for evenings outside the season's prepared weather.
 */
export function projectProp(question: PropQuestion): PropProjection | NotProjected {
  const { prop, season } = question;
  const set = setInUse(prop, question.log, question.asOf);
  if (!set) return { reason: 'no-set', set };
  const type = question.cellTypeOf(set.cellTypeId);
  if (!type) return { reason: 'no-set', set };
  const cellSet: CellSet = {
    type,
    series: prop.series,
    parallel: prop.parallel,
    healthShare: set.healthShare,
  };
  const load = reckonLoad(prop.load, {
    nominalVolts: type.nominalVolts * prop.series,
    dimVolts: prop.dimVolts,
    waits: waitsForSomething(prop),
  });
  if (load.meanMa === null && !prop.trips && load.standbyMa === 0) return { reason: 'no-draw', set };
  const from = eveningOf(set.fittedAt, season.place.timeZone);
  if (eveningsBetween(season.from, from) < 0) return { reason: 'set-too-old', set };
  const { schedule, start, firstEvening } = scheduleFor(question, set, from);
  const leftAtStartShare = set.leftShare ?? 0.5;
  const meanMa = load.meanMa ?? 0;
  const mahPerTrip = prop.trips ? (prop.trips.runMa * prop.trips.seconds) / 3600 : 0;
  const demand = {
    rateMa: typicalCurrentMa(prop, load, schedule),
    peakMa: Math.max(load.peakMa, prop.trips?.runMa ?? 0),
  };
  const stopVolts = prop.stopVolts ?? defaultStopVolts(prop, type);
  const dimShares = usableShares(cellSet, demand, prop.dimVolts);
  const darkShares = usableShares(cellSet, demand, Math.min(stopVolts, prop.dimVolts));
  const offsetC = question.zoneOffsetC + (prop.offsetC ?? 0);
  const belief = priorBelief({
    kind: type.kind,
    load,
    leftShare: leftAtStartShare,
    leftShareKnown: set.leftShare !== null,
  });
  const depletion = deplete({
    schedule,
    start,
    firstEvening,
    offsetC,
    drawDown: drawDownOf(cellSet, load, dimShares),
    dim: dimShares,
    dark: darkShares,
    meanMa,
    standbyMa: load.standbyMa,
    mahPerTrip,
    usedAtStartMah: (1 - leftAtStartShare) * labelMah(cellSet) * set.healthShare,
    selfDischargeMah: dailyLossOf(cellSet),
    spread: belief.spread,
    untilSpent: !question.wholeSeason,
  });
  const defaults = [
    ...load.defaults,
    ...(prop.stopVolts === undefined ? ['stopVolts'] : []),
    ...(set.leftShare === null ? ['leftShare'] : []),
    ...switchingDefaults(prop),
  ];
  return {
    set,
    cellSet,
    load,
    stopVolts,
    offsetC,
    from,
    depletion,
    dimShares,
    darkShares,
    rateMa: demand.rateMa,
    belief,
    leftAtStartShare,
    schedule,
    start,
    firstEvening,
    defaults,
    ...chancesOf({ depletion, schedule, start, cellSet, belief }),
  };
}

function waitsForSomething(prop: Prop): boolean {
  return (
    prop.trips !== undefined ||
    prop.switching.kind === 'light-sensor' ||
    prop.switching.kind === 'interval-timer'
  );
}

function switchingDefaults({ switching }: Prop): string[] {
  if (switching.kind !== 'light-sensor') return [];
  const { onLux, onAltitudeDeg, skyShare } = switching;
  const byLux = onAltitudeDeg === undefined;
  return [
    ...(byLux && onLux === undefined ? ['switching.onAltitudeDeg'] : []),
    ...(byLux && onLux !== undefined && skyShare === undefined ? ['switching.skyShare'] : []),
  ];
}

/** The lower of the prop's dim volts and the volts below which one stops with these cells. */
function defaultStopVolts(prop: Prop, type: CellType): number {
  return Math.min(prop.dimVolts, CELL_KINDS[type.kind].practicalStopVolts * type.cellsInside * prop.series);
}

function scheduleFor(question: PropQuestion, set: SetInUse, from: Evening) {
  const { prop, season, shelf } = question;
  const { trips } = prop;
  const { switching, since } = startedBy(prop, set);
  const key = JSON.stringify([switching, trips ?? null, since]);
  let schedule = shelf.get(key);
  if (!schedule) {
    const wholeFrom = Number.isFinite(since) ? from : season.from;
    schedule = scheduleOf(season, { switching, trips, from: wholeFrom, through: season.through, since });
    shelf.set(key, schedule);
  }
  const firstEvening = scheduleOf(season, { switching, trips, from, through: from, since: set.fittedAt });
  return { schedule, start: eveningsBetween(schedule.from, from), firstEvening };
}

/** An interval timer starts again whenever its cells are out; the others do not care, so props lit alike share. */
function startedBy({ switching }: Prop, set: SetInUse): { switching: Switching; since: Instant } {
  if (switching.kind !== 'interval-timer') return { switching, since: Number.NEGATIVE_INFINITY };
  const setAt = Math.max(switching.setAt ?? set.poweredAt, set.poweredAt);
  return { switching: { ...switching, setAt }, since: set.fittedAt };
}

/**
 * The current at which a set's charge is mostly taken, mA: each part of a season's draw weighted by its charge.
 * Ours: a trip prop's rate is that of its runs, not of the hours it waits.
 */
function typicalCurrentMa(prop: Prop, load: ReckonedLoad, { total }: Schedule): number {
  const meanMa = load.meanMa ?? 0;
  const { runMa = 0, seconds = 0 } = prop.trips ?? {};
  const parts = [
    { ma: meanMa, mah: meanMa * total.litHours },
    { ma: load.standbyMa, mah: load.standbyMa * (total.poweredHours - total.litHours) },
    { ma: runMa, mah: (total.trips * runMa * seconds) / 3600 },
  ];
  const totalMah = parts.reduce((sum, { mah }) => sum + mah, 0);
  return totalMah > 0 ? parts.reduce((sum, { ma, mah }) => sum + ma * mah, 0) / totalMah : meanMa;
}

/** A threshold this many spreads from the likely draw is certain. */
const CERTAIN_SPREADS = 6;
/** The widest a threshold's own spread gets: beyond it the cold tables say nothing. */
const WIDEST_THRESHOLD_SPREAD = 0.5;

/**
 * Chances from thresholds: the drain factor's belief, widened on each evening by what the night's own temperature
 * may turn out to be and by how well the cold table is known there.
 */
function chancesOf(
  of: Pick<PropProjection, 'depletion' | 'schedule' | 'start' | 'cellSet' | 'belief'>,
): Pick<PropProjection, 'chanceBright' | 'chanceLit'> {
  const { depletion, schedule, start, belief } = of;
  const chanceBright: number[] = [];
  const chanceLit: number[] = [];
  const certain = Math.exp(CERTAIN_SPREADS * (belief.spread + WIDEST_THRESHOLD_SPREAD));
  let sofar = 1;
  for (let n = 0; n < depletion.count; n += 1) {
    const brightBelow = depletion.brightBelow[n]!;
    if (brightBelow > certain) {
      chanceBright.push(sofar);
      chanceLit.push(1);
      continue;
    }
    const spread = nightSpread(of, depletion.decidingC[n]!, schedule.nightSigmaC[start + n]!);
    sofar = Math.min(sofar, chanceBelow(belief, brightBelow, spread));
    chanceBright.push(sofar);
    chanceLit.push(Math.max(sofar, chanceBelow(belief, depletion.litBelow[n]!, spread)));
  }
  return { chanceBright, chanceLit };
}

/** Spread of the logarithm of a threshold on a night of this temperature and uncertainty. */
function nightSpread(
  { cellSet, depletion }: Pick<PropProjection, 'cellSet' | 'depletion'>,
  tempC: number,
  sigmaC: number,
): number {
  const colder = limitAt(depletion.limits.dim, tempC - sigmaC);
  const milder = limitAt(depletion.limits.dim, tempC + sigmaC);
  const byWeather = milder > 0 ? (milder - colder) / (milder + colder) : 0;
  const byTable = coldSpread(cellSet, tempC);
  return Math.min(WIDEST_THRESHOLD_SPREAD, Math.sqrt(byWeather ** 2 + byTable ** 2));
}

/**
 * The 80 % range of the first evening on which a falling chance has gone: early when one in ten is, likely when
 * half are, late when nine in ten are. null = not within the evenings looked at.
 */
export function rangeOf(from: Evening, chance: ArrayLike<number>): EveningRange {
  let sofar = 1;
  let n = 0;
  const firstBelow = (level: number): Evening | null => {
    while (n < chance.length) {
      sofar = Math.min(sofar, chance[n]!);
      if (sofar < level) return addEvenings(from, n);
      n += 1;
    }
    return null;
  };
  return { early: firstBelow(0.9), likely: firstBelow(0.5), late: firstBelow(0.1) };
}
