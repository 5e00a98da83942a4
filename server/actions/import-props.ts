import { CsvError } from '../exchange/csv.ts';
import { PROP_COLUMNS, type PropCells, propCells, propOfCells } from '../exchange/props-csv.ts';
import { type CellRemark, type PropsFile, readPropsCsv } from '../exchange/read-props-csv.ts';
import type { CellType } from '../model/cell-type.ts';
import type { Prop } from '../model/prop.ts';
import type { Db } from '../store/open.ts';
import { listProps, saveProps } from '../store/props.ts';
import { raiseRevision } from '../store/sites.ts';
import { MOST_PROPS, type NewProp, tidyProp } from './add-prop.ts';
import { propFaults } from './check-prop.ts';
import type { Deps } from './deps.ts';
import { findCellTypeAnywhere, unknownCellTypeFault } from './find-cell-type.ts';
import { siteOf } from './find-site.ts';
import { columnFaults, missingColumnFaults } from './import-columns.ts';
import { type Fault, Refusal } from './refusal.ts';
import { tidyText } from './tidy-text.ts';

/** Reads a new prop from outside, field by field; `faults` where it is none. */
export type PropReader = (value: unknown) => { prop: NewProp } | { faults: Fault[] };

export type PropsImport = {
  /** Rows with a prop in them. */
  rows: number;
  /** Props taken in, or that would be; none where anything is rejected. */
  accepted: number;
  added: number;
  changed: number;
  unchanged: number;
  rejected: CellRemark[];
  /** Further faults that are not listed. */
  unlisted: number;
  notes: CellRemark[];
  /** What is new and what changes, row by row, the first ones. */
  changes: PropChange[];
};

export type PropChange = { row: number; tag: string; name: string; isNew: boolean; fields: string[] };

const MOST_REJECTED = 2000;
const MOST_TOLD = 500;

/** What an empty cell stands for in a new prop. */
const ASSUMED: PropCells = { units: 1, importance: 'feature', parallel: 1, 'load.standbyMa': 0 };
/** Fields every prop has: an empty cell leaves them as they are. The others it takes away. */
const KEPT = new Set([
  'tag',
  'name',
  'zone',
  'units',
  'importance',
  'cellTypeId',
  'series',
  'parallel',
  'dimVolts',
  'load.behaviour',
  'load.standbyMa',
  'switching.kind',
]);

/**
 * Takes a CSV of props in, all of it or nothing. A row whose tag is on the site already changes that prop in the given
 * columns; props that are not in the file stay as they are.
 * @param deps what a deed needs
 * @param input.text the file
 * @param input.dryRun only says what would happen
 * @param input.readProp reads a new prop from outside, field by field
 * @returns what was taken in, or every fault by row and field
 * @throws Refusal 'not-found'; 'invalid' when the file is no CSV of props
 */
export function importProps(
  deps: Deps,
  input: { siteId: string; text: string; dryRun: boolean; readProp: PropReader },
): PropsImport {
  const { db } = deps.store;
  siteOf(db, input.siteId);
  const file = readFile(deps, input.text);
  const deed = (within: Db) => {
    siteOf(within, input.siteId);
    const outcome = weighed(deps, { ...input, file, before: listProps(within, input.siteId) });
    if (!input.dryRun && outcome.faults.length === 0) keep(deps, within, { ...input, ...outcome });
    return reportOf(file, outcome);
  };
  return input.dryRun ? deed(db) : deps.store.transact(deed);
}

function readFile(deps: Deps, text: string): PropsFile {
  try {
    return readPropsCsv(text, (id) => findCellTypeAnywhere(deps, id) !== null);
  } catch (error) {
    if (error instanceof CsvError) throw new Refusal('invalid', [{ field: 'file', message: error.message }]);
    throw error;
  }
}

