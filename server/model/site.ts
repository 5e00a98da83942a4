import type { Evening } from './evening.ts';

/** When rounds may be made and what one costs. Weekdays are ISO (1 Monday .. 7 Sunday). */
export type RoundHabits = {
  weekdays: number[];
  /** Wall time 'HH:MM' at which a round usually starts. */
  startsAt: string;
  minutesFree: number;
  minutesPerStop: number;
  walkMinutes: number;
  /** In the same money as `priceEach` of a cell. */
  cost: number;
};

/** One display with one position and one time zone. */
export type Site = {
  id: string;
  name: string;
  /** North positive, -90..90. */
  latitudeDeg: number;
  /** East positive, -180..180. */
  longitudeDeg: number;
  /** IANA name. */
  timeZone: string;
  seasonFrom: Evening;
  seasonThrough: Evening;
  /** Mean daily minima, January first, °C. */
  monthlyMinC: number[];
  /** Mean daily maxima, January first, °C. */
  monthlyMaxC: number[];
  /** Chance of staying bright that a plan must keep, 0.5..0.999. */
  confidence: number;
  /** Evenings of slack wanted beyond the next round, 0..5. */
  marginNights: number;
  rounds: RoundHabits;
  /** K warmer (+) or colder (-) than the site, by zone name. */
  zoneOffsetsC: Record<string, number>;
};
