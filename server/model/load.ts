import { check } from './check.ts';

/** How the current goes as the set's voltage falls. */
export type Behaviour = 'steady' | 'fades' | 'holds';
export type Wave = 'even-fade' | 'blink' | 'rc-fade' | 'steady';

/** What one unit of a prop takes from its set. */
export type Load = {
  behaviour: Behaviour;
  /** Mean current while lit, mA. Either this, or low, peak and wave. */
  meanMa?: number;
  lowMa?: number;
  peakMa?: number;
  wave?: Wave;
  /** Share of the cycle spent on (blink) or rising (rc-fade), 0..1. */
  onShare?: number;
  /** Current while waiting, mA, day and night. */
  standbyMa: number;
  /** Volts of the whole set when the current was measured. */
  measuredVolts?: number;
  /** Volts at which the LEDs stop conducting, for a load that fades. */
  ledVolts?: number;
};

/** Runs set off by visitors, on top of whatever the switching does. */
export type Trips = {
  perShowNight: number;
  perNightOff: number;
  seconds: number;
  runMa: number;
};

/** Mean of the rising and of the falling half of a wave that follows a timing capacitor between 1/3 and 2/3 of the supply. */
const CAPACITOR_RISE_MEAN = 2 - 1 / Math.LN2;
const CAPACITOR_FALL_MEAN = 1 / Math.LN2 - 1;

/**
 * Mean current of a wave between its lowest and highest reading, mA.
 *
 * even-fade: any shape symmetric about its middle. blink: on for `onShare` of the time. rc-fade: follows a timing
 * capacitor that charges and discharges between one and two thirds of the supply, rising for `onShare` of the time.
 * steady: the peak. Source: integrals of the wave over one cycle; the capacitor's halves average 0.5573 and 0.4427
 * of the swing. Not valid where the LED is dark for part of the cycle: then measure the mean.
 */
export function waveMeanMa(wave: Wave, of: { lowMa: number; peakMa: number; onShare: number }): number {
  check(of.peakMa >= of.lowMa, 'the peak of a wave is below its low');
  const swing = of.peakMa - of.lowMa;
  switch (wave) {
    case 'even-fade':
      return of.lowMa + swing / 2;
    case 'blink':
      return of.lowMa + swing * of.onShare;
    case 'rc-fade':
      return of.lowMa + swing * (CAPACITOR_RISE_MEAN * of.onShare + CAPACITOR_FALL_MEAN * (1 - of.onShare));
    case 'steady':
      return of.peakMa;
  }
}

/** A load with its gaps filled, and the names of the fields that were filled. */
export type ReckonedLoad = {
  behaviour: Behaviour;
  /** null: nothing says what it draws while lit. */
  meanMa: number | null;
  peakMa: number;
  standbyMa: number;
  measuredVolts: number;
  ledVolts: number;
  /** One standard deviation of the logarithm of the mean draw. */
  spread: number;
  defaults: string[];
};

/** White and blue LEDs need about 2.9 V, red and amber about 1.9 V (from memory of indicator data sheets). */
const WHITE_LED_VOLTS = 2.9;
const RED_LED_VOLTS = 1.9;
/** Below this one takes it for a set whose standby was too small for the meter. Common practice, no source. */
const ASSUMED_STANDBY_MA = 0.05;

/**
 * Fills the gaps of a load: mean from low, peak and wave; volts at which it was measured; LED volts.
 * @param about.freshVolts lit volts of a fresh set; @param about.dimVolts the prop's own
 * @param about.waits whether it has a circuit that waits: then a standby of 0 is read as "too small to measure"
 */
export function reckonLoad(
  load: Load,
  about: { nominalVolts: number; dimVolts: number; waits: boolean },
): ReckonedLoad {
  const defaults: string[] = [];
  const orDefault = (field: keyof Load, value: number | undefined, otherwise: number): number => {
    if (value !== undefined) return value;
    defaults.push(`load.${field}`);
    return otherwise;
  };
  const followsVolts = load.behaviour !== 'steady';
  const measuredVolts = followsVolts
    ? orDefault('measuredVolts', load.measuredVolts, about.nominalVolts)
    : (load.measuredVolts ?? about.nominalVolts);
  const likelyLedVolts = about.dimVolts >= WHITE_LED_VOLTS + 0.1 ? WHITE_LED_VOLTS : RED_LED_VOLTS;
  const ledVolts =
    load.behaviour === 'fades'
      ? Math.min(
          orDefault('ledVolts', load.ledVolts, Math.min(likelyLedVolts, about.dimVolts * 0.9)),
          measuredVolts * 0.98,
        )
      : 0;
  const { meanMa, spread } = meanOf(load, defaults);
  const assumeStandby = about.waits && load.standbyMa === 0;
  if (assumeStandby) defaults.push('load.standbyMa');
  return {
    behaviour: load.behaviour,
    meanMa,
    peakMa: Math.max(load.peakMa ?? 0, meanMa ?? 0),
    standbyMa: assumeStandby ? ASSUMED_STANDBY_MA : load.standbyMa,
    measuredVolts,
    ledVolts,
    spread: followsVolts && load.measuredVolts === undefined ? Math.hypot(spread, 0.15) : spread,
    defaults,
  };
}

/**
 * Widths of the mean draw, as standard deviations of its logarithm: engineering estimates. A meter's average over
 * whole cycles 0.08; a mean reckoned from low, peak and wave 0.12, and 0.20 where the wave itself is a guess.
 */
function meanOf(load: Load, defaults: string[]): { meanMa: number | null; spread: number } {
  if (load.meanMa !== undefined) return { meanMa: load.meanMa, spread: 0.08 };
  if (load.peakMa === undefined) return { meanMa: null, spread: 0.3 };
  const wave = load.wave ?? (load.lowMa === undefined ? 'steady' : 'even-fade');
  if (load.wave === undefined) defaults.push('load.wave');
  if (load.lowMa === undefined && wave !== 'steady') defaults.push('load.lowMa');
  const needsShare = wave === 'blink' || wave === 'rc-fade';
  if (needsShare && load.onShare === undefined) defaults.push('load.onShare');
  const lowMa = load.lowMa ?? 0;
  const meanMa = waveMeanMa(wave, { lowMa, peakMa: load.peakMa, onShare: load.onShare ?? 0.5 });
  return { meanMa, spread: load.wave === undefined ? 0.2 : 0.12 };
}

/** Below this share of the measured current a fading load counts as still drawing that much, so that sums end. */
const LEAST_FADE_SHARE = 0.02;

/**
 * Lit current of a load relative to its mean, at `packVolts` of the whole set.
 *
 * steady: 1. fades (LEDs behind a resistor): (V - Vled) ÷ (Vmeasured - Vled), never below 0.02. holds (step-up or
 * regulated): Vmeasured ÷ V, so the current rises as the set falls. Source: Ohm's law and constant power.
 */
export function drawShareAtVolts(load: ReckonedLoad, packVolts: number): number {
  switch (load.behaviour) {
    case 'steady':
      return 1;
    case 'fades':
      return Math.max(LEAST_FADE_SHARE, (packVolts - load.ledVolts) / (load.measuredVolts - load.ledVolts));
    case 'holds':
      return load.measuredVolts / Math.max(packVolts, load.measuredVolts * 0.1);
  }
}
