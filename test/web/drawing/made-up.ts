import type { BandNight } from '../../../web/drawing/night-band.ts';
import type { SeasonNight, SeasonValues } from '../../../web/drawing/season-wick.ts';
import type { WickValues } from '../../../web/drawing/wick.ts';
import { addDays } from '../../../web/words/time.ts';

// Made-up values that lead a drawing to its edges. What is checked is the drawing, not the numbers.

export const WICK: WickValues = {
  leftShare: 0.6,
  dim: { earlyNights: 4, likelyNights: 6, lateNights: 9 },
  darkLikelyNights: 8,
  roundNights: 2,
  coldOut: false,
};

export const WICKS: Record<string, WickValues> = {
  'wick-usual': WICK,
  'wick-no-set': { ...WICK, leftShare: null },
  'wick-past-the-season': {
    ...WICK,
    dim: { earlyNights: null, likelyNights: null, lateNights: null },
    darkLikelyNights: null,
  },
  'wick-dim-now': {
    ...WICK,
    leftShare: 0,
    dim: { earlyNights: -2, likelyNights: 0, lateNights: 1 },
    darkLikelyNights: 2,
  },
  'wick-dark-now': {
    ...WICK,
    leftShare: 0,
    dim: { earlyNights: -5, likelyNights: -3, lateNights: -1 },
    darkLikelyNights: 0,
  },
  'wick-cold-out': { ...WICK, darkLikelyNights: 0, coldOut: true },
};

type NightOf = (day: number) => Partial<SeasonNight>;

function season(count: number, nightOf: NightOf): SeasonNight[] {
  return Array.from({ length: count }, (_, day) => ({
    evening: addDays('2026-10-10', day),
    litHours: 6,
    leftShare: Math.max(0, 1 - day / count),
    chanceBright: 1,
    chanceLit: 1,
    likely: 'bright' as const,
    meanC: 8,
    showNight: day % 7 < 3,
    ...nightOf(day),
  }));
}

const none = { marks: [], tonight: null, nextRound: null, swapBy: null };

/** Fades from night 14 on, dim from 17, dark from 20. */
const fading: NightOf = (day) => ({
  chanceBright: Math.min(1, Math.max(0, (21 - day) / 8)),
  likely: day < 17 ? 'bright' : day < 20 ? 'dim' : 'dark-used-up',
});

export const SEASONS: Record<string, SeasonValues> = {
  'season-fading': {
    nights: season(24, fading),
    marks: [
      { evening: '2026-10-10', mark: 'swap', text: 'Sat 10 Oct: swapped' },
      { evening: '2026-10-20', mark: 'bright', text: 'Tue 20 Oct: seen bright' },
      { evening: '2026-12-24', mark: 'dim', text: 'after the season' },
    ],
    tonight: '2026-10-22',
    nextRound: '2026-10-24',
    swapBy: '2026-10-24',
  },
  'season-no-set': { nights: [], ...none },
  'season-one-night': {
    nights: season(1, () => ({})),
    ...none,
    tonight: '2026-10-10',
    nextRound: '2026-10-10',
  },
  'season-cold-and-back': {
    nights: season(24, (day) => ({
      meanC: day >= 17 && day <= 19 ? -4 : 6,
      leftShare: day >= 17 && day <= 19 ? 0 : 0.6 - day / 100,
      chanceBright: day < 17 ? 1 : 0.1,
      chanceLit: day >= 17 && day <= 19 ? 0.1 : 0.95,
      likely: day >= 17 && day <= 19 ? 'dark-cold' : 'bright',
    })),
    ...none,
    tonight: '2026-10-22',
  },
  'season-120-nights': {
    nights: season(120, (day) => ({ chanceBright: 1 - day / 120 })),
    ...none,
    tonight: '2026-11-30',
  },
  'season-polar-night': { nights: season(10, () => ({ litHours: 24, meanC: -12 })), ...none },
};

function band(count: number, nightOf: (day: number) => Partial<BandNight>): BandNight[] {
  return Array.from({ length: count }, (_, day) => ({
    evening: addDays('2026-10-20', day),
    dusk: day < 5 ? '18:30' : '17:25',
    dawn: day < 5 ? '07:10' : '06:15',
    sun: null,
    gate: null,
    minC: 6,
    ...nightOf(day),
  }));
}

const gate = { opensAt: '18:30', closesAt: '21:30', calledOff: false };

export const BANDS: Record<string, BandNight[]> = {
  'band-clock-change': band(10, (day) => ({
    ...(day % 3 === 0 ? { gate: { ...gate, calledOff: day === 3 } } : {}),
    minC: day > 6 ? -3 : 6,
  })),
  'band-one-night': band(1, () => ({ gate })),
  'band-no-nights': [],
  'band-120-nights': band(120, (day) => ({ minC: day % 40 === 0 ? 0 : 8 })),
  'band-polar-night': band(8, () => ({ dusk: null, dawn: null, sun: 'never-light', minC: -20 })),
  'band-midnight-sun': band(8, () => ({ dusk: null, dawn: null, sun: 'never-dark' })),
  'band-into-polar-night': band(8, (day) =>
    day < 4 ? {} : { dusk: null, dawn: null, sun: 'never-light' as const },
  ),
};
