import type { SiteForecast } from '../server/model/forecast.ts';
import { eveningWords, rangeWords } from '../server/planning/evening-words.ts';

const GROUP_WORDS = { 'at-risk': 'AT RISK', 'next-round': 'next round', fine: 'fine', unknown: 'not known' };
const GROUP_ORDER = ['at-risk', 'next-round', 'fine', 'unknown'] as const;

/** The site's forecast for a terminal: one line a prop, the most pressing first. */
export function swapTable(forecast: SiteForecast): string {
  const head = ['tag', 'prop', 'group', 'looks dim', 'dark', 'swap by', 'left'];
  const rows = GROUP_ORDER.flatMap((group) => forecast.props.filter((prop) => prop.group === group)).map(
    (prop) => {
      const known = prop.group !== 'unknown';
      return [
        prop.tag,
        prop.name.length > 28 ? `${prop.name.slice(0, 27)}…` : prop.name,
        GROUP_WORDS[prop.group],
        known ? rangeWords(prop.dim, 'after the season') : '–',
        known ? rangeWords(prop.dark, 'after the season') : '–',
        known ? (prop.swapBy ? eveningWords(prop.swapBy) : 'none needed') : '–',
        prop.leftShare === null ? '–' : `${Math.round(prop.leftShare * 100)} %`,
      ];
    },
  );
  const widths = head.map((_, column) => Math.max(...[head, ...rows].map((row) => row[column]!.length)));
  const line = (row: string[]) =>
    row
      .map((cell, column) => cell.padEnd(widths[column]!))
      .join('  ')
      .trimEnd();
  return [line(head), widths.map((width) => '-'.repeat(width)).join('  '), ...rows.map(line)].join('\n');
}
