import {
  addEvenings,
  type Evening,
  eveningAhead,
  eveningOf,
  eveningsBetween,
  type Instant,
  instantInEvening,
  latestOf,
} from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import type { Prop } from '../model/prop.ts';
import type { Season } from '../model/schedule.ts';
import { setInUse } from '../model/set-in-use.ts';
import type { Site } from '../model/site.ts';
import { darkSpell } from '../model/sun.ts';
import { DEFAULT_ON_ALTITUDE_DEG } from '../model/switching.ts';
import { nextRounds, type Wanted } from '../planning/need.ts';
import { siteChangedAt } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { siteSeason } from './prepare-season.ts';
import { type Fault, refuseFaults } from './refusal.ts';

/** A set is followed back this far at most, and a forecast looks this far ahead at most. */
export const LONGEST_EVENINGS = 400;
const MINUTE_MS = 60_000;
const QUARTER_HOUR_MS = 15 * MINUTE_MS;

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
 * (at most 400 evenings back) to the season's end, or `through` where that is later.
 * @throws Refusal 'not-found'; 'invalid' for a `through` before tonight or over 400 evenings ahead
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
  if (of.through !== undefined) refuseFaults(throughFaults(of.through, today));
  const through = latestOf(seasonThrough, of.through ?? today, today);
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
  const season = { place, from, through: last, closes: seasonThrough, weather, showNights };
  const tooLateToday = of.asOf > instantInEvening(today, site.rounds.startsAt, timeZone);
  return {
    site,
    season,
    wanted: {
      everyEvening,
      confidence: site.confidence,
      today,
      roundInTime: (evening) => roundInTime(site, season, evening),
    },
    rounds: nextRounds(today, { weekdays: site.rounds.weekdays, tooLateToday, seasonThrough }),
  };
}

function throughFaults(through: Evening, today: Evening): Fault[] {
  const ahead = eveningsBetween(today, through);
  if (ahead >= 0 && ahead <= LONGEST_EVENINGS) return [];
  const message =
    ahead < 0
      ? `through ${through} lies before tonight, ${today}. A forecast runs from the evening the set went in to an evening to come.`
      : `through ${through} is ${ahead} evenings ahead, and a forecast looks at most ${LONGEST_EVENINGS} ahead. Is the year right?`;
  return [{ field: 'through', message }];
}

/** Somebody who starts at the usual hour and walks the whole loop is round before the gate opens, or before civil dusk. */
function roundInTime(site: Site, season: Season, evening: Evening): boolean {
  const { startsAt, walkMinutes } = site.rounds;
  const doneAt = instantInEvening(evening, startsAt, site.timeZone) + walkMinutes * MINUTE_MS;
  const show = season.showNights.get(evening);
  if (show && !show.calledOff) return doneAt <= instantInEvening(evening, show.opensAt, site.timeZone);
  const { duskAt, state } = darkSpell(evening, season.place, DEFAULT_ON_ALTITUDE_DEG);
  return duskAt === null ? state === 'never-dark' : doneAt <= duskAt;
}
