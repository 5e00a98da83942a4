import { formatInstant } from '../model/evening.ts';
import type { SiteForecast, SiteForecastProp } from '../model/forecast.ts';
import { type CsvCell, csvText } from './csv.ts';

/** The columns of a forecast file, in order; `asOf` and `nextRound` are the same in every row. */
export const FORECAST_COLUMNS = [
  'tag',
  'name',
  'zone',
  'importance',
  'group',
  'swapBy',
  'dim.early',
  'dim.likely',
  'dim.late',
  'dark.early',
  'dark.likely',
  'dark.late',
  'cause',
  'chanceBrightToNextRound',
  'leftShare',
  'lastSeen',
  'note',
  'nextRound',
  'asOf',
] as const;

/** Digits of a reckoned number that are written: the rest says nothing. */
const DIGITS = 6;

/**
 * A site's forecast as a CSV file, a prop a row.
 * @param forecast of the whole site
 */
export function forecastCsv(forecast: SiteForecast): string {
  const same = { nextRound: forecast.nextRound, asOf: formatInstant(forecast.asOf) };
  const rows = forecast.props.map((prop) => {
    const cells: Record<string, CsvCell> = { ...same, ...cellsOf(prop) };
    return FORECAST_COLUMNS.map((column) => cells[column]);
  });
  return csvText(FORECAST_COLUMNS, rows);
}

function cellsOf(prop: SiteForecastProp): Record<string, CsvCell> {
  const { dim, dark, chanceBrightToNextRound, leftShare, propId: _, ...plain } = prop;
  return {
    ...plain,
    'dim.early': dim.early,
    'dim.likely': dim.likely,
    'dim.late': dim.late,
    'dark.early': dark.early,
    'dark.likely': dark.likely,
    'dark.late': dark.late,
    chanceBrightToNextRound: rounded(chanceBrightToNextRound),
    leftShare: rounded(leftShare),
  };
}

function rounded(share: number | null): number | null {
  return share === null ? null : Number(share.toPrecision(DIGITS));
}
