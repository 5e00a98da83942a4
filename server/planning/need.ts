import { addEvenings, type Evening, eveningsBetween, weekdayOf } from '../model/evening.ts';
import type { Seen } from '../model/log-entry.ts';

/** A prop's chances, and which evenings are show nights that are on, by evening from `from` on. */
export type ChanceCourse = {
  from: Evening;
  /** How many evenings the season has from there on. */
  evenings: number;
  /** Falling; may end before the season does, and then the last one goes on. */
  chanceBright: ArrayLike<number>;
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
};

function chanceOn({ chanceBright }: ChanceCourse, n: number): number {
  return chanceBright[Math.min(n, chanceBright.length - 1)]!;
}

function todayPlace(course: ChanceCourse, wanted: Wanted): number {
  return Math.max(0, eveningsBetween(course.from, wanted.today));
}

/**
 * The last evening by which a swap keeps the chance of being bright on every evening that counts at or above the
 * confidence: the evening before the first one that counts and falls short, so that a round at any hour of it is in
 * time. Not before today. null = the set lasts. Ours.
 */
export function swapByOf(course: ChanceCourse, wanted: Wanted): Evening | null {
  const today = todayPlace(course, wanted);
  for (let n = today; n < course.evenings; n += 1) {
    if (chanceOn(course, n) >= wanted.confidence) continue;
    if (wanted.everyEvening || course.showNight(n)) return addEvenings(course.from, Math.max(today, n - 1));
  }
  return null;
}

/** Chance of being bright on every evening that counts from today through an evening; 1 when none does. */
export function chanceThrough(course: ChanceCourse, wanted: Wanted, through: Evening): number {
  const end = Math.min(eveningsBetween(course.from, through), course.evenings - 1);
  for (let n = end; n >= todayPlace(course, wanted); n -= 1) {
    // The course never rises, so the last evening that counts decides.
    if (wanted.everyEvening || course.showNight(n)) return chanceOn(course, n);
  }
  return 1;
}

/**
 * The first evenings from today on that a round may be made, at most two: the next round and the one after.
 * @param habits.weekdays ISO, 1..7; @param habits.tooLateToday whether today's usual starting time has passed
 */
export function nextRounds(
  today: Evening,
  habits: { weekdays: readonly number[]; tooLateToday: boolean },
): Evening[] {
  const rounds: Evening[] = [];
  for (let ahead = habits.tooLateToday ? 1 : 0; ahead <= 14 && rounds.length < 2; ahead += 1) {
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
 * at-risk: its chance of staying bright until somebody can next reach it, and the margin beyond, is under the
 * confidence, or somebody has seen it dim or dark. next-round: it gets there, but not to the round after.
 */
export function groupOf(
  course: ChanceCourse,
  wanted: Wanted,
  reach: { rounds: readonly Evening[]; marginNights: number; lastSeen: Seen | null },
): { group: Group; chanceBrightToNextRound: number } {
  // A round is made before the gate opens, so the evening before it is the last one to be bridged.
  const bridged = (round: Evening | undefined, otherwise: number) =>
    addEvenings(round ?? addEvenings(wanted.today, otherwise), reach.marginNights - 1);
  const toNext = chanceThrough(course, wanted, bridged(reach.rounds[0], EVENINGS_WITHOUT_ROUNDS));
  const toFollowing = chanceThrough(course, wanted, bridged(reach.rounds[1], 2 * EVENINGS_WITHOUT_ROUNDS));
  const failed = reach.lastSeen === 'dim' || reach.lastSeen === 'dark';
  if (failed || toNext < wanted.confidence) return { group: 'at-risk', chanceBrightToNextRound: toNext };
  if (toFollowing < wanted.confidence) return { group: 'next-round', chanceBrightToNextRound: toNext };
  return { group: 'fine', chanceBrightToNextRound: toNext };
}
