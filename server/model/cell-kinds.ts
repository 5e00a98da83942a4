import type { CellKind } from './cell-type.ts';

/** What a chemistry does, whatever the size of the cell. Voltages are per cell, not per block. */
export type CellKindFacts = {
  words: string;
  /** Of one cell, not of a block. */
  nominalVolts: number;
  /** Voltage at which the label capacity is counted as used, V. */
  cutOffVolts: number;
  /** Voltage at which one stops in practice: below it cells leak, reverse or are harmed, V. */
  practicalStopVolts: number;
  /** Lit voltage under a light load at 20 °C against the share used. */
  curve: { used: readonly number[]; volts: readonly number[] };
  /** Usable share at -30, -20 .. 40 °C relative to 20 °C at the same rate, by hours-rate (C/100 = 100), slowest last. */
  cold: ReadonlyArray<{ hoursRate: number; share: readonly number[] }>;
  /** One standard deviation of the slowest row of `cold`. */
  coldSd: readonly number[];
  /** Cold polarisation: ohm·Ah at 20 °C, doubling every so many K of cold. */
  polarisation: { ohmAh: number; doublingK: number };
  ratedFromC: number;
  /** Spread between cells of one batch, and of a batch about the label when the brand is unknown; shares. */
  unitSd: number;
  capacitySd: number;
  /** Share of the capacity lost a day at 20 °C by days since the set was new or charged; doubles-or-so per 10 K. */
  selfDischarge: { steps: ReadonlyArray<{ throughDays: number; sharePerDay: number }>; q10: number };
  /** Standard deviation of the voltage of one lit cell about the curve, V. */
  readingSdVolts: number;
};

export const COLD_GRID_C = [-30, -20, -10, 0, 10, 20, 30, 40] as const;

/**
 * Facts by chemistry. Sources: maker data sheets digitised for alkaline, coin, lead and lithium AA; a published
 * C/27 test at eight temperatures for lithium iron; published electrode fits for lithium-ion. The cold rows of
 * alkaline, zinc-carbon, nickel and coin below 0 °C are from memory of handbook charts or engineering estimates:
 * `coldSd` is wide there, and DEVELOPERS.md says which is which.
 */
