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
  /** Stop once even the least thirsty factor is dark and no evening to come is mild enough to light it again. */
  untilSpent: boolean;
};

/** What happens on each evening since the set went in, by the likely course and by drain factor. */
export type Depletion = {
  count: number;
  limits: LimitTables;
  litHours: number[];
  /** Used at the end of the evening if the sum is right, mAh; it stands still while the prop is dark. */
  usedMah: number[];
  /** Charge this evening takes by the likely course if the set lasts it out, and what of it trips take, mAh. */
  eveningMah: number[];
  tripMah: number[];
  /** Current of the likely course tonight ÷ mean current: below 1 for a light that has begun to fade. */
  drawShare: number[];
  /** Air at the moment of the evening that decides (where least is left to the dim limit), offset included, °C. */
  decidingC: number[];
  /** Drain factor below which it is bright, and lit, through the whole evening; Infinity where it is not lit at all. */
  brightBelow: number[];
  litBelow: number[];
  /** Share of the evening's lit time after which it goes dim, by the likely course; 1 = bright to the end. */
  brightShare: number[];
  /** What the likely course does: an index into COURSE_WORDS. */
  likely: number[];
  /** Whether the likely course goes dim although a mild night would have kept it bright and left a night to spare. */
  dimByCold: boolean[];
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
  const evenings = set.schedule.count - set.start;
  check(evenings > 0, 'the set goes in after the season');
  const out: Depletion = {
    count: 0,
    limits: limitTables(set),
    litHours: [],
    usedMah: [],
    eveningMah: [],
    tripMah: [],
    drawShare: [],
    decidingC: [],
    brightBelow: [],
    litBelow: [],
    brightShare: [],
    likely: [],
    dimByCold: [],
  };
  const evening: EveningSheet = {
    set,
    out,
    followed: followFrom(set.drawDown.reckonedOf(set.usedAtStartMah), set.spread),
    schedule: set.firstEvening,
    i: 0,
    litMah: 0,
    otherMah: 0,
    looks: LOOKS,
    least: 0,
    decidingC: 0,
  };
  const { x } = evening.followed;
  for (let n = 0; n < evenings; n += 1) {
    if (n > 0) evening.schedule = set.schedule;
    evening.i = n === 0 ? 0 : set.start + n;
    const { schedule, i } = evening;
    const drawShare = set.drawDown.drawShareAt(x[LIKELY]!);
    const tripMah = set.mahPerTrip * schedule.trips[i]!;
    const otherMah =
      set.standbyMa * (schedule.poweredHours[i]! - schedule.litHours[i]!) +
      tripMah +
      set.selfDischargeMah(n, schedule.nightC[i]! + set.offsetC);
    evening.litMah = set.meanMa * schedule.litHours[i]!;
    evening.otherMah = otherMah / drawShare;
    followEvening(evening);
    out.litHours.push(schedule.litHours[i]!);
    out.eveningMah.push(evening.litMah * drawShare + otherMah);
    out.tripMah.push(tripMah);
    out.drawShare.push(drawShare);
    out.usedMah.push(set.drawDown.usedOf(x[LIKELY]!));
    out.count += 1;
    if (set.untilSpent && isSpent(evening, schedule.warmestFromC[i + 1]!)) break;
  }
  return out;
}