type Taken = { row: number; prop: Prop; before: Prop | null; fields: string[] };
type Outcome = { faults: CellRemark[]; taken: Taken[]; rows: number; assumed: Set<string> };
type Weighing = { siteId: string; file: PropsFile; before: Prop[]; readProp: PropReader };

function weighed(deps: Deps, of: Weighing): Outcome {
  const { file } = of;
  const byTag = new Map(of.before.map((prop) => [prop.tag, prop]));
  const outcome: Outcome = {
    faults: [...file.faults],
    taken: [],
    rows: file.rows.length,
    assumed: new Set(),
  };
  outcome.faults.push(...columnFaults(file));
  if (!file.fields.includes('tag')) return outcome;
  const unreadable = new Set(file.faults.map(({ row, field }) => `${row} ${field}`));
  const scale: Scale = { deps, of, byTag, unreadable, cellTypes: new Map(), missing: new Map() };
  const rowOfTag = new Map<string, number>();
  for (const { row, cells } of file.rows) {
    const tag = tidyText(String(cells.tag ?? ''));
    const earlier = rowOfTag.get(tag);
    if (tag === '') {
      const message =
        'The row has no tag, so it says nothing of which prop it is about. Give it one, like "B-06".';
      outcome.faults.push({ row, field: 'tag', message });
      continue;
    }
    if (earlier !== undefined) {
      const message = `${tag} stands in row ${earlier} too. A prop has one row: give this one another tag, or keep one of the two.`;
      outcome.faults.push({ row, field: 'tag', message });
      continue;
    }
    rowOfTag.set(tag, row);
    weighRow(scale, outcome, { row, tag, cells });
  }
  outcome.faults.push(...missingColumnFaults(file, scale.missing));
  const added = outcome.taken.filter(({ before }) => before === null).length;
  if (of.before.length + added > MOST_PROPS) {
    const message = `This site has ${of.before.length} props and the file adds ${added}; ${MOST_PROPS} is the most one site holds. Make a second site for the rest.`;
    outcome.faults.push({ row: file.headingRow, field: 'file', message });
  }
  return outcome;
}

type Scale = {
  deps: Deps;
  of: Weighing;
  byTag: Map<string, Prop>;
  /** Cells that have their fault already. */
  unreadable: Set<string>;
  cellTypes: Map<string, CellType | Fault>;
  /** Rows that lack a field the file has no column for. */
  missing: Map<string, number>;
};

function weighRow(scale: Scale, outcome: Outcome, row: { row: number; tag: string; cells: PropCells }): void {
  const before = scale.byTag.get(row.tag) ?? null;
  const cells = before ? merged(propCells(before), row.cells) : withAssumed(row.cells, outcome.assumed);
  const read = scale.of.readProp({ ...propOfCells(cells), siteId: scale.of.siteId });
  const faults = 'faults' in read ? read.faults : [];
  const hasColumn = (field: string) => scale.of.file.fields.includes(columnOf(scale.of.file, field));
  const isKnown = (field: string) =>
    scale.unreadable.has(`${row.row} ${columnOf(scale.of.file, field)}`) ||
    scale.unreadable.has(`${row.row} ${field}`);
  for (const { field, message } of faults.filter((fault) => !isKnown(fault.field))) {
    if (hasColumn(field) || cells[field] !== undefined || !isColumn(field))
      outcome.faults.push({ row: row.row, field, message });
    else scale.missing.set(field, (scale.missing.get(field) ?? 0) + 1);
  }
  if ('faults' in read) return;
  const prop = tidyProp({
    units: 1,
    importance: 'feature',
    ...read.prop,
    id: before?.id ?? scale.deps.newId(),
  });
  const crossed = crossFaults(scale, prop);
  outcome.faults.push(...crossed.map((fault) => ({ row: row.row, ...fault })));
  if (crossed.length > 0) return;
  const then = before ? propCells(before) : null;
  const now = propCells(prop);
  const fields = PROP_COLUMNS.filter((field) => (then ? then[field] !== now[field] : now[field] !== null));
  outcome.taken.push({ row: row.row, prop, before, fields });
}

