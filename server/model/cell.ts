import { CELL_KINDS, COLD_GRID_C } from './cell-kinds.ts';
import type { CellType } from './cell-type.ts';
import { rateTableOf } from './cell-types-built-in.ts';
import { normalQuantile } from './chance.ts';
import { checkWithin } from './check.ts';
import { interpolate, interpolateFalling } from './interpolate.ts';

/** The cells in one holder. */
export type CellSet = {
  type: CellType;
  series: number;
  parallel: number;
  /** Measured ÷ label capacity, 0.05..1.2. */
  healthShare: number;
};

/** What the prop asks of the set, mA per set. */
export type Demand = {
  /** Current at which the charge is mostly taken: for the rate and the hours-rate. */
  rateMa: number;
  /** Highest current of a fade or a run: for the cold polarisation. */
  peakMa: number;
};

/** What turns label capacity into usable charge down to one lit voltage; only the cold share is left to ask for. */
export type UsableShares = {
  capacityMah: number;
  rateShare: number;
  cutOffShare: number;
  weakestShare: number;
  healthShare: number;
  /** Everything the cold does, sag included; 1 at 20 °C. `tempC` is held at the tables' ends below -30 and above 40. */
  coldShareAt(tempC: number): number;
  /** The product of all of them, mAh. */
  usableMahAt(tempC: number): number;
};

/** Label capacity of the whole set at 20 °C, mAh: rows side by side add, cells end to end do not. */
export function labelMah(set: CellSet): number {
  return set.type.capacityMah * set.parallel;
}

/** Expected largest of n standard normal draws, n = 1..12. Source: tables of normal order statistics. */
const LARGEST_OF = [0, 0.564, 0.846, 1.029, 1.163, 1.267, 1.352, 1.424, 1.485, 1.539, 1.586, 1.629];

/**
 * Expected weakest of n cells in series as a share of the mean cell. A factory-made block counts as one.
 * Source: normal order statistics; beyond 12 in series Blom's approximation (1958), good to 0.01.
 */
export function weakestShare(set: CellSet): number {
  const { series } = set;
  const deviations = LARGEST_OF[series - 1] ?? normalQuantile((series - 0.375) / (series + 0.25));
  return 1 - deviations * CELL_KINDS[set.type.kind].unitSd;
}

/** The cold table's row for cells emptied in `hoursRate` hours: linear in the logarithm, held at the ends. */
function coldRow(set: CellSet, hoursRate: number): number[] {
  const rows = CELL_KINDS[set.type.kind].cold;
  const hours = rows.map((row) => Math.log(row.hoursRate));
  return COLD_GRID_C.map((_, i) =>
    interpolate(
      hours,
      rows.map((row) => row.share[i]!),
      Math.log(hoursRate),
    ),
  );
}

/** Share of its charge a lit cell has given when its voltage has fallen to `cellVolts`. */
export function usedShareAtVolts(set: CellSet, cellVolts: number): number {
  const { used, volts } = CELL_KINDS[set.type.kind].curve;
  return interpolateFalling(used, volts, cellVolts);
}

/** Lit volts of the whole set at 20 °C when a share of its charge is used. */
export function litVoltsAt(set: CellSet, usedShare: number): number {
  const { used, volts } = CELL_KINDS[set.type.kind].curve;
  return interpolate(used, volts, usedShare) * set.series * set.type.cellsInside;
}

/** Rate share at a current through the set, linear in the logarithm of the current, held at the table's ends. */
export function rateShareAt(set: CellSet, rateMa: number): number {
  const table = rateTableOf(set.type);
  const perCellMa = Math.max(rateMa / set.parallel, 1e-6);
  return interpolate(table.ma.map(Math.log), table.share, Math.log(perCellMa));
}

/**
 * Usable charge of a set down to a lit voltage, ready to be asked at any temperature.
 *
 * U = capacity × cold × rate × cut-off × weakest × health. The cut-off is read off the discharge curve at `volts`
 * per cell over the same at the label's own cut-off. In the cold the lit voltage sags by
 * e(T) = peak ÷ capacity × rho × (2^((20 - T)/K) - 1), so both readings are taken that much higher: what the
 * voltage lacks beyond what the cold table already tells. At `volts` = the label's cut-off the cut-off share is 1
 * at any temperature.
 *
 * @param volts lit volts of the whole set, V
 * Source of e(T): fitted to a published C/27 discharge of lithium iron at eight temperatures, where it doubles every
 * 10 K; other chemistries by analogy (engineering estimate). The rest ours, from the tables of `cell-kinds.ts`.
 * Not valid for currents beyond a cell's rating (a coin cell over 3 mA): the forecast warns there.
 */
export function usableShares(set: CellSet, demand: Demand, volts: number): UsableShares {
  checkWithin(volts, 'volts', { min: 0, max: 1000 });
  checkWithin(demand.rateMa, 'rateMa', { min: 0, max: 1e6 });
  const { cutOffVolts, polarisation } = CELL_KINDS[set.type.kind];
  const capacityMah = labelMah(set);
  const row = coldRow(set, demand.rateMa > 0 ? capacityMah / demand.rateMa : Number.MAX_VALUE);
  const cellVolts = volts / (set.series * set.type.cellsInside);
  const sagAt20C = (demand.peakMa / capacityMah) * polarisation.ohmAh;
  const cutOffAt = (sagVolts: number) => {
    const whole = usedShareAtVolts(set, cutOffVolts + sagVolts);
    // A sag that lifts even the label's cut-off above a fresh cell leaves nothing to use.
    return whole > 0 ? usedShareAtVolts(set, cellVolts + sagVolts) / whole : 0;
  };
  const cutOffShare = cutOffAt(0);
  const coldShareAt = (tempC: number) => {
    const cold = interpolate(COLD_GRID_C, row, tempC);
    if (tempC >= 20 || cutOffShare === 0) return cold;
    return (cold * cutOffAt(sagAt20C * (2 ** ((20 - tempC) / polarisation.doublingK) - 1))) / cutOffShare;
  };
  const shares = {
    capacityMah,
    rateShare: rateShareAt(set, demand.rateMa),
    cutOffShare,
    weakestShare: weakestShare(set),
    healthShare: set.healthShare,
  };
  const at20CMah = capacityMah * shares.rateShare * cutOffShare * shares.weakestShare * shares.healthShare;
  return { ...shares, coldShareAt, usableMahAt: (tempC) => at20CMah * coldShareAt(tempC) };
}

/**
 * Charge a set loses by itself in a day, mAh, by days since it was new or charged and the day's mean temperature, °C.
 * Source: makers' shelf figures by chemistry, and their rise with temperature (Q10); see `cell-kinds.ts`.
 */
export function dailyLossOf(set: CellSet): (ageDays: number, tempC: number) => number {
  const { steps, q10 } = CELL_KINDS[set.type.kind].selfDischarge;
  const perK = Math.log(q10) / 10;
  const capacityMah = labelMah(set);
  return (ageDays, tempC) => {
    let k = 0;
    while (k < steps.length - 1 && ageDays >= steps[k]!.throughDays) k += 1;
    return capacityMah * steps[k]!.sharePerDay * Math.exp(perK * (tempC - 20));
  };
}

/** Relative standard deviation of the usable charge that comes from the cold table itself, at `tempC`. */
export function coldSpread(set: CellSet, tempC: number): number {
  const { cold, coldSd } = CELL_KINDS[set.type.kind];
  const slowest = cold[cold.length - 1]!.share;
  return interpolate(COLD_GRID_C, coldSd, tempC) / Math.max(interpolate(COLD_GRID_C, slowest, tempC), 0.05);
}