function isSpent({ set, out, followed, schedule }: EveningSheet, warmestToComeC: number): boolean {
  if (followed.darkMargin[0]! >= 0 || schedule === set.firstEvening) return false;
  if (warmestToComeC === Number.NEGATIVE_INFINITY) return true;
  return followed.x[0]! >= limitAt(out.limits.dark, warmestToComeC + set.offsetC);
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

const perFactor = () => new Float64Array(COUNT);
/** The one piece of paper all sets are followed on, one after the other: nothing of it outlives a set. */
const PAPER: Followed = {
  factor: perFactor(),
  x: perFactor(),
  slope: perFactor(),
  dimMargin: perFactor(),
  dimSlope: perFactor(),
  darkMargin: perFactor(),
  darkSlope: perFactor(),
};

function followFrom(startMah: number, spread: number): Followed {
  PAPER.x.fill(startMah);
  PAPER.slope.fill(0);
  for (let g = 0; g < COUNT; g += 1) PAPER.factor[g] = Math.exp(spread * (g - LIKELY));
  return PAPER;
}

/** The sheet on which one evening after the other is worked out; written over, since a site has a million looks. */
type EveningSheet = {
  readonly set: SetCourse;
  readonly out: Depletion;
  readonly followed: Followed;
  schedule: Schedule;
  /** The evening's place in its schedule. */
  i: number;
  /** Reckoned charge of the evening: while lit, and the rest. */
  litMah: number;
  otherMah: number;
  readonly looks: Looks;
  /** Least margin to the dim limit by the likely course, and the air at that look. */
  least: number;
  decidingC: number;
};

/** The looks of one evening: the air, the reckoned charge taken by then, and the limits at that air. */
type Looks = {
  count: number;
  airC: Float64Array;
  byThenMah: Float64Array;
  dimLimit: Float64Array;
  darkLimit: Float64Array;
};

const MOST_LOOKS = 64;
const perLook = () => new Float64Array(MOST_LOOKS);
const LOOKS: Looks = {
  count: 0,
  airC: perLook(),
  byThenMah: perLook(),
  dimLimit: perLook(),
  darkLimit: perLook(),
};

function takeLooks({ set, out, schedule, i, otherMah, looks }: EveningSheet): void {
  const first = schedule.checkFrom[i]!;
  looks.count = schedule.checkFrom[i + 1]! - first;
  check(looks.count <= MOST_LOOKS, 'an evening has too many looks');
  for (let k = 0; k < looks.count; k += 1) {
    const airC = schedule.checkAirC[first + k]! + set.offsetC;
    looks.airC[k] = airC;
    looks.byThenMah[k] =
      set.meanMa * schedule.checkLitHours[first + k]! + otherMah * schedule.checkGoneShare[first + k]!;
    looks.dimLimit[k] = limitAt(out.limits.dim, airC);
    looks.darkLimit[k] = limitAt(out.limits.dark, airC);
  }
}

const TOP = COUNT - 1;

function followEvening(evening: EveningSheet): void {
  const { set, schedule, i, followed, out, looks } = evening;
  takeLooks(evening);
  const { count, airC, byThenMah, dimLimit, darkLimit } = looks;
  followed.dimMargin.fill(Infinity);
  followed.darkMargin.fill(Infinity);
  // While even the thirstiest factor stays bright the others need no looking at: they only add up.
  const from = staysBright(evening, TOP) ? TOP : 0;
  evening.least = Infinity;
  evening.decidingC = schedule.nightC[i]! + set.offsetC;
  let brightShare = 1;
  let before = Infinity;
  let doneMah = 0;
  let likelyMah = followed.x[LIKELY]!;
  for (let k = 0; k < count; k += 1) {
    const stepMah = byThenMah[k]! - doneMah;
    lookAt(evening, { from, k, stepMah });
    const margin = dimLimit[k]! - likelyMah - stepMah;
    likelyMah = Math.max(likelyMah, Math.min(likelyMah + stepMah, darkLimit[k]!));
    if (margin < evening.least) {
      evening.least = margin;
      evening.decidingC = airC[k]!;
    }
    if (margin < 0 && brightShare === 1) brightShare = brightShareAt(evening, { k, before, margin });
    before = margin;
    doneMah = byThenMah[k]!;
  }
  if (from === TOP) addUp(followed, doneMah);
  takeRest(followed, evening.litMah + evening.otherMah - doneMah);
  out.decidingC.push(evening.decidingC);
  out.brightShare.push(brightShare);
  out.brightBelow.push(thresholdOf(followed.factor, followed.dimMargin, followed.dimSlope));
  out.litBelow.push(thresholdOf(followed.factor, followed.darkMargin, followed.darkSlope));
  tellLikely(evening);
}

/** Whether a followed factor is bright at every look of the evening. */
function staysBright({ followed, looks }: EveningSheet, g: number): boolean {
  const { count, byThenMah, dimLimit } = looks;
  for (let k = 0; k < count; k += 1) {
    if (followed.x[g]! + followed.factor[g]! * byThenMah[k]! > dimLimit[k]!) return false;
  }
  return true;
}

/** What an evening takes below the top factor where nothing is ever stopped. */
function addUp({ factor, x, slope }: Followed, mah: number): void {
  for (let g = 0; g < TOP; g += 1) {
    x[g] = x[g]! + factor[g]! * mah;
    slope[g] = slope[g]! + mah;
  }
}

/** One look at the followed factors: what each has reached, how much is left, and where the limit stops it. */
function lookAt({ followed, looks }: EveningSheet, at: { from: number; k: number; stepMah: number }): void {
  const { factor, x, slope, dimMargin, dimSlope, darkMargin, darkSlope } = followed;
  const dimLimit = looks.dimLimit[at.k]!;
  const darkLimit = looks.darkLimit[at.k]!;
  const { stepMah } = at;
  for (let g = at.from; g < COUNT; g += 1) {
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

/** Share of the evening's lit time that had passed when the margin ran out between look k - 1 and look k. */
function brightShareAt(
  { schedule, i, looks }: EveningSheet,
  at: { k: number; before: number; margin: number },
): number {
  if (at.before === Infinity) return 0;
  const part = at.before / (at.before - at.margin);
  const litHours = (k: number) => schedule.checkLitHours[schedule.checkFrom[i]! + k]!;
  const whole = litHours(looks.count - 1);
  if (whole === 0) return (at.k - 1 + part) / (looks.count - 1);
  return (litHours(at.k - 1) + (litHours(at.k) - litHours(at.k - 1)) * part) / whole;
}

function tellLikely({ followed, out, looks, litMah, otherMah, least, decidingC }: EveningSheet): void {
  const { dim, dark } = out.limits;
  const cold = decidingC < MILD_C;
  const sparedMah = litMah + otherMah;
  const atMah = limitAt(dim, decidingC) - least;
  const isDark = followed.darkMargin[LIKELY]! < 0;
  const darkByCold = cold && followed.x[LIKELY]! + sparedMah <= limitAt(dark, MILD_C);
  out.dimByCold.push(least < 0 && cold && atMah + sparedMah <= limitAt(dim, MILD_C));
  if (looks.count === 0) out.likely.push(NOT_LIT);
  else if (isDark) out.likely.push(darkByCold ? DARK_COLD : DARK_USED_UP);
  else out.likely.push(least < 0 ? DIM : BRIGHT);
}

/**
 * Factor at which the margin runs out: from the highest followed factor that still has one, along its slope. Exact
 * as long as a prop between that factor and the threshold has been dark on the same evenings.
 */
function thresholdOf(factor: Float64Array, margin: Float64Array, slope: Float64Array): number {
  if (margin[TOP] === Infinity) return Infinity;
  let g = 0;
  while (g < TOP && margin[g + 1]! >= 0) g += 1;
  if (slope[g]! <= 0) return margin[g]! >= 0 ? Infinity : 0;
  return Math.max(0, factor[g]! + margin[g]! / slope[g]!);
}

/** Reckoned charge at which a set is dim, and dark, by temperature. Ask with `limitAt`. */
export type LimitTables = { dim: number[]; dark: number[] };

const TABLE_FROM_C = -40;
const TABLE_STEP_C = 2;
const TABLE_SIZE = 46;

/** A limit every 2 K: the steps fall on the corners of the cold tables. */
function limitTables(set: SetCourse): LimitTables {
  const tableOf = (usable: UsableShares) => {
    const table: number[] = [];
    for (let k = 0; k < TABLE_SIZE; k += 1) {
      table.push(set.drawDown.reckonedOf(usable.usableMahAt(TABLE_FROM_C + k * TABLE_STEP_C)));
    }
    return table;
  };
  return { dim: tableOf(set.dim), dark: tableOf(set.dark) };
}

/** A limit at a temperature, °C, held at the table's ends (-40 and 50). */
export function limitAt(table: readonly number[], tempC: number): number {
  const place = Math.min(TABLE_SIZE - 1.001, Math.max(0, (tempC - TABLE_FROM_C) / TABLE_STEP_C));
  const k = Math.floor(place);
  return table[k]! + (table[k + 1]! - table[k]!) * (place - k);
}
