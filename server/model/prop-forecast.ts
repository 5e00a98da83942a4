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
  /** Current for which the rate share was looked up, mA. */
  rateMa: number;
  belief: Belief;
  leftAtStartShare: number;
  /** Chance of being bright, and lit, on each evening taken by itself; by evenings since `from`. */
  brightOn: number[];
  litOn: number[];
  schedule: Schedule;
  start: number;
  /** What lights it and since when, as its schedule has it. */
  lighting: { switching: Switching; since: Instant };
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
  if (!load.meanMa && !prop.trips) return { reason: 'no-draw', set };
  const from = eveningOf(set.fittedAt, season.place.timeZone);
  if (eveningsBetween(season.from, from) < 0) return { reason: 'set-too-old', set };
  const { schedule, start, firstEvening, lighting } = scheduleFor(question, set, from);
  const leftAtStartShare = set.leftShare ?? 0.5;
  const meanMa = load.meanMa ?? 0;
  const mahPerTrip = prop.trips ? (prop.trips.runMa * prop.trips.seconds) / 3600 : 0;
  const demand = {
    rateMa: typicalCurrentMa(prop, load, { schedule, start, closes: season.closes }),
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
    lighting,
    defaults,
    ...chancesOf({ depletion, schedule, start, cellSet, belief, set, from }, season.place.timeZone),
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
  const lighting = startedBy(prop, set);
  const { switching, since } = lighting;
  const key = JSON.stringify([switching, trips ?? null, since]);
  let schedule = shelf.get(key);
  if (!schedule) {
    const wholeFrom = Number.isFinite(since) ? from : season.from;
    schedule = scheduleOf(season, { switching, trips, from: wholeFrom, through: season.through, since });
    shelf.set(key, schedule);
  }
  const firstEvening = scheduleOf(season, { switching, trips, from, through: from, since: set.fittedAt });
  return { schedule, start: eveningsBetween(schedule.from, from), firstEvening, lighting };
}

/** An interval timer starts again whenever its cells are out; the others do not care, so props lit alike share. */
function startedBy({ switching }: Prop, set: SetInUse): { switching: Switching; since: Instant } {
  if (switching.kind !== 'interval-timer') return { switching, since: Number.NEGATIVE_INFINITY };
  const setAt = Math.max(switching.setAt ?? set.poweredAt, set.poweredAt);
  return { switching: { ...switching, setAt }, since: set.fittedAt };
}

/**
 * The current at which a set's charge is mostly taken, mA: each part of its draw, from the evening it went in to the
 * site's last, weighted by its charge. Ours: a trip prop's rate is that of its runs, not of the hours it waits.
 */
function typicalCurrentMa(
  prop: Prop,
  load: ReckonedLoad,
  of: { schedule: Schedule; start: number; closes: Evening },
): number {
  const { schedule, start } = of;
  const closesAt = eveningsBetween(schedule.from, of.closes) + 1;
  const end = closesAt > start ? Math.min(closesAt, schedule.count) : schedule.count;
  let [litHours, poweredHours, trips] = [0, 0, 0];
  for (let i = start; i < end; i += 1) {
    litHours += schedule.litHours[i]!;
    poweredHours += schedule.poweredHours[i]!;
    trips += schedule.trips[i]!;
  }
  const meanMa = load.meanMa ?? 0;
  const { runMa = 0, seconds = 0 } = prop.trips ?? {};
  const litMah = meanMa * litHours;
  const waitMah = load.standbyMa * (poweredHours - litHours);
  const tripMah = (trips * runMa * seconds) / 3600;
  const totalMah = litMah + waitMah + tripMah;
  if (totalMah === 0) return Math.max(meanMa, runMa);
  return (meanMa * litMah + load.standbyMa * waitMah + runMa * tripMah) / totalMah;
}

/** A threshold this many spreads from the likely draw is certain. */
const CERTAIN_SPREADS = 6;
/** The widest a threshold's own spread gets: beyond it the cold tables say nothing. */
const WIDEST_THRESHOLD_SPREAD = 0.5;

/**
 * Chances from thresholds, each evening by itself: the drain factor's belief, widened by what the night's own
 * temperature may turn out to be and by how well the cold table is known there. From the evening somebody saw it dim
 * on (dark on) it is not bright (lit).
 */
function chancesOf(
  of: Pick<PropProjection, 'depletion' | 'schedule' | 'start' | 'cellSet' | 'belief' | 'set' | 'from'>,
  timeZone: string,
): Pick<PropProjection, 'brightOn' | 'litOn'> {
  const { depletion, schedule, start, belief, set } = of;
  const brightOn: number[] = [];
  const litOn: number[] = [];
  const failedFrom = set.failing ? eveningsBetween(of.from, eveningOf(set.failing.at, timeZone)) : Infinity;
  const certain = Math.exp(CERTAIN_SPREADS * (belief.spread + WIDEST_THRESHOLD_SPREAD));
  for (let n = 0; n < depletion.count; n += 1) {
    const brightBelow = depletion.brightBelow[n]!;
    let [bright, lit] = [1, 1];
    if (brightBelow <= certain) {
      const spread = nightSpread(of, depletion.decidingC[n]!, schedule.nightSigmaC[start + n]!);
      bright = chanceBelow(belief, brightBelow, spread);
      lit = Math.max(bright, chanceBelow(belief, depletion.litBelow[n]!, spread));
    }
    brightOn.push(n < failedFrom ? bright : 0);
    litOn.push(n < failedFrom || set.failing?.seen === 'dim' ? lit : 0);
  }
  return { brightOn, litOn };
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
 * The 80 % range of the first evening, from `first` on, on which a chance has been lost: early when one in ten is,
 * likely when half are, late when nine in ten are. null = not within the evenings looked at.
 * @param of.chanceOn chance on evening n by itself
 */
export function rangeOf(of: {
  from: Evening;
  first: number;
  evenings: number;
  chanceOn(n: number): number;
}): EveningRange {
  let sofar = 1;
  let n = of.first;
  const firstBelow = (level: number): Evening | null => {
    for (; n < of.evenings; n += 1) {
      sofar = Math.min(sofar, of.chanceOn(n));
      if (sofar < level) return addEvenings(of.from, n);
    }
    return null;
  };
  return { early: firstBelow(0.9), likely: firstBelow(0.5), late: firstBelow(0.1) };
}
