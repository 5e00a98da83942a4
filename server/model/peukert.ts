import { check } from './check.ts';

/**
 * Hours a lead set lasts at a steady current.
 *
 * t = H × (C ÷ (I × H))^k. Source: Peukert's law in its rated form; with H hours = C ampere-hours it is the older
 * form t = C ÷ I^k, whose C is the capacity at one ampere.
 *
 * @param of.ratedMah capacity at the rated discharge, mAh, above 0; @param of.ratedHours its length, h, above 0
 * @param of.ma steady current, mA, above 0; @param of.exponent 1 (no loss) .. 1.5
 * Not valid far from the rated current: a maker's table has a different exponent between each two of its rows.
 */
export function peukertHours(of: {
  ratedMah: number;
  ratedHours: number;
  ma: number;
  exponent: number;
}): number {
  check(of.ratedMah > 0 && of.ratedHours > 0 && of.ma > 0, 'Peukert wants numbers above 0');
  check(
    of.exponent >= 1 && of.exponent <= 1.5,
    `a Peukert exponent of ${of.exponent} is not one of a battery`,
  );
  return of.ratedHours * (of.ratedMah / (of.ma * of.ratedHours)) ** of.exponent;
}
