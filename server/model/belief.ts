import { CELL_KINDS } from './cell-kinds.ts';
import type { CellKind } from './cell-type.ts';
import { EIGHTY_PERCENT_Z, normalCdf } from './chance.ts';
import type { ReckonedLoad } from './load.ts';

/**
 * What is believed of a drain factor (true ÷ reckoned charge used) before anybody has looked: its logarithm is
 * normal about 0. The width takes in the spread of the brand, of the way the draw was measured, and of a guess at
 * what a part-used set had left. Ours; the parts are independent, so their squares add.
 */
export type Belief = { spread: number };

/** How far a guess at the charge left in a part-used set is off, as a share of the whole. Engineering estimate. */
const LEFT_SHARE_SD = 0.12;
const LEFT_SHARE_UNKNOWN_SD = 0.25;

/** The belief before anybody has looked. @param of.load the draw with its own spread; @param of.leftShare 0..1 */
export function priorBelief(of: {
  kind: CellKind;
  load: ReckonedLoad;
  /** Charge left when the set went in, and whether that is a guess on top of a guess. */
  leftShare: number;
  leftShareKnown: boolean;
}): Belief {
  const left =
    of.leftShare >= 1
      ? 0
      : (of.leftShareKnown ? LEFT_SHARE_SD : LEFT_SHARE_UNKNOWN_SD) / Math.max(of.leftShare, 0.1);
  return { spread: Math.hypot(CELL_KINDS[of.kind].capacitySd, of.load.spread, Math.min(left, 1)) };
}

/** 80 % range of the drain factor. */
export function drainFactorRange(belief: Belief): { low: number; likely: number; high: number } {
  const factor = Math.exp(EIGHTY_PERCENT_Z * belief.spread);
  return { low: 1 / factor, likely: 1, high: factor };
}

/** Chance that the drain factor is below a threshold that is itself uncertain by `thresholdSpread` (of its logarithm). */
export function chanceBelow(belief: Belief, threshold: number, thresholdSpread: number): number {
  if (threshold === Infinity) return 1;
  if (threshold <= 0) return 0;
  return normalCdf(Math.log(threshold) / Math.sqrt(belief.spread ** 2 + thresholdSpread ** 2));
}
