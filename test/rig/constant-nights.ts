import type { Schedule } from '../../server/model/schedule.ts';

/** Nights of `litHours` at one temperature each, with a look at the beginning, in the middle and at the end. */
export function constantNights(nightsC: number[], litHours: number): Schedule {
  const count = nightsC.length;
  const looks = [0, 0.5, 1];
  const checks = nightsC.flatMap((airC) => looks.map((look) => ({ airC, look })));
  return {
    from: '2026-12-01',
    count,
    litHours: Array(count).fill(litHours),
    poweredHours: Array(count).fill(24),
    trips: Array(count).fill(0),
    showNight: Array(count).fill(false),
    checkFrom: Array.from({ length: count + 1 }, (_, n) => n * looks.length),
    checkLitHours: checks.map(({ look }) => look * litHours),
    checkGoneShare: checks.map(({ look }) => look),
    checkAirC: checks.map(({ airC }) => airC),
    nightC: nightsC,
    nightSigmaC: Array(count).fill(0),
    warmestFromC: Array(count + 1).fill(40),
  };
}
