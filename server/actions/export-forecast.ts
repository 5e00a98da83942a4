import { forecastCsv } from '../exchange/forecast-csv.ts';
import type { Instant } from '../model/evening.ts';
import type { Deps } from './deps.ts';
import { forecastSite } from './forecast-site.ts';

/**
 * A site's forecast as a CSV file.
 * @param deps what a deed needs
 * @param input.asOf the moment it is made for; now when absent
 * @throws Refusal 'not-found'
 */
export function exportForecast(deps: Deps, input: { siteId: string; asOf?: Instant }): string {
  return forecastCsv(forecastSite(deps, input));
}
