import { addEvenings, type Evening, eveningsBetween, weekdayOf } from '../model/evening.ts';

/** A prop's chances of being bright, each evening by itself, and which evenings are show nights that are on. */
export type ChanceCourse = {
  from: Evening;
  /** How many evenings the season has from there on. */
  evenings: number;
  /** May end before the season does, and then the last one goes on. */
  brightOn: ArrayLike<number>;
  showNight(n: number): boolean;
};

/** What is asked of a prop. */
export type Wanted = {
  /** True where the site has no show nights at all: then every evening of the season counts. */
  everyEvening: boolean;
  /** Chance of being bright that is wanted on each evening that counts. */
  confidence: number;
  /** The evening it is. */
  today: Evening;
  /** Whether a round that starts at the site's usual hour of an evening is done before that evening's light is wanted. */
  roundInTime(evening: Evening): boolean;
};

/** Chance of being bright on evening n by itself. */
export function brightChanceOn({ brightOn }: Pick<ChanceCourse, 'brightOn'>, n: number): number {
  return brightOn[Math.min(n, brightOn.length - 1)]!;
}

function counts(course: ChanceCourse, wanted: Wanted, n: number): boolean {
  return wanted.everyEvening || course.showNight(n);
}

/** Today's place in a course. */
function todayPlace(course: ChanceCourse, wanted: Wanted): number {
  return Math.max(0, eveningsBetween(course.from, wanted.today));
}

/**
 * The last evening by which a swap, made at the site's usual hour, keeps the chance of being bright on every evening
 * that counts at or above the confidence: the first one that counts and falls short, or the one before where the usual
 * hour is too late for it. Not before today. null = the set lasts. Ours.
 */
export function swapByOf(course: ChanceCourse, wanted: Wanted): Evening | null {
  const today = todayPlace(course, wanted);
  for (let n = today; n < course.evenings; n += 1) {
    if (brightChanceOn(course, n) >= wanted.confidence || !counts(course, wanted, n)) continue;
    const evening = addEvenings(course.from, n);
    return n === today || wanted.roundInTime(evening) ? evening : addEvenings(evening, -1);
  }
  return null;
}

/** Chance of being bright on every evening that counts from today through an evening; 1 when none does. */
export function chanceThrough(course: ChanceCourse, wanted: Wanted, through: Evening): number {
  const end = Math.min(eveningsBetween(course.from, through), course.evenings - 1);
  let chance = 1;
  for (let n = todayPlace(course, wanted); n <= end; n += 1) {
    // One drain factor decides all evenings, so the worst of them decides.
    if (counts(course, wanted, n)) chance = Math.min(chance, brightChanceOn(course, n));
  }
  return chance;
}

/**
 * The first evenings from today on that a round may be made, at most two: the next round and the one after. None after
 * the season.
 * @param habits.weekdays ISO, 1..7; @param habits.tooLateToday whether today's usual starting time has passed
 */
export function nextRounds(
  today: Evening,
  habits: { weekdays: readonly number[]; tooLateToday: boolean; seasonThrough: Evening },
): Evening[] {
  const rounds: Evening[] = [];
  const last = Math.min(14, eveningsBetween(today, habits.seasonThrough));
  for (let ahead = habits.tooLateToday ? 1 : 0; ahead <= last && rounds.length < 2; ahead += 1) {
    const evening = addEvenings(today, ahead);
    if (habits.weekdays.includes(weekdayOf(evening))) rounds.push(evening);
  }
  return rounds;
}

export type Group = 'fine' | 'next-round' | 'at-risk' | 'unknown';

/** Nobody has said when rounds are made: a week is how long one then thinks ahead. Common practice, no source. */
const EVENINGS_WITHOUT_ROUNDS = 7;

/**
 * Which of the four groups a prop is in.
 * at-risk: its chance of staying bright until somebody can next reach it is under the confidence, or somebody has
 * seen it fail and an evening that counts is still to come. next-round: it gets there, but not to the round after and
 * the margin beyond it, so it is swapped on the next one.
 */
export function groupOf(
  course: ChanceCourse,
  wanted: Wanted,
  reach: { rounds: readonly Evening[]; marginNights: number; failing: boolean },
): { group: Group; chanceBrightToNextRound: number } {
  const bridged = (round: Evening | undefined, otherwise: number) => {
    if (round === undefined) return addEvenings(wanted.today, otherwise);
    return wanted.roundInTime(round) ? addEvenings(round, -1) : round;
  };
  const toNext = chanceThrough(course, wanted, bridged(reach.rounds[0], EVENINGS_WITHOUT_ROUNDS));
  const afterNext = bridged(reach.rounds[1], 2 * EVENINGS_WITHOUT_ROUNDS);
  const toFollowing = chanceThrough(course, wanted, addEvenings(afterNext, reach.marginNights));
  const failing = reach.failing && swapByOf(course, wanted) !== null;
  if (failing || toNext < wanted.confidence) return { group: 'at-risk', chanceBrightToNextRound: toNext };
  if (toFollowing < wanted.confidence) return { group: 'next-round', chanceBrightToNextRound: toNext };
  return { group: 'fine', chanceBrightToNextRound: toNext };
}