export const CELL_KINDS: Readonly<Record<CellKind, CellKindFacts>> = {
  alkaline: {
    words: 'Alkaline',
    nominalVolts: 1.5,
    cutOffVolts: 0.9,
    practicalStopVolts: 0.9,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.15, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.85, 0.9, 0.95, 1, 1.06],
      volts: [
        1.629, 1.534, 1.472, 1.42, 1.381, 1.352, 1.313, 1.283, 1.254, 1.223, 1.183, 1.123, 1.073, 1.025,
        0.973, 0.9, 0.8,
      ],
    },
    cold: [
      { hoursRate: 5, share: [0.02, 0.06, 0.18, 0.4, 0.72, 1, 1.12, 1.2] },
      { hoursRate: 20, share: [0.05, 0.18, 0.4, 0.65, 0.86, 1, 1.05, 1.08] },
      { hoursRate: 200, share: [0.3, 0.55, 0.76, 0.88, 0.95, 1, 1.02, 1.03] },
    ],
    coldSd: [0.2, 0.15, 0.1, 0.06, 0.03, 0, 0.02, 0.02],
    polarisation: { ohmAh: 1, doublingK: 15 },
    ratedFromC: -18,
    unitSd: 0.03,
    capacitySd: 0.1,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.025 / 365 }],
      q10: 2,
    },
    readingSdVolts: 0.04,
  },
  'zinc-carbon': {
    words: 'Zinc-carbon',
    nominalVolts: 1.5,
    cutOffVolts: 0.9,
    practicalStopVolts: 0.9,
    curve: {
      used: [0, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1, 1.1],
      volts: [1.62, 1.52, 1.46, 1.38, 1.32, 1.27, 1.22, 1.17, 1.12, 1.06, 0.98, 0.9, 0.8],
    },
    cold: [
      { hoursRate: 5, share: [0, 0.02, 0.12, 0.4, 0.75, 1, 1.12, 1.2] },
      { hoursRate: 20, share: [0, 0.08, 0.3, 0.6, 0.85, 1, 1.08, 1.12] },
      { hoursRate: 200, share: [0.02, 0.2, 0.5, 0.75, 0.92, 1, 1.05, 1.08] },
    ],
    coldSd: [0.05, 0.1, 0.12, 0.1, 0.05, 0, 0.03, 0.04],
    polarisation: { ohmAh: 1.2, doublingK: 12 },
    ratedFromC: -10,
    unitSd: 0.05,
    capacitySd: 0.2,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.07 / 365 }],
      q10: 2,
    },
    readingSdVolts: 0.06,
  },
  'lithium-aa': {
    words: 'Lithium, single-use',
    nominalVolts: 1.5,
    cutOffVolts: 1,
    practicalStopVolts: 1,
    curve: {
      used: [0, 0.01, 0.03, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95, 0.98, 1],
      volts: [1.78, 1.7, 1.63, 1.59, 1.56, 1.52, 1.48, 1.43, 1.36, 1.22, 1],
    },
    cold: [
      { hoursRate: 5, share: [0.55, 0.72, 0.85, 0.93, 0.98, 1, 1.01, 1.01] },
      { hoursRate: 20, share: [0.75, 0.86, 0.93, 0.97, 0.99, 1, 1, 1] },
      { hoursRate: 200, share: [0.88, 0.93, 0.96, 0.98, 0.99, 1, 1, 1] },
    ],
    coldSd: [0.08, 0.06, 0.04, 0.03, 0.02, 0, 0.01, 0.02],
    polarisation: { ohmAh: 0.4, doublingK: 20 },
    ratedFromC: -40,
    unitSd: 0.03,
    capacitySd: 0.06,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.01 / 365 }],
      q10: 2,
    },
    readingSdVolts: 0.04,
  },
  nickel: {
    words: 'Nickel, low self-discharge',
    nominalVolts: 1.2,
    cutOffVolts: 1,
    practicalStopVolts: 1,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.25, 0.5, 0.75, 0.85, 0.9, 0.95, 0.98, 1],
      volts: [1.42, 1.37, 1.34, 1.31, 1.28, 1.26, 1.24, 1.22, 1.2, 1.15, 1.08, 1],
    },
    cold: [
      { hoursRate: 5, share: [0.1, 0.55, 0.78, 0.92, 0.98, 1, 0.99, 0.95] },
      { hoursRate: 100, share: [0.3, 0.75, 0.89, 0.96, 0.99, 1, 0.99, 0.96] },
    ],
    coldSd: [0.15, 0.1, 0.06, 0.03, 0.02, 0, 0.02, 0.03],
    polarisation: { ohmAh: 0.15, doublingK: 15 },
    ratedFromC: -20,
    unitSd: 0.02,
    capacitySd: 0.06,
    selfDischarge: {
      steps: [
        { throughDays: 42, sharePerDay: 0.07 / 42 },
        { throughDays: 365, sharePerDay: 0.08 / 323 },
        { throughDays: Infinity, sharePerDay: 0.05 / 365 },
      ],
      q10: 2,
    },
    readingSdVolts: 0.025,
  },
  'nickel-standard': {
    words: 'Nickel, standard',
    nominalVolts: 1.2,
    cutOffVolts: 1,
    practicalStopVolts: 1,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.25, 0.5, 0.75, 0.85, 0.9, 0.95, 0.98, 1],
      volts: [1.42, 1.37, 1.34, 1.31, 1.28, 1.26, 1.24, 1.22, 1.2, 1.15, 1.08, 1],
    },
    cold: [
      { hoursRate: 5, share: [0.1, 0.55, 0.78, 0.92, 0.98, 1, 0.99, 0.95] },
      { hoursRate: 100, share: [0.3, 0.75, 0.89, 0.96, 0.99, 1, 0.99, 0.96] },
    ],
    coldSd: [0.15, 0.1, 0.06, 0.03, 0.02, 0, 0.02, 0.03],
    polarisation: { ohmAh: 0.15, doublingK: 15 },
    ratedFromC: -20,
    unitSd: 0.02,
    capacitySd: 0.08,
    selfDischarge: {
      steps: [
        { throughDays: 1, sharePerDay: 0.08 },
        { throughDays: 42, sharePerDay: 0.04 / 41 },
        { throughDays: Infinity, sharePerDay: 0.2 / 30 },
      ],
      q10: 2,
    },
    readingSdVolts: 0.025,
  },
  'lithium-ion': {
    words: 'Lithium-ion',
    nominalVolts: 3.6,
    cutOffVolts: 2.5,
    practicalStopVolts: 3,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 1],
      volts: [
        4.2, 4.164, 4.124, 4.097, 4.042, 3.948, 3.841, 3.751, 3.667, 3.581, 3.485, 3.296, 3.109, 2.862, 2.5,
      ],
    },
    cold: [
      { hoursRate: 1, share: [0.54, 0.71, 0.82, 0.91, 0.96, 1, 1.01, 1.02] },
      { hoursRate: 10, share: [0.68, 0.82, 0.9, 0.95, 0.98, 1, 1.01, 1.02] },
      { hoursRate: 100, share: [0.85, 0.92, 0.96, 0.985, 0.995, 1, 1.005, 1.01] },
    ],
    coldSd: [0.08, 0.05, 0.03, 0.015, 0.01, 0, 0.01, 0.01],
    polarisation: { ohmAh: 0.14, doublingK: 11 },
    ratedFromC: -20,
    unitSd: 0.01,
    capacitySd: 0.06,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.015 / 30 }],
      q10: 2,
    },
    readingSdVolts: 0.025,
  },
  'lithium-iron': {
    words: 'Lithium iron phosphate',
    nominalVolts: 3.2,
    cutOffVolts: 2,
    practicalStopVolts: 2.8,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 1],
      volts: [
        3.58, 3.403, 3.353, 3.34, 3.332, 3.31, 3.297, 3.291, 3.281, 3.249, 3.219, 3.145, 2.974, 2.716, 2,
      ],
    },
    cold: [
      { hoursRate: 2, share: [0.35, 0.6, 0.765, 0.904, 0.963, 1, 1.005, 1.012] },
      { hoursRate: 27, share: [0.97, 0.985, 0.988, 0.989, 0.994, 1, 1.002, 1.003] },
    ],
    coldSd: [0.05, 0.02, 0.01, 0.005, 0.003, 0, 0.003, 0.003],
    polarisation: { ohmAh: 0.093, doublingK: 10 },
    ratedFromC: -20,
    unitSd: 0.01,
    capacitySd: 0.04,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.066 / 365 }],
      q10: 1.7,
    },
    readingSdVolts: 0.015,
  },
  coin: {
    words: 'Lithium coin',
    nominalVolts: 3,
    cutOffVolts: 2,
    practicalStopVolts: 2.2,
    curve: {
      used: [0, 0.02, 0.05, 0.1, 0.25, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 1],
      volts: [3.29, 2.983, 2.94, 2.918, 2.874, 2.84, 2.826, 2.812, 2.736, 2.586, 2.441, 2.245, 2],
    },
    cold: [
      { hoursRate: 80, share: [0.2, 0.4, 0.65, 0.82, 0.93, 1, 1.03, 1.05] },
      { hoursRate: 1000, share: [0.7, 0.85, 0.92, 0.96, 0.985, 1, 1, 1] },
    ],
    coldSd: [0.15, 0.12, 0.08, 0.05, 0.03, 0, 0.02, 0.02],
    polarisation: { ohmAh: 5, doublingK: 15 },
    ratedFromC: -20,
    unitSd: 0.03,
    capacitySd: 0.06,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.015 / 365 }],
      q10: 2,
    },
    readingSdVolts: 0.04,
  },
  lead: {
    words: 'Sealed lead',
    nominalVolts: 2,
    cutOffVolts: 1.8,
    practicalStopVolts: 1.8,
    curve: {
      used: [0, 0.05, 0.15, 0.25, 0.5, 0.7, 0.85, 1],
      volts: [2.08, 2.075, 2.07, 2.035, 1.965, 1.91, 1.86, 1.8],
    },
    cold: [
      { hoursRate: 4, share: [0.33, 0.493, 0.66, 0.8, 0.913, 1, 1.067, 1.113] },
      { hoursRate: 6, share: [0.4, 0.567, 0.713, 0.831, 0.927, 1, 1.056, 1.096] },
      { hoursRate: 10, share: [0.53, 0.684, 0.8, 0.883, 0.95, 1, 1.04, 1.06] },
      { hoursRate: 100, share: [0.6, 0.75, 0.85, 0.92, 0.965, 1, 1.025, 1.04] },
    ],
    coldSd: [0.1, 0.06, 0.04, 0.02, 0.01, 0, 0.01, 0.02],
    polarisation: { ohmAh: 0.3, doublingK: 18 },
    ratedFromC: -15,
    unitSd: 0.03,
    capacitySd: 0.08,
    selfDischarge: {
      steps: [{ throughDays: Infinity, sharePerDay: 0.03 / 30 }],
      q10: 1.8,
    },
    readingSdVolts: 0.025,
  },
};
