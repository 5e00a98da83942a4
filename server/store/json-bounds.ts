// Bounds of the numbers kept inside JSON columns, by field: smallest and largest.

import { INSTANT_BOUNDS } from './column-types.ts';

export const ROUND_BOUNDS = {
  minutesFree: [0, 1440],
  minutesPerStop: [0, 240],
  walkMinutes: [0, 1440],
  cost: [0, 1_000_000],
} as const;

export const LOAD_BOUNDS = {
  meanMa: [0, 20_000],
  lowMa: [0, 20_000],
  peakMa: [0, 20_000],
  onShare: [0, 1],
  standbyMa: [0, 5_000],
  measuredVolts: [0.1, 60],
  ledVolts: [0, 60],
} as const;

export const SWITCHING_BOUNDS = {
  onLux: [0.001, 100_000],
  onAltitudeDeg: [-18, 10],
  offLux: [0.001, 100_000],
  offAltitudeDeg: [-18, 10],
  skyShare: [0.01, 1],
  cutOffHours: [0.25, 24],
  onHours: [0.25, 24],
  setAt: INSTANT_BOUNDS,
} as const;

export const TRIPS_BOUNDS = {
  perShowNight: [0, 20_000],
  perNightOff: [0, 20_000],
  seconds: [0.1, 3_600],
  runMa: [0.001, 20_000],
} as const;
