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
export type Asked = { prop: Prop; asOf: Instant; season: Season; wanted: Wanted };

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
  const lit = litEvening(asked.prop.switching, {
    evening,
    place: asked.season.place,
    showNight: asked.season.showNights.get(evening) ?? null,
    poweredSinceAt: projection.set.fittedAt,
  });
  const goneHours = lit.spells.reduce(
    (hours, spell) => hours + Math.max(0, Math.min(asked.asOf, spell.untilAt) - spell.fromAt) / HOUR_MS,
    0,
  );
  const elapsed = (asked.asOf - span.startAt) / (span.endAt - span.startAt);
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

/** Swap at once when somebody has seen this set dim or dark; else as the chances say. */
export function swapByFor(projection: PropProjection, wanted: Wanted): Evening | null {
  const seen = projection.set.lastSeen?.seen;
  if (seen === 'dim' || seen === 'dark') return wanted.today;
  return swapByOf(courseOf(projection), wanted);
}

/** The part of a projection that decides what is needed. */
export function courseOf({ from, chanceBright, schedule, start }: PropProjection): ChanceCourse {
  return {
    from,
    evenings: schedule.count - start,
    chanceBright,
    showNight: (n) => schedule.showNight[start + n]!,
  };
}

/** Everything about one prop: ranges, chances by night, and the sum behind them. */
export function propForecast(asked: Asked, outcome: PropProjection | NotProjected): PropForecast {
  const { prop, asOf, wanted } = asked;
  if (!isProjected(outcome)) return withoutProjection(asked, outcome);
  const { dimShares } = outcome;
  const today = todayIn(outcome, wanted.today);
  const usedMah = usedMahAt(outcome, asked);
  const tonightMah = usableMahOn(outcome, today);
  const dim = rangeOf(outcome.from, outcome.chanceBright);
  return {
    propId: prop.id,
    asOf,
    fittedAt: outcome.set.fittedAt,
    cellTypeId: outcome.set.cellTypeId,
    usedMah,
    usedShare: dimShares.usableMahAt(20) > 0 ? usedMah / dimShares.usableMahAt(20) : 1,
    usableMah: { at20C: dimShares.usableMahAt(20), tonight: tonightMah },
    dim,
    dark: rangeOf(outcome.from, outcome.chanceLit),
    swapBy: swapByFor(outcome, wanted),
    cause: causeOf(outcome, dim),
    drainFactor: drainFactorRange(outcome.belief),
    nights: nightsOf(asked, outcome),
    why: whyOf(asked, outcome, today),
  };
}

function nightsOf({ season }: Asked, projection: PropProjection): ForecastNight[] {
  const { depletion, from, schedule, start } = projection;
  return Array.from({ length: depletion.count }, (_, n) => {
    const evening = addEvenings(from, n);
    const weather = eveningWeather(season.weather, evening);
    return {
      evening,
      litHours: depletion.litHours[n]!,
      usedMah: depletion.usedMah[n]!,
      usableMah: usableMahOn(projection, n),
      chanceBright: projection.chanceBright[n]!,
      chanceLit: projection.chanceLit[n]!,
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
    meanMa: load.meanMa,
    standbyMa: load.standbyMa,
    litHoursTonight: litHours,
    mahTonight: depletion.eveningMah[today]!,
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
      mahTonight: 0,
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
