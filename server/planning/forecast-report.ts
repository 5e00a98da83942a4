import { drainFactorRange } from '../model/belief.ts';
import { COURSE_WORDS } from '../model/depletion.ts';
import {
  addEvenings,
  type Evening,
  eveningOf,
  eveningSpan,
  eveningsBetween,
  HOUR_MS,
  type Instant,
  latestOf,
} from '../model/evening.ts';
import type { EveningRange, ForecastNight, PropForecast, Why } from '../model/forecast.ts';
import type { Prop } from '../model/prop.ts';
import { type NotProjected, type PropProjection, rangeOf } from '../model/prop-forecast.ts';
import type { Season } from '../model/schedule.ts';
import { litEvening } from '../model/switching.ts';
import { notProjectedWarning, warningsOf } from '../model/warnings.ts';
import { eveningWeather } from '../model/weather.ts';
import { type ChanceCourse, swapByOf, type Wanted } from './need.ts';

/** The question a forecast answers: which prop, as of when, and what matters to its site. */
export type Asked = {
  prop: Prop;
  asOf: Instant;
  season: Season;
  wanted: Wanted;
  /** Last evening of the nights wanted; the site's last when absent. */
  through?: Evening;
};

const NEVER: EveningRange = { early: null, likely: null, late: null };

/** Whether a prop could be projected at all. */
export function isProjected(outcome: PropProjection | NotProjected): outcome is PropProjection {
  return 'depletion' in outcome;
}

/** Today's place among a projection's evenings; the last one when today is past them all. */
function todayIn(projection: PropProjection, today: Evening): number {
  const n = eveningsBetween(projection.from, today);
  return Math.min(Math.max(n, 0), projection.depletion.count - 1);
}

/**
 * Charge used by the likely course at a moment, mAh: whole evenings, and of tonight the share of its lit hours
 * that has gone (of its whole length where it is not lit).
 */
export function usedMahAt(projection: PropProjection, asked: Asked): number {
  const { depletion } = projection;
  const { timeZone } = asked.season.place;
  const n = todayIn(projection, eveningOf(asked.asOf, timeZone));
  const evening = addEvenings(projection.from, n);
  const before = n === 0 ? startMah(projection) : depletion.usedMah[n - 1]!;
  const span = eveningSpan(evening, timeZone);
  const lit = litEvening(projection.lighting.switching, {
    evening,
    place: asked.season.place,
    showNight: asked.season.showNights.get(evening) ?? null,
    poweredSinceAt: projection.set.fittedAt,
  });
  const goneHours = lit.spells.reduce(
    (hours, spell) => hours + Math.max(0, Math.min(asked.asOf, spell.untilAt) - spell.fromAt) / HOUR_MS,
    0,
  );
  const since = Math.max(span.startAt, projection.set.fittedAt);
  const elapsed = (asked.asOf - since) / Math.max(1, span.endAt - since);
  const share = lit.litHours > 0 ? goneHours / lit.litHours : elapsed;
  return before + (depletion.usedMah[n]! - before) * Math.min(1, Math.max(0, share));
}

function startMah({ cellSet, leftAtStartShare, dimShares }: PropProjection): number {
  return (1 - leftAtStartShare) * dimShares.capacityMah * cellSet.healthShare;
}

/** Usable charge down to the dim point at the moment of an evening that decides, mAh. */
function usableMahOn({ depletion, dimShares }: PropProjection, n: number): number {
  return dimShares.usableMahAt(depletion.decidingC[n]!);
}

/** Share of tonight's usable charge that is left by the likely course, 0..1. */
export function leftShareAt(projection: PropProjection, asked: Asked): number {
  const usableMah = usableMahOn(projection, todayIn(projection, asked.wanted.today));
  if (usableMah <= 0) return 0;
  return Math.min(1, Math.max(0, 1 - usedMahAt(projection, asked) / usableMah));
}

/** 'cold' when the likely dim evening would have been bright, and the next one too, had the night been mild. */
export function causeOf(projection: PropProjection, dim: EveningRange): 'used-up' | 'cold' | null {
  if (dim.likely === null) return null;
  const n = eveningsBetween(projection.from, dim.likely);
  return projection.depletion.dimByCold[n] ? 'cold' : 'used-up';
}

/** As the chances say, but at once where somebody has seen this set fail and an evening that counts is to come. */
export function swapByFor(projection: PropProjection, wanted: Wanted): Evening | null {
  const swapBy = swapByOf(courseOf(projection), wanted);
  return swapBy !== null && projection.set.failing ? wanted.today : swapBy;
}

/** The part of a projection that decides what is needed. */
export function courseOf({ from, brightOn, schedule, start }: PropProjection): ChanceCourse {
  return {
    from,
    evenings: schedule.count - start,
    brightOn,
    showNight: (n) => schedule.showNight[start + n]!,
  };
}