/** Cells in words say what cellTypeId and series would. */
function columnOf({ fields }: PropsFile, field: string): string {
  const inWords = (field === 'cellTypeId' || field === 'series') && !fields.includes(field);
  return inWords ? 'cells' : field;
}

const isColumn = (field: string) => (PROP_COLUMNS as readonly string[]).includes(field);

/** The cells of a prop with a row's own put in; what belongs to another kind of switching goes. */
function merged(before: PropCells, given: PropCells): PropCells {
  const kind = given['switching.kind'] ?? before['switching.kind'];
  const cells = { ...before };
  if (kind !== before['switching.kind'])
    for (const field of Object.keys(cells)) if (field.startsWith('switching.')) delete cells[field];
  for (const [field, cell] of Object.entries(given)) {
    if (cell !== null || !KEPT.has(field)) cells[field] = cell;
  }
  cells['switching.kind'] = kind ?? null;
  return cells;
}

function withAssumed(given: PropCells, assumed: Set<string>): PropCells {
  const cells = { ...given };
  for (const [field, cell] of Object.entries(ASSUMED)) {
    if ((cells[field] ?? null) !== null) continue;
    cells[field] = cell!;
    assumed.add(field);
  }
  return cells;
}

function crossFaults(scale: Scale, prop: Prop): Fault[] {
  const { deps, cellTypes } = scale;
  let type = cellTypes.get(prop.cellTypeId);
  if (!type) {
    const { cellTypeId } = prop;
    type = findCellTypeAnywhere(deps, cellTypeId) ?? unknownCellTypeFault(deps.store.db, cellTypeId);
    cellTypes.set(cellTypeId, type);
  }
  return 'message' in type ? [type] : propFaults(prop, type);
}

function keep(deps: Deps, db: Db, of: { siteId: string; taken: Taken[] }): void {
  const different = of.taken.filter(({ fields }) => fields.length > 0);
  saveProps(
    db,
    different.map(({ prop }) => prop),
  );
  if (different.length > 0) raiseRevision(db, of.siteId, deps.clock.now());
}

function reportOf(file: PropsFile, { faults, taken, rows, assumed }: Outcome): PropsImport {
  const sorted = faults.toSorted((one, other) => one.row - other.row);
  const isGood = faults.length === 0;
  const added = taken.filter(({ before }) => before === null).length;
  const different = taken.filter(({ fields }) => fields.length > 0);
  return {
    rows,
    accepted: isGood ? taken.length : 0,
    added,
    changed: different.length - added,
    unchanged: taken.length - different.length,
    rejected: sorted.slice(0, MOST_REJECTED),
    unlisted: Math.max(0, sorted.length - MOST_REJECTED),
    notes: [...assumedNotes(file, assumed), ...strangerNotes(file), ...file.notes].slice(0, MOST_TOLD),
    changes: different.slice(0, MOST_TOLD).map(({ row, prop, before, fields }) => {
      return { row, tag: prop.tag, name: prop.name, isNew: before === null, fields };
    }),
  };
}

function assumedNotes({ headingRow: row }: PropsFile, assumed: Set<string>): CellRemark[] {
  const notes: CellRemark[] = [];
  if (assumed.has('parallel'))
    notes.push({
      row,
      field: 'parallel',
      message: 'Where parallel is empty, new props get one row of cells.',
    });
  if (assumed.has('load.standbyMa')) {
    const message =
      'Where load.standbyMa is empty, new props get 0; if something in them waits, the forecast assumes a little and marks it.';
    notes.push({ row, field: 'load.standbyMa', message });
  }
  return notes;
}

function strangerNotes({ headingRow: row, strangers }: PropsFile): CellRemark[] {
  return strangers.map((heading) => {
    const field = heading.slice(0, 60) || '(no heading)';
    return { row, field, message: 'This column is nothing a prop has, and is left aside.' };
  });
}
