/** A height over time, smooth and with few turning points, between two times. */
export type Course = { from: number; until: number; heightAt: (time: number) => number };

const STEPS = 48;

// Where between two times the height is lowest (sense -1) or highest (sense 1); thirds are enough, it is done seldom.
function turningPoint(course: Course, sense: 1 | -1): number {
  let { from, until } = course;
  for (let round = 0; round < 40; round += 1) {
    const third = (until - from) / 3;
    const early = sense * course.heightAt(from + third);
    const late = sense * course.heightAt(until - third);
    if (early < late) from += third;
    else until -= third;
  }
  return (from + until) / 2;
}

// Samples of the course, thickened by the turning points between them, so that a brief dip is not stepped over.
function samplesOf(course: Course): number[] {
  const step = (course.until - course.from) / STEPS;
  const times = Array.from({ length: STEPS + 1 }, (_, index) => course.from + index * step);
  const heights = times.map(course.heightAt);
  const turning: number[] = [];
  for (let index = 0; index <= STEPS; index += 1) {
    const [before, here, after] = [heights[index - 1], heights[index]!, heights[index + 1]];
    const from = Math.max(course.from, times[index]! - step);
    const until = Math.min(course.until, times[index]! + step);
    if (here <= (before ?? here) && here <= (after ?? here))
      turning.push(turningPoint({ ...course, from, until }, -1));
    if (here >= (before ?? here) && here >= (after ?? here))
      turning.push(turningPoint({ ...course, from, until }, 1));
  }
  return [...times, ...turning].sort((a, b) => a - b);
}

function crossingBetween(course: Course, level: number): number {
  let { from, until } = course;
  const startsBelow = course.heightAt(from) < level;
  for (let round = 0; round < 32; round += 1) {
    const middle = (from + until) / 2;
    if (course.heightAt(middle) < level === startsBelow) from = middle;
    else until = middle;
  }
  return (from + until) / 2;
}

/**
 * The first time a course sinks below a level and the last time it rises above it, and whether it starts below.
 * Ours: samples, their turning points, and halving. Slow and sure; a double crossing within a 48th of the course is
 * found, a triple one is not.
 * @param course the height over time
 * @param level in the unit of the height
 */
export function searchedCrossings(course: Course, level: number) {
  const times = samplesOf(course);
  const below = times.map((time) => course.heightAt(time) < level);
  let firstDown: number | null = null;
  let lastUp: number | null = null;
  for (let index = 1; index < times.length; index += 1) {
    if (below[index] === below[index - 1]) continue;
    const crossing = crossingBetween({ ...course, from: times[index - 1]!, until: times[index]! }, level);
    if (!below[index]) lastUp = crossing;
    else firstDown ??= crossing;
  }
  return { firstDown, lastUp, startsBelow: below[0]! };
}
