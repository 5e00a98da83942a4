import { type CellSet, litVoltsAt, type UsableShares } from './cell.ts';
import { CELL_KINDS } from './cell-kinds.ts';
import { drawShareAtVolts, type ReckonedLoad } from './load.ts';

/**
 * The charge a set has given, told in two ways. `used` is what left the cells, mAh. `reckoned` is what the mean draw
 * times the hours says, mAh: a fading light takes less than its mean late in a set, so a given used charge stands
 * for more reckoned charge. For a steady load the two are one. Reckoned charge grows evenly with lit hours, which
 * lets a whole season be summed without stepping through it.
 */
export type DrawDown = {
  reckonedOf(usedMah: number): number;
  usedOf(reckonedMah: number): number;
  /** Current now ÷ mean current, at a reckoned charge. */
  drawShareAt(reckonedMah: number): number;
};

/** Steps across the discharge curve: a resistor string's sum is then good to 0.1 %. */
const STEPS = 128;

/**
 * reckoned(q) = ∫ dq ÷ drawShare(V(q)), by the trapezoid rule over the discharge curve at 20 °C.
 * Ours. The cold lowers the lit voltage and so the draw of a fading light a little; that is left out (a few per cent
 * of the draw at -10 °C, on the safe side).
 */
export function drawDownOf(set: CellSet, load: ReckonedLoad, shares: UsableShares): DrawDown {
  if (load.behaviour === 'steady') {
    return { reckonedOf: (mah) => mah, usedOf: (mah) => mah, drawShareAt: () => 1 };
  }
  const { used } = CELL_KINDS[set.type.kind].curve;
  const wholeMah = shares.capacityMah * shares.rateShare * shares.weakestShare * shares.healthShare;
  const stepMah = (wholeMah * used[used.length - 1]!) / STEPS;
  const draw = new Float64Array(STEPS + 1);
  const reckoned = new Float64Array(STEPS + 1);
  for (let i = 0; i <= STEPS; i += 1) {
    draw[i] = drawShareAtVolts(load, litVoltsAt(set, (i * stepMah) / wholeMah));
    if (i > 0) reckoned[i] = reckoned[i - 1]! + (stepMah * (1 / draw[i - 1]! + 1 / draw[i]!)) / 2;
  }
  const between = (table: Float64Array, place: number): number => {
    const i = Math.min(STEPS - 1, Math.floor(place));
    return table[i]! + (table[i + 1]! - table[i]!) * (place - i);
  };
  /** Where on the curve a reckoned charge is, in steps; runs on beyond the end at the last step's pace. */
  const placeOf = (mah: number): number => {
    let low = 0;
    let high = STEPS;
    while (high - low > 1) {
      const middle = (low + high) >> 1;
      if (reckoned[middle]! <= mah) low = middle;
      else high = middle;
    }
    return low + (mah - reckoned[low]!) / (reckoned[low + 1]! - reckoned[low]!);
  };
  return {
    reckonedOf: (mah) => between(reckoned, mah / stepMah),
    usedOf: (mah) => placeOf(mah) * stepMah,
    drawShareAt: (mah) => between(draw, Math.min(STEPS, placeOf(mah))),
  };
}
