import type { UsableShares } from './cell.ts';
import { check } from './check.ts';
import type { DrawDown } from './draw-down.ts';
import type { Schedule } from './schedule.ts';

/** One set in one prop, from the evening it went in to the end of the season. */
export type SetCourse = {
  /** The shared schedule, the index in it of the evening the set went in, and that evening from that moment on. */
  schedule: Schedule;
  start: number;
  firstEvening: Schedule;
  /** K warmer or colder than the site's air. */
  offsetC: number;
  drawDown: DrawDown;
  dim: UsableShares;
  dark: UsableShares;
  meanMa: number;
  standbyMa: number;
  mahPerTrip: number;
  /** Charge already gone when it went in, mAh. */
  usedAtStartMah: number;
  /** Charge it loses by itself in one evening, by evenings since it went in. */
  selfDischargeMah(evening: number, tempC: number): number;
};

/** What happens on each evening since the set went in, by the likely course and by drain factor. */
export type Depletion = {
  count: number;
  litHours: Float64Array;
  /** Used at the end of the evening if the sum is right, mAh; it stands still while the prop is dark. */
  usedMah: Float64Array;
  /** Charge this evening takes by the likely course if the set lasts it out, mAh. */
  eveningMah: Float64Array;
  /** Air at the moment of the evening that decides (where least is left to the dim limit), offset included, °C. */
  decidingC: Float64Array;
  /** Drain factor below which it is bright, and lit, through the whole evening; Infinity where it is not lit at all. */
  brightBelow: Float64Array;
  litBelow: Float64Array;
  /** Share of the evening's lit time after which it goes dim, by the likely course; 1 = bright to the end. */
  brightShare: Float64Array;
  /** What the likely course does: an index into COURSE_WORDS. */
  likely: Uint8Array;
  /** 1 where the likely course goes dim although a mild night would have kept it bright and left a night to spare. */
  dimByCold: Uint8Array;
};

export const COURSE_WORDS = ['bright', 'dim', 'dark-cold', 'dark-used-up', 'not-lit'] as const;
const BRIGHT = 0;
const DIM = 1;
const DARK_COLD = 2;
const DARK_USED_UP = 3;
const NOT_LIT = 4;

/** A night this mild is nothing to blame the cold for. Common practice, no source. */
export const MILD_C = 10;

/** Drain factors followed side by side: 25, evenly spaced in the logarithm, from a quarter to four times the sum. */
const FACTORS = Float64Array.from({ length: 25 }, (_, g) => 2 ** ((g - 12) / 6));
const LIKELY = 12;

/**
 * Follows a set through its evenings for all drain factors at once.
 *
 * The state is the reckoned charge x, and only use moves it; the cold moves the limit X(T). A prop is bright at a
 * moment when x <= X_dim(T). Where x reaches X_dark(T) it is dark and takes nothing, so x stands still until a milder
 * moment lifts the limit: recovery needs no rule of its own. x never falls as the drain factor rises, so for each
 * evening there is one factor below which it stays bright throughout: the threshold. Between the followed factors it
 * is found along the slope of the margin X - x, which is exact as long as the prop has not been dark before.
 *
 * Ours; the model is that of an hour-by-hour sum, against which it is checked (test/bench). Moments looked at are
 * those of the schedule, at most four hours apart.
 */
export function deplete(set: SetCourse): Depletion {
  const count = set.schedule.count - set.start;
  check(count > 0, 'the set goes in after the season');
  const limits = limitTables(set);
  const arrays = () => new Float64Array(count);
  const out: Depletion = {
    count,
    litHours: arrays(),
    usedMah: arrays(),
    eveningMah: arrays(),
    decidingC: arrays(),
    brightBelow: arrays(),
    litBelow: arrays(),
    brightShare: arrays().fill(1),
    likely: new Uint8Array(count),
    dimByCold: new Uint8Array(count),
  };
  const state = new Float64Array(FACTORS.length).fill(set.drawDown.reckonedOf(set.usedAtStartMah));
  const slope = new Float64Array(FACTORS.length);
  for (let n = 0; n < count; n += 1) {
    const schedule = n === 0 ? set.firstEvening : set.schedule;
    const i = n === 0 ? 0 : set.start + n;
    const nightC = schedule.nightC[i]! + set.offsetC;
    const likelyMah = state[LIKELY]!;
    const litMah = set.meanMa * schedule.litHours[i]!;
    const otherMah =
      set.standbyMa * (schedule.poweredHours[i]! - schedule.litHours[i]!) +
      set.mahPerTrip * schedule.trips[i]! +
      set.selfDischargeMah(n, nightC);
    const drawShare = set.drawDown.drawShareAt(likelyMah);
    const eveningMah = litMah + otherMah / drawShare;
    followEvening({ set, schedule, i, n, limits, state, slope, out, eveningMah, litMah });
    out.litHours[n] = schedule.litHours[i]!;
    out.eveningMah[n] = litMah * drawShare + otherMah;
    out.usedMah[n] = set.drawDown.usedOf(state[LIKELY]!);
  }
  return out;
}

type EveningWork = {
  set: SetCourse;
  schedule: Schedule;
  i: number;
  n: number;
  limits: LimitTables;
  /** Reckoned charge by factor, and how fast it rises with the factor. */
  state: Float64Array;
  slope: Float64Array;
  out: Depletion;
  eveningMah: number;
  litMah: number;
};

/** The tightest look of an evening, by factor: the margin left and how fast it falls with the factor. */
type Tightest = { margin: Float64Array; slope: Float64Array };
const tightest = (): Tightest => ({
  margin: new Float64Array(FACTORS.length),
  slope: new Float64Array(FACTORS.length),
});
/** Reused from evening to evening, since nothing keeps them. */
const toDim = tightest();
const toDark = tightest();

