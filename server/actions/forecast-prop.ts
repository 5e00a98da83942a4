import type { Evening, Instant } from '../model/evening.ts';
import type { PropForecast } from '../model/forecast.ts';
import { projectProp } from '../model/prop-forecast.ts';
import { propForecast } from '../planning/forecast-report.ts';
import { propLog } from '../store/log.ts';
import type { Deps } from './deps.ts';
import { findCellTypeAnywhere } from './find-cell-type.ts';
import { propOf } from './find-prop.ts';
import { forecastSeason, presentMoment } from './forecast-season.ts';

/**
 * The whole forecast of one prop.
 * @param input.asOf the moment it is made for; now when absent. @param input.through last evening; the season's end when absent
 * @throws Refusal 'not-found'
 */
export function forecastProp(
  deps: Deps,
  input: { propId: string; asOf?: Instant; through?: Evening },
): PropForecast {
  const { db } = deps.store;
  const prop = propOf(db, input.propId);
  const asOf = input.asOf ?? presentMoment(deps, prop.siteId);
  const log = propLog(db, prop.id);
  const { site, season, wanted } = forecastSeason(deps, {
    siteId: prop.siteId,
    asOf,
    through: input.through,
    props: [prop],
    logs: new Map([[prop.id, log]]),
  });
  const outcome = projectProp({
    prop,
    log,
    cellTypeOf: (id) => findCellTypeAnywhere(deps, id),
    zoneOffsetC: site.zoneOffsetsC[prop.zone] ?? 0,
    season,
    asOf,
    shelf: new Map(),
    wholeSeason: true,
  });
  const nights = input.through === undefined ? {} : { through: input.through };
  return propForecast({ prop, asOf, season, wanted, ...nights }, outcome);
}
