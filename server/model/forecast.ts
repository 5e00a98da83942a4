import type { Evening, Instant } from './evening.ts';
import type { WeatherSource } from './weather.ts';

/** 80 % range of evenings; null = not within the season. */
export type EveningRange = { early: Evening | null; likely: Evening | null; late: Evening | null };

export type ForecastNight = {
  evening: Evening;
  litHours: number;
  /** Charge the sum says is used since the set went in, at the end of this evening, mAh per set. */
  usedMah: number;
  /** Charge the set gives down to dimVolts in this evening's cold, mAh per set. */
  usableMah: number;
  /** Chance of being bright on this evening and every one from tonight up to it (from the swap, for evenings gone by). */
  chanceBright: number;
  /** Chance that it is lit all through this evening's lit hours; comes back after a cold blackout. */
  chanceLit: number;
  meanC: number;
  weather: WeatherSource;
  showNight: boolean;
  /** What the likely course does this evening. */
  likely: 'bright' | 'dim' | 'dark-cold' | 'dark-used-up' | 'not-lit';
};

export type Warning = { code: string; text: string };

/** The sum behind the date. The product of the shares and `capacityMah` is the usable charge tonight. */
export type Why = {
  /** Mean current while lit tonight, mA: of a fading light, at its present volts. */
  meanMa: number | null;
  standbyMa: number;
  litHoursTonight: number;
  /** What trips take of tonight's charge. */
  tripMahTonight: number;
  mahTonight: number;
  /** Current for which `rateShare` was looked up, mA. */
  rateMa: number;
  capacityMah: number;
  coldShare: number;
  rateShare: number;
  cutOffShare: number;
  weakestShare: number;
  healthShare: number;
  leftAtStartShare: number;
  tonightC: number;
  defaults: string[];
  warnings: Warning[];
};

export type PropForecast = {
  propId: string;
  asOf: Instant;
  fittedAt: Instant | null;
  cellTypeId: string;
  usedMah: number | null;
  usedShare: number | null;
  usableMah: { at20C: number; tonight: number } | null;
  dim: EveningRange;
  dark: EveningRange;
  swapBy: Evening | null;
  cause: 'used-up' | 'cold' | null;
  drainFactor: { low: number; likely: number; high: number };
  nights: ForecastNight[];
  why: Why;
};

/** One prop in the site's forecast. */
export type SiteForecastProp = {
  propId: string;
  tag: string;
  name: string;
  zone: string;
  importance: 'must-not-fail' | 'feature' | 'background';
  group: 'fine' | 'next-round' | 'at-risk' | 'unknown';
  dim: EveningRange;
  dark: EveningRange;
  swapBy: Evening | null;
  cause: 'used-up' | 'cold' | null;
  /** Chance of being bright on every evening that matters until the next round, and the margin beyond. */
  chanceBrightToNextRound: number | null;
  /** Share of tonight's usable charge that is left, likely. */
  leftShare: number | null;
  lastSeen: 'bright' | 'dim' | 'dark' | 'odd' | null;
  /** Why it is in this group. */
  note: string | null;
};

export type SiteForecast = {
  asOf: Instant;
  /** The evening it is. */
  evening: Evening;
  nextRound: Evening | null;
  props: SiteForecastProp[];
};
