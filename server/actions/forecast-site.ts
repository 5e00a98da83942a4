import { createHash } from 'node:crypto';
import { builtInCellType } from '../model/cell-types-built-in.ts';
import type { Instant } from '../model/evening.ts';
import type { SiteForecast } from '../model/forecast.ts';
import { projectProp, type ScheduleShelf } from '../model/prop-forecast.ts';
import { siteForecastProp } from '../planning/site-report.ts';
import { listCellTypes } from '../store/cell-types.ts';
import { siteLog } from '../store/log.ts';
import { listProps } from '../store/props.ts';
import { siteRevision } from '../store/sites.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { forecastSeason, presentMoment } from './forecast-season.ts';

/**
 * The forecast of every prop on a site, in four groups, as of a moment.
 * @param input.asOf the moment it is made for; now when absent
 * @throws Refusal 'not-found'
 */
export function forecastSite(deps: Deps, input: { siteId: string; asOf?: Instant }): SiteForecast {
  const { db } = deps.store;
  const { siteId } = input;
  siteOf(db, siteId);
  const asOf = input.asOf ?? presentMoment(deps, siteId);
  const props = listProps(db, siteId);
  const logs = siteLog(db, siteId);
  const { site, season, wanted, rounds } = forecastSeason(deps, {
    siteId,
    asOf,
    through: undefined,
    props,
    logs,
  });
  const ownTypes = new Map(listCellTypes(db).map((type) => [type.id, type]));
  const shelf: ScheduleShelf = new Map();
  const reach = { rounds, marginNights: site.marginNights };
  return {
    asOf,
    evening: wanted.today,
    nextRound: rounds[0] ?? null,
    props: props.map((prop) => {
      const outcome = projectProp({
        prop,
        log: logs.get(prop.id) ?? [],
        cellTypeOf: (id) => builtInCellType(id) ?? ownTypes.get(id) ?? null,
        zoneOffsetC: site.zoneOffsetsC[prop.zone] ?? 0,
        season,
        asOf,
        shelf,
        wholeSeason: false,
      });
      return siteForecastProp({ prop, asOf, season, wanted }, outcome, reach);
    }),
  };
}

/**
 * A mark that changes whenever the site's forecast may: the same mark means the same bytes. Costs two look-ups.
 * @throws Refusal 'not-found'
 */
export function siteForecastMark(deps: Deps, input: { siteId: string; asOf?: Instant }): string {
  siteOf(deps.store.db, input.siteId);
  const asOf = input.asOf ?? presentMoment(deps, input.siteId);
  const revision = siteRevision(deps.store.db, input.siteId);
  return createHash('sha256').update(`${input.siteId} ${revision} ${asOf}`).digest('base64url').slice(0, 22);
}
