import {
  addEvenings,
  type Evening,
  eveningAhead,
  eveningOf,
  eveningsBetween,
  type Instant,
  instantInEvening,
} from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import type { Prop } from '../model/prop.ts';
import type { Season } from '../model/schedule.ts';
import { setInUse } from '../model/set-in-use.ts';
import type { Site } from '../model/site.ts';
import { nextRounds, type Wanted } from '../planning/need.ts';
import { siteChangedAt } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { siteSeason } from './prepare-season.ts';

/** A set is followed back this far at most, and a forecast looks this far ahead at most. */
export const LONGEST_EVENINGS = 400;
const QUARTER_HOUR_MS = 15 * 60_000;

/**
 * The moment a forecast is made for when nobody names one: the quarter hour now past, or the last change if that is
 * later, so that a swap counts at once and an unchanged site gives unchanged bytes for a while.
 */
export function presentMoment(deps: Deps, siteId: string): Instant {
  const now = deps.clock.now();
  const quarter = Math.floor(now / QUARTER_HOUR_MS) * QUARTER_HOUR_MS;
  const changedAt = siteChangedAt(deps.store.db, siteId);
  return changedAt <= now ? Math.max(quarter, changedAt) : quarter;
}

export type ForecastSeason = { site: Site; season: Season; wanted: Wanted; rounds: Evening[] };

/**
 * Weather, show nights and rounds for a forecast as of a moment, from the evening the oldest set in use went in
 * (at most 400 evenings back) to the season's end or `through`.
 * @throws Refusal 'not-found'
 */
export function forecastSeason(
  deps: Deps,
  of: {
    siteId: string;
    asOf: Instant;
    through: Evening | undefined;
    props: readonly Prop[];
    logs: ReadonlyMap<string, readonly LogEntry[]>;
  },
): ForecastSeason {
  const { seasonThrough, timeZone } = siteOf(deps.store.db, of.siteId);
  const today = eveningAhead(of.asOf, timeZone);
  const lastWanted = of.through ?? seasonThrough;
  const through = eveningsBetween(today, lastWanted) >= 0 ? lastWanted : today;
  let from = today;
  for (const prop of of.props) {
    const set = setInUse(prop, of.logs.get(prop.id) ?? [], of.asOf);
    if (!set) continue;
    const fitted = eveningOf(set.fittedAt, timeZone);
    const back = eveningsBetween(fitted, today);
    if (fitted < from && back <= LONGEST_EVENINGS) from = fitted;
  }
  const last =
    eveningsBetween(today, through) > LONGEST_EVENINGS ? addEvenings(today, LONGEST_EVENINGS) : through;
  const { site, place, weather, showNights } = siteSeason(deps, of.siteId, {
    asOf: of.asOf,
    from,
    through: last,
  });
  const everyEvening = showNights.size === 0;
  const tooLateToday = of.asOf > instantInEvening(today, site.rounds.startsAt, timeZone);
  return {
    site,
    season: { place, from, through: last, weather, showNights },
    wanted: { everyEvening, confidence: site.confidence, today },
    rounds: nextRounds(today, { weekdays: site.rounds.weekdays, tooLateToday }),
  };
}
