import { expect, type TestContext } from 'vitest';

/** One line of the accuracy table: how far we are from something outside the project. */
export type Accuracy = {
  what: string;
  against: string;
  unit: string;
  count: number;
  bias: number;
  rms: number;
  max: number;
  allowed: string;
};

declare module 'vitest' {
  interface TaskMeta {
    accuracy?: Accuracy;
  }
}

/**
 * Holds the differences from an outside truth to their limits, and tells them to the table that `npm run accuracy`
 * prints: the gate and the report use the same numbers.
 */
export function holdTo(
  limits: { maxAbs?: number; rms?: number; bias?: number },
  of: {
    context: Pick<TestContext, 'task'>;
    what: string;
    against: string;
    unit: string;
    differences: readonly number[];
  },
): void {
  const { differences } = of;
  const mean = (values: readonly number[]) => values.reduce((sum, value) => sum + value, 0) / values.length;
  const bias = mean(differences);
  const rms = Math.sqrt(mean(differences.map((value) => value * value)));
  const max = Math.max(...differences.map(Math.abs));
  const allowed = Object.entries({ max: limits.maxAbs, rms: limits.rms, bias: limits.bias })
    .filter(([, limit]) => limit !== undefined)
    .map(([name, limit]) => `${name} ${limit}`)
    .join(', ');
  const { what, against, unit } = of;
  of.context.task.meta.accuracy = { what, against, unit, count: differences.length, bias, rms, max, allowed };
  expect(differences.length).toBeGreaterThan(0);
  expect(differences.every(Number.isFinite), 'a difference is missing').toBe(true);
  if (limits.maxAbs !== undefined) expect(max).toBeLessThanOrEqual(limits.maxAbs);
  if (limits.rms !== undefined) expect(rms).toBeLessThanOrEqual(limits.rms);
  if (limits.bias !== undefined) expect(Math.abs(bias)).toBeLessThanOrEqual(limits.bias);
}
