import { formatInstant } from '../model/evening.ts';
import type { Prop } from '../model/prop.ts';
import { csvText } from './csv.ts';

/** What one cell of a props file holds; null is an empty cell. */
export type PropCell = string | number | null;
/** Cells by field; a field not in it has no column. */
export type PropCells = Record<string, PropCell>;

const TEXT_FIELDS = new Set([
  'tag',
  'name',
  'zone',
  'importance',
  'cellTypeId',
  'load.behaviour',
  'load.wave',
  'switching.kind',
  'switching.onAt',
  'switching.offAt',
  'switching.setAt',
]);

/** The columns of a props file, in order: the fields of a prop, nested ones with a dot. */
export const PROP_COLUMNS = [
  'tag',
  'name',
  'zone',
  'xM',
  'yM',
  'units',
  'importance',
  'cellTypeId',
  'series',
  'parallel',
  'dimVolts',
  'stopVolts',
  'load.behaviour',
  'load.meanMa',
  'load.lowMa',
  'load.peakMa',
  'load.wave',
  'load.onShare',
  'load.standbyMa',
  'load.measuredVolts',
  'load.ledVolts',
  'switching.kind',
  'switching.onLux',
  'switching.onAltitudeDeg',
  'switching.offLux',
  'switching.offAltitudeDeg',
  'switching.skyShare',
  'switching.cutOffHours',
  'switching.onAt',
  'switching.offAt',
  'switching.onHours',
  'switching.setAt',
  'trips.perShowNight',
  'trips.perNightOff',
  'trips.seconds',
  'trips.runMa',
  'offsetC',
] as const;

/** Whether a column holds numbers; the others hold text. */
export const isNumberColumn = (field: string): boolean => !TEXT_FIELDS.has(field);

/**
 * Props as a CSV file that can be taken in again.
 * @param props in the order of the rows
 */
export function propsCsv(props: readonly Prop[]): string {
  const rows = props.map((prop) => {
    const cells = propCells(prop);
    return PROP_COLUMNS.map((field) => cells[field]);
  });
  return csvText(PROP_COLUMNS, rows);
}

/** A prop as cells: every column is there, empty where the prop has no such field. */
export function propCells(prop: Prop): PropCells {
  return Object.fromEntries(PROP_COLUMNS.map((field) => [field, cellOf(prop, field)]));
}

function cellOf(prop: Prop, field: string): PropCell {
  const [outer = '', inner] = field.split('.');
  const part = (prop as unknown as Record<string, unknown>)[outer];
  const value = inner === undefined ? part : (part as Record<string, unknown> | undefined)?.[inner];
  if (value === undefined) return null;
  return field === 'switching.setAt' ? formatInstant(value as number) : (value as string | number);
}

/**
 * The prop that cells stand for, as the API takes one: empty cells are left out, and trips where all are empty.
 * @param cells by field
 */
export function propOfCells(cells: PropCells): Record<string, unknown> {
  const prop: Record<string, unknown> = { load: {}, switching: {} };
  for (const [field, cell] of Object.entries(cells)) {
    if (cell === null) continue;
    const [outer = '', inner] = field.split('.');
    if (inner === undefined) prop[outer] = cell;
    else prop[outer] = { ...(prop[outer] as object | undefined), [inner]: cell };
  }
  return prop;
}