function keepTightest(kept: Tightest, g: number, look: { margin: number; slope: number }): void {
  if (look.margin >= kept.margin[g]!) return;
  kept.margin[g] = look.margin;
  kept.slope[g] = look.slope;
}

function followEvening(work: EveningWork): void {
  const { set, schedule, i, n, limits, state, slope, out } = work;
  const firstCheck = schedule.checkFrom[i]!;
  const endCheck = schedule.checkFrom[i + 1]!;
  const otherMah = work.eveningMah - work.litMah;
  toDim.margin.fill(Infinity);
  toDark.margin.fill(Infinity);
  out.decidingC[n] = schedule.nightC[i]! + set.offsetC;
  let doneMah = 0;
  let least = Infinity;
  let before = Infinity;
  for (let c = firstCheck; c < endCheck; c += 1) {
    const airC = schedule.checkAirC[c]! + set.offsetC;
    const dimLimit = limits.at(limits.dim, airC);
    const darkLimit = limits.at(limits.dark, airC);
    const byNowMah = set.meanMa * schedule.checkLitHours[c]! + otherMah * schedule.checkGoneShare[c]!;
    const stepMah = byNowMah - doneMah;
    const margin = dimLimit - state[LIKELY]! - stepMah;
    for (let g = 0; g < FACTORS.length; g += 1) {
      const reached = state[g]! + FACTORS[g]! * stepMah;
      const rise = slope[g]! + stepMah;
      keepTightest(toDim, g, { margin: dimLimit - reached, slope: rise });
      keepTightest(toDark, g, { margin: darkLimit - reached, slope: rise });
      if (reached <= darkLimit) {
        state[g] = reached;
        slope[g] = rise;
      } else if (state[g]! < darkLimit) {
        state[g] = darkLimit;
        slope[g] = 0;
      }
    }
    if (margin < least) {
      least = margin;
      out.decidingC[n] = airC;
    }
    if (margin < 0 && out.brightShare[n] === 1) {
      out.brightShare[n] = brightShareAt(schedule, { c, firstCheck, endCheck, before, margin });
    }
    before = margin;
    doneMah = byNowMah;
  }
  const restMah = work.eveningMah - doneMah;
  for (let g = 0; g < FACTORS.length; g += 1) {
    if (toDark.margin[g]! < 0) continue;
    state[g] = state[g]! + FACTORS[g]! * restMah;
    slope[g] = slope[g]! + restMah;
  }
  out.brightBelow[n] = thresholdOf(toDim);
  out.litBelow[n] = thresholdOf(toDark);
  if (endCheck === firstCheck) out.likely[n] = NOT_LIT;
  else tellLikely(work, least);
}

/** Share of the evening's looks that had passed when the margin ran out between look c - 1 and look c. */
function brightShareAt(
  schedule: Schedule,
  at: { c: number; firstCheck: number; endCheck: number; before: number; margin: number },
): number {
  if (at.before === Infinity) return 0;
  const part = at.before / (at.before - at.margin);
  const whole = schedule.checkLitHours[at.endCheck - 1]!;
  if (whole === 0) return (at.c - 1 - at.firstCheck + part) / (at.endCheck - 1 - at.firstCheck);
  const from = schedule.checkLitHours[at.c - 1]!;
  return (from + (schedule.checkLitHours[at.c]! - from) * part) / whole;
}

function tellLikely({ limits, state, out, n, eveningMah }: EveningWork, least: number): void {
  const cold = out.decidingC[n]! < MILD_C;
  const atMah = limits.at(limits.dim, out.decidingC[n]!) - least;
  out.dimByCold[n] = least < 0 && cold && atMah + eveningMah <= limits.at(limits.dim, MILD_C) ? 1 : 0;
  const darkByCold = cold && state[LIKELY]! + eveningMah <= limits.at(limits.dark, MILD_C);
  if (toDark.margin[LIKELY]! < 0) out.likely[n] = darkByCold ? DARK_COLD : DARK_USED_UP;
  else out.likely[n] = least < 0 ? DIM : BRIGHT;
}

/**
 * Factor at which the margin runs out: from the highest followed factor that still has one, along its slope. Exact
 * as long as a prop between that factor and the threshold has been dark on the same evenings.
 */
function thresholdOf({ margin, slope }: Tightest): number {
  const last = FACTORS.length - 1;
  if (margin[0] === Infinity) return Infinity;
  let g = 0;
  while (g < last && margin[g + 1]! >= 0) g += 1;
  if (slope[g]! <= 0) return margin[g]! >= 0 ? Infinity : 0;
  return Math.max(0, FACTORS[g]! + margin[g]! / slope[g]!);
}

type LimitTables = { dim: Float64Array; dark: Float64Array; at(table: Float64Array, tempC: number): number };

const TABLE_FROM_C = -40;
const TABLE_STEP_C = 2;
const TABLE_SIZE = 46;

/** Reckoned charge at which the set is dim, and dark, every 2 K: the steps fall on the corners of the cold tables. */
function limitTables(set: SetCourse): LimitTables {
  const table = (usable: UsableShares) =>
    Float64Array.from({ length: TABLE_SIZE }, (_, k) =>
      set.drawDown.reckonedOf(usable.usableMahAt(TABLE_FROM_C + k * TABLE_STEP_C)),
    );
  return {
    dim: table(set.dim),
    dark: table(set.dark),
    at(values, tempC) {
      const place = Math.min(TABLE_SIZE - 1.001, Math.max(0, (tempC - TABLE_FROM_C) / TABLE_STEP_C));
      const k = Math.floor(place);
      return values[k]! + (values[k + 1]! - values[k]!) * (place - k);
    },
  };
}
