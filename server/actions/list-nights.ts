import { type Evening, eveningsFrom, type Instant } from '../model/evening.ts';
import { type DarkSpell, darkHoursOf, darkSpell, SUNSET_ALTITUDE_DEG } from '../model/sun.ts';
import type { ShowNight } from '../model/switching.ts';
import { eveningWeather, type WeatherSource } from '../model/weather.ts';
import { runOfEveningsFaults } from './check-site.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { siteSeason } from './prepare-season.ts';
import { refuseFaults } from './refusal.ts';

/** One evening at a site: its sun, its visitors, its weather. */
export type Night = {
  evening: Evening;
  sunsetAt: Instant | null;
  sunriseAt: Instant | null;
  /** Civil: the sun 6° below the horizon. */
  duskAt: Instant | null;
  dawnAt: Instant | null;
  /** Between this evening's noon and the next, with the sun below civil dusk. */
  darkHours: number;
  /** Why a dusk or a dawn is missing: from there on it does not get dark, or does not get light. */
  sun?: 'never-dark' | 'never-light';
  showNight: ShowNight | null;
  meanC: number;
  minC: number;
  weather: WeatherSource;
};

const CIVIL_DEG = -6;

/**
 * The nights of a run of evenings, the season's own when none is given.
 * @param deps what a deed needs
 * @param input.from first evening
 * @param input.through last evening, at most 400 on
 * @param input.asOf the moment whose knowledge counts; now when absent
 * @throws Refusal 'not-found'; 'invalid' for a run that is no run
 */
export function listNights(
  deps: Deps,
  input: { siteId: string; from?: Evening; through?: Evening; asOf?: Instant },
): Night[] {
  const site = siteOf(deps.store.db, input.siteId);
  const run = { from: input.from ?? site.seasonFrom, through: input.through ?? site.seasonThrough };
  refuseFaults(runOfEveningsFaults(run, ['from', 'through']));
  const asOf = input.asOf ?? deps.clock.now();
  const season = siteSeason(deps, site.id, { ...run, asOf });
  return eveningsFrom(run.from, run.through).map((evening) => {
    const sun = darkSpell(evening, season.place, SUNSET_ALTITUDE_DEG);
    const civil = darkSpell(evening, season.place, CIVIL_DEG);
    const { meanC, minC, source } = eveningWeather(season.weather, evening);
    return {
      evening,
      sunsetAt: sun.duskAt,
      sunriseAt: sun.dawnAt,
      duskAt: civil.duskAt,
      dawnAt: civil.dawnAt,
      darkHours: darkHoursOf(evening, season.place, CIVIL_DEG),
      ...missing(civil),
      showNight: season.showNights.get(evening) ?? null,
      meanC,
      minC,
      weather: source,
    };
  });
}

function missing(civil: DarkSpell): Pick<Night, 'sun'> {
  if (civil.duskAt !== null && civil.dawnAt !== null) return {};
  return { sun: civil.state === 'never-dark' || civil.state === 'dawn-only' ? 'never-dark' : 'never-light' };
}
