import { eveningOf, formatInstant } from '../model/evening.ts';
import type { LogEntry } from '../model/log-entry.ts';
import type { Prop } from '../model/prop.ts';
import { type CsvCell, csvText } from './csv.ts';

/** The columns of a log file, in order: which prop, when, and the fields of both kinds of entry. */
export const LOG_COLUMNS = [
  'tag',
  'name',
  'zone',
  'evening',
  'at',
  'kind',
  'state',
  'leftShare',
  'cellTypeId',
  'cells',
  'setId',
  'healthShare',
  'oldSet',
  'seen',
  'volts',
  'taken',
  'note',
  'recordedAt',
] as const;

/**
 * A site's log as a CSV file, in the order given.
 * @param entries each with the prop it belongs to
 * @param timeZone IANA name of the site's zone, for the evening each counts with
 */
export function logCsv(entries: readonly { prop: Prop; entry: LogEntry }[], timeZone: string): string {
  const rows = entries.map(({ prop, entry }) => {
    const cells: Record<string, unknown> = {
      ...entry,
      tag: prop.tag,
      name: prop.name,
      zone: prop.zone,
      evening: eveningOf(entry.at, timeZone),
      at: formatInstant(entry.at),
      recordedAt: formatInstant(entry.recordedAt),
    };
    return LOG_COLUMNS.map((column) => cells[column] as CsvCell);
  });
  return csvText(LOG_COLUMNS, rows);
}