/** The ranges of going dim and dark from tonight on: what was before has been, and a swap mends only what comes. */
export function rangesOf(
  projection: PropProjection,
  { wanted, season }: Asked,
): { dim: EveningRange; dark: EveningRange } {
  const { from } = projection;
  const first = Math.max(0, eveningsBetween(from, wanted.today));
  const evenings = Math.max(first, eveningsBetween(from, season.closes)) + 1;
  const range = (chances: number[]) =>
    rangeOf({ from, first, evenings, chanceOn: (n) => chances[Math.min(n, chances.length - 1)]! });
  return { dim: range(projection.brightOn), dark: range(projection.litOn) };
}

/** Everything about one prop: ranges, chances by night, and the sum behind them. */
export function propForecast(asked: Asked, outcome: PropProjection | NotProjected): PropForecast {
  const { prop, asOf, wanted } = asked;
  if (!isProjected(outcome)) return withoutProjection(asked, outcome);
  const { dimShares } = outcome;
  const today = todayIn(outcome, wanted.today);
  const usedMah = usedMahAt(outcome, asked);
  const tonightMah = usableMahOn(outcome, today);
  const { dim, dark } = rangesOf(outcome, asked);
  return {
    propId: prop.id,
    asOf,
    fittedAt: outcome.set.fittedAt,
    cellTypeId: outcome.set.cellTypeId,
    usedMah,
    usedShare: dimShares.usableMahAt(20) > 0 ? usedMah / dimShares.usableMahAt(20) : 1,
    usableMah: { at20C: dimShares.usableMahAt(20), tonight: tonightMah },
    dim,
    dark,
    swapBy: swapByFor(outcome, wanted),
    cause: causeOf(outcome, dim),
    drainFactor: drainFactorRange(outcome.belief),
    nights: nightsOf(asked, outcome),
    why: whyOf(asked, outcome, today),
  };
}

/**
 * The nights since the set went in. `chanceBright` of an evening to come counts from tonight on, that of one gone by
 * from the evening the set went in.
 */
function nightsOf({ season, wanted, through }: Asked, projection: PropProjection): ForecastNight[] {
  const { depletion, from, schedule, start } = projection;
  const today = eveningsBetween(from, wanted.today);
  const last = through ?? latestOf(season.closes, wanted.today);
  const count = Math.min(depletion.count, eveningsBetween(from, last) + 1);
  let sofar = 1;
  return Array.from({ length: Math.max(0, count) }, (_, n) => {
    const evening = addEvenings(from, n);
    const weather = eveningWeather(season.weather, evening);
    sofar = Math.min(n === today ? 1 : sofar, projection.brightOn[n]!);
    return {
      evening,
      litHours: depletion.litHours[n]!,
      usedMah: depletion.usedMah[n]!,
      usableMah: usableMahOn(projection, n),
      chanceBright: sofar,
      chanceLit: projection.litOn[n]!,
      meanC: weather.meanC + projection.offsetC,
      weather: weather.source,
      showNight: schedule.showNight[start + n]!,
      likely: COURSE_WORDS[depletion.likely[n]!]!,
    };
  });
}

function whyOf({ prop }: Asked, projection: PropProjection, today: number): Why {
  const { depletion, dimShares, load } = projection;
  const tonightC = depletion.decidingC[today]!;
  const litHours = depletion.litHours[today]!;
  return {
    meanMa: load.meanMa === null ? null : load.meanMa * depletion.drawShare[today]!,
    standbyMa: load.standbyMa,
    litHoursTonight: litHours,
    tripMahTonight: depletion.tripMah[today]!,
    mahTonight: depletion.eveningMah[today]!,
    rateMa: projection.rateMa,
    capacityMah: dimShares.capacityMah,
    coldShare: dimShares.coldShareAt(tonightC),
    rateShare: dimShares.rateShare,
    cutOffShare: dimShares.cutOffShare,
    weakestShare: dimShares.weakestShare,
    healthShare: dimShares.healthShare,
    leftAtStartShare: projection.leftAtStartShare,
    tonightC,
    defaults: projection.defaults,
    warnings: warningsOf(prop, projection),
  };
}

function withoutProjection({ prop, asOf }: Asked, outcome: NotProjected): PropForecast {
  return {
    propId: prop.id,
    asOf,
    fittedAt: outcome.set?.fittedAt ?? null,
    cellTypeId: outcome.set?.cellTypeId ?? prop.cellTypeId,
    usedMah: null,
    usedShare: null,
    usableMah: null,
    dim: NEVER,
    dark: NEVER,
    swapBy: null,
    cause: null,
    drainFactor: { low: 1, likely: 1, high: 1 },
    nights: [],
    why: {
      meanMa: prop.load.meanMa ?? null,
      standbyMa: prop.load.standbyMa,
      litHoursTonight: 0,
      tripMahTonight: 0,
      mahTonight: 0,
      rateMa: 0,
      capacityMah: 0,
      coldShare: 1,
      rateShare: 1,
      cutOffShare: 1,
      weakestShare: 1,
      healthShare: 1,
      leftAtStartShare: 1,
      tonightC: 20,
      defaults: [],
      warnings: [notProjectedWarning(prop, outcome)],
    },
  };
}
