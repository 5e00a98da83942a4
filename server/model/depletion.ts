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
  /** Standard deviation of the logarithm of the drain factor: how far apart factors are followed. */
  spread: number;
};

/** What happens on each evening since the set went in, by the likely course and by drain factor. */
export type Depletion = {
  count: number;
  limits: LimitTables;
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

/**
 * Drain factors followed side by side: nine, one spread of the belief apart. Beyond four spreads a threshold decides
 * nothing that is ever shown.
 */
const COUNT = 9;
const LIKELY = 4;

/**
 * Follows a set through its evenings for all drain factors at once.
 *
 * The state is the reckoned charge x, and only use moves it; the cold moves the limit X(T). A prop is bright at a
 * moment when x <= X_dim(T). Where x reaches X_dark(T) it is dark and takes nothing, so x stands still until a milder
 * moment lifts the limit: recovery needs no rule of its own. x never falls as the drain factor rises, so for each
 * evening there is one factor below which it stays bright throughout: the threshold. Between the followed factors it
 * is found along the slope of the margin X - x, which is exact as long as the prop has not been dark before.
 *
 * Ours; the model is that of an hour-by-hour sum, against which it is checked (test/model, test/bench). Moments looked
 * at are those of the schedule, at most four hours apart.
 */
export function deplete(set: SetCourse): Depletion {
  const count = set.schedule.count - set.start;
  check(count > 0, 'the set goes in after the season');
  const row = rowsOf(7, count);
  const out: Depletion = {
    count,
    limits: limitTables(set),
    litHours: row(0),
    usedMah: row(1),
    eveningMah: row(2),
    decidingC: row(3),
    brightBelow: row(4),
    litBelow: row(5),
    brightShare: row(6).fill(1),
    likely: new Uint8Array(count),
    dimByCold: new Uint8Array(count),
  };
  const followed = followedFrom(set.drawDown.reckonedOf(set.usedAtStartMah), set.spread);
  for (let n = 0; n < count; n += 1) {
    const schedule = n === 0 ? set.firstEvening : set.schedule;
    const i = n === 0 ? 0 : set.start + n;
    const litMah = set.meanMa * schedule.litHours[i]!;
    const otherMah =
      set.standbyMa * (schedule.poweredHours[i]! - schedule.litHours[i]!) +
      set.mahPerTrip * schedule.trips[i]! +
      set.selfDischargeMah(n, schedule.nightC[i]! + set.offsetC);
    const drawShare = set.drawDown.drawShareAt(followed.x[LIKELY]!);
    followEvening({ set, schedule, i, n, followed, out, litMah, otherMah: otherMah / drawShare });
    out.litHours[n] = schedule.litHours[i]!;
    out.eveningMah[n] = litMah * drawShare + otherMah;
    out.usedMah[n] = set.drawDown.usedOf(followed.x[LIKELY]!);
  }
  return out;
}

/** Rows of numbers in one piece of memory: a site has thousands of them, and each piece costs. */
function rowsOf(rows: number, length: number): (index: number) => Float64Array {
  const block = new Float64Array(rows * length);
  return (index) => block.subarray(index * length, (index + 1) * length);
}

/** By drain factor: reckoned charge and how fast it rises with the factor; and of one evening the tightest margins. */
type Followed = {
  factor: Float64Array;
  x: Float64Array;
  slope: Float64Array;
  dimMargin: Float64Array;
  dimSlope: Float64Array;
  darkMargin: Float64Array;
  darkSlope: Float64Array;
};

function followedFrom(startMah: number, spread: number): Followed {
  const row = rowsOf(7, COUNT);
  return {
    factor: row(6).map((_, g) => Math.exp(spread * (g - LIKELY))),
    x: row(0).fill(startMah),
    slope: row(1),
    dimMargin: row(2),
    dimSlope: row(3),
    darkMargin: row(4),
    darkSlope: row(5),
  };
}

type EveningWork = {
  set: SetCourse;
  schedule: Schedule;
  i: number;
  n: number;
  followed: Followed;
  out: Depletion;
  /** Reckoned charge of the evening: while lit, and the rest. */
  litMah: number;
  otherMah: number;
};

function followEvening(work: EveningWork): void {
  const { set, schedule, i, n, followed, out, otherMah } = work;
  const firstCheck = schedule.checkFrom[i]!;
  const endCheck = schedule.checkFrom[i + 1]!;
  followed.dimMargin.fill(Infinity);
  followed.darkMargin.fill(Infinity);
  out.decidingC[n] = schedule.nightC[i]! + set.offsetC;
  let doneMah = 0;
  let least = Infinity;
  let before = Infinity;
  for (let c = firstCheck; c < endCheck; c += 1) {
    const airC = schedule.checkAirC[c]! + set.offsetC;
    const dimLimit = limitAt(out.limits.dim, airC);
    const byNowMah = set.meanMa * schedule.checkLitHours[c]! + otherMah * schedule.checkGoneShare[c]!;
    const stepMah = byNowMah - doneMah;
    const margin = dimLimit - followed.x[LIKELY]! - stepMah;
    look(followed, { stepMah, dimLimit, darkLimit: limitAt(out.limits.dark, airC) });
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
  takeRest(followed, work.litMah + otherMah - doneMah);
  out.brightBelow[n] = thresholdOf(followed.factor, followed.dimMargin, followed.dimSlope);
  out.litBelow[n] = thresholdOf(followed.factor, followed.darkMargin, followed.darkSlope);
  if (endCheck === firstCheck) out.likely[n] = NOT_LIT;
  else tellLikely(work, least);
}

/** One look at every followed factor: what it has reached, how much is left, and where the limit stops it. */
function look(
  { factor, x, slope, dimMargin, dimSlope, darkMargin, darkSlope }: Followed,
  at: { stepMah: number; dimLimit: number; darkLimit: number },
): void {
  const { stepMah, dimLimit, darkLimit } = at;
  for (let g = 0; g < COUNT; g += 1) {
    const reached = x[g]! + factor[g]! * stepMah;
    const rise = slope[g]! + stepMah;
    if (dimLimit - reached < dimMargin[g]!) {
      dimMargin[g] = dimLimit - reached;
      dimSlope[g] = rise;
    }
    if (darkLimit - reached < darkMargin[g]!) {
      darkMargin[g] = darkLimit - reached;
      darkSlope[g] = rise;
    }
    if (reached <= darkLimit) {
      x[g] = reached;
      slope[g] = rise;
    } else if (x[g]! < darkLimit) {
      x[g] = darkLimit;
      slope[g] = 0;
    }
  }
}

/** What an evening takes after its last look, where the prop was lit to the end. */
function takeRest({ factor, x, slope, darkMargin }: Followed, restMah: number): void {
  for (let g = 0; g < COUNT; g += 1) {
    if (darkMargin[g]! < 0) continue;
    x[g] = x[g]! + factor[g]! * restMah;
    slope[g] = slope[g]! + restMah;
  }
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

function tellLikely({ followed, out, n, litMah, otherMah }: EveningWork, least: number): void {
  const { limits } = out;
  const cold = out.decidingC[n]! < MILD_C;
  const sparedMah = litMah + otherMah;
  const atMah = limitAt(limits.dim, out.decidingC[n]!) - least;
  out.dimByCold[n] = least < 0 && cold && atMah + sparedMah <= limitAt(limits.dim, MILD_C) ? 1 : 0;
  const darkByCold = cold && followed.x[LIKELY]! + sparedMah <= limitAt(limits.dark, MILD_C);
  if (followed.darkMargin[LIKELY]! < 0) out.likely[n] = darkByCold ? DARK_COLD : DARK_USED_UP;
  else out.likely[n] = least < 0 ? DIM : BRIGHT;
}

/**
 * Factor at which the margin runs out: from the highest followed factor that still has one, along its slope. Exact
 * as long as a prop between that factor and the threshold has been dark on the same evenings.
 */
function thresholdOf(factor: Float64Array, margin: Float64Array, slope: Float64Array): number {
  if (margin[0] === Infinity) return Infinity;
  let g = 0;
  while (g < COUNT - 1 && margin[g + 1]! >= 0) g += 1;
  if (slope[g]! <= 0) return margin[g]! >= 0 ? Infinity : 0;
  return Math.max(0, factor[g]! + margin[g]! / slope[g]!);
}

/** Reckoned charge at which a set is dim, and dark, by temperature. Ask with `limitAt`. */
export type LimitTables = { dim: Float64Array; dark: Float64Array };

const TABLE_FROM_C = -40;
const TABLE_STEP_C = 2;
const TABLE_SIZE = 46;

/** A limit every 2 K: the steps fall on the corners of the cold tables. */
function limitTables(set: SetCourse): LimitTables {
  const table = (usable: UsableShares) =>
    Float64Array.from({ length: TABLE_SIZE }, (_, k) =>
      set.drawDown.reckonedOf(usable.usableMahAt(TABLE_FROM_C + k * TABLE_STEP_C)),
    );
  return { dim: table(set.dim), dark: table(set.dark) };
}

/** A limit at a temperature, °C, held at the table's ends (-40 and 50). */
export function limitAt(table: Float64Array, tempC: number): number {
  const place = Math.min(TABLE_SIZE - 1.001, Math.max(0, (tempC - TABLE_FROM_C) / TABLE_STEP_C));
  const k = Math.floor(place);
  return table[k]! + (table[k + 1]! - table[k]!) * (place - k);
}
