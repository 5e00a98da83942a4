import { type CellsText, readCellsText } from './cells-text.ts';
import { type CsvTable, readCsv, unguarded } from './csv.ts';
import { type Decimals, decimalsOf, readNumberCell } from './number-cell.ts';
import { isNumberColumn, PROP_COLUMNS, type PropCells } from './props-csv.ts';

/** Something to say of a cell: row as a spreadsheet counts, field or heading, a sentence. */
export type CellRemark = { row: number; field: string; message: string };

export type PropsFile = {
  headingRow: number;
  /** Fields that have a column. */
  fields: string[];
  /** Headings that were not read. */
  strangers: string[];
  rows: { row: number; cells: PropCells }[];
  /** Cells that could not be read; they are not among a row's cells. */
  faults: CellRemark[];
  /** What was read in another way than it stands there. */
  notes: CellRemark[];
};

/** A column of sets in words, as '3xAA', beside the fields' own. */
const CELLS_COLUMN = 'cells';
const ALL_COLUMNS: readonly string[] = [...PROP_COLUMNS, CELLS_COLUMN];

const plainHeading = (heading: string) => heading.toLowerCase().replace(/[^a-z]/g, '');
/** Fields by heading: 'Load mean Ma' is load.meanMa, and so is 'meanMa' alone. */
const FIELDS = new Map<string, string>([
  ...PROP_COLUMNS.map((field) => [plainHeading(field.split('.').at(-1)!), field] as const),
  ...ALL_COLUMNS.map((field) => [plainHeading(field), field] as const),
]);
const fieldOf = (heading: string) => FIELDS.get(plainHeading(unguarded(heading)));

/**
 * Reads a props file: which columns it has, and each row's cells as text and numbers. What the values must be is for
 * others to say.
 * @param text the file; see `readCsv`
 * @param isCellType whether a text is the id of a cell type, so that it is left as it is
 * @throws CsvError when it is no such file
 */
export function readPropsCsv(text: string, isCellType: (id: string) => boolean): PropsFile {
  const table = readCsv(text, (heading) => fieldOf(heading) !== undefined);
  const file: PropsFile = {
    headingRow: table.headingRow,
    fields: [],
    strangers: [],
    rows: [],
    faults: [],
    notes: [],
  };
  const columns = columnsOf(table, file);
  const decimals = decimalsOf(table.separator, numbersIn(table, columns));
  const reader: Reader = { file, columns, decimals, separator: table.separator, isCellType };
  for (const { row, cells } of table.rows) {
    if (row >= (table.brokenRow ?? Number.POSITIVE_INFINITY)) break;
    if (!hasRightWidth(table, { row, cells }, file)) continue;
    file.rows.push({ row, cells: cellsOf(reader, row, cells) });
  }
  if (table.brokenRow !== null) {
    const message = `Near row ${table.brokenRow} a quotation mark is never closed, so the rows from there on run together. Remove it, or write it twice inside quotes.`;
    file.faults.push({ row: table.brokenRow, field: 'file', message });
  }
  if (decimals === 'comma') {
    const message = 'Commas inside numbers were read as decimals: "2,4" as 2.4.';
    file.notes.push({ row: table.headingRow, field: 'file', message });
  }
  return file;
}

function columnsOf({ headings, headingRow, rows }: CsvTable, file: PropsFile): (string | null)[] {
  return headings.map((heading, index) => {
    const field = fieldOf(heading);
    if (field === undefined) {
      if (rows.some(({ cells }) => (cells[index] ?? '').trim() !== '')) file.strangers.push(heading);
      return null;
    }
    if (file.fields.includes(field)) {
      const message = `Two columns are ${field}, and they may not agree. Keep one.`;
      file.faults.push({ row: headingRow, field, message });
      return null;
    }
    file.fields.push(field);
    return field;
  });
}

function* numbersIn({ rows }: CsvTable, columns: readonly (string | null)[]): Generator<string> {
  for (const { cells } of rows)
    for (const [index, field] of columns.entries())
      if (field !== null && field !== CELLS_COLUMN && isNumberColumn(field)) yield cells[index] ?? '';
}

function hasRightWidth(table: CsvTable, { row, cells }: { row: number; cells: string[] }, file: PropsFile) {
  const wanted = table.headings.length;
  const isRight = cells.length >= wanted && cells.slice(wanted).every((cell) => cell.trim() === '');
  if (isRight) return true;
  const slip =
    cells.length < wanted
      ? 'Likely a separator or a quotation mark is missing.'
      : table.separator === ','
        ? 'Likely decimal commas: write points, or part the columns with ";". Text with a comma stands in quotes.'
        : 'Text with a separator in it stands in quotes.';
  const message = `The row has ${cells.length} cells under ${wanted} headings. ${slip}`;
  file.faults.push({ row, field: 'file', message });
  return false;
}

type Reader = {
  file: PropsFile;
  columns: readonly (string | null)[];
  decimals: Decimals;
  separator: string;
  isCellType: (id: string) => boolean;
};

function cellsOf(reader: Reader, row: number, texts: readonly string[]): PropCells {
  const cells: PropCells = {};
  let words: { field: string; text: string } | null = null;
  for (const [index, field] of reader.columns.entries()) {
    if (field === null) continue;
    const text = texts[index]!.trim();
    if (text === '') {
      if (field !== CELLS_COLUMN) cells[field] = null;
    } else if (field === CELLS_COLUMN || (field === 'cellTypeId' && !reader.isCellType(text))) {
      words = { field, text };
      cells.cellTypeId = unguarded(text);
    } else if (isNumberColumn(field)) readNumber(reader, cells, { row, field, text });
    else cells[field] = textOf(reader, { row, field, text: texts[index]! });
  }
  if (words) readWords(reader, cells, { row, ...words });
  return cells;
}

type Cell = { row: number; field: string; text: string };

function readNumber(
  { file, decimals, separator }: Reader,
  cells: PropCells,
  { row, field, text }: Cell,
): void {
  const read = readNumberCell(text, { field, decimals, separator });
  if ('fault' in read) {
    file.faults.push({ row, field, message: read.fault });
    return;
  }
  cells[field] = read.value;
  if (read.asWritten) file.notes.push({ row, field, message: `${read.asWritten}.` });
}

/** Spreadsheets write 18:30 as 18:30:00, and 9:30 without its nought. */
function textOf({ file }: Reader, { row, field, text }: Cell): string {
  const plain = unguarded(text);
  const clock = /^switching\.o(n|ff)At$/.test(field) ? /^\s*(\d{1,2}:\d{2})(?::00)?\s*$/.exec(plain) : null;
  if (!clock) return plain;
  const wallTime = clock[1]!.padStart(5, '0');
  if (wallTime !== plain.trim())
    file.notes.push({ row, field, message: `"${plain.trim()}" was read as ${wallTime}.` });
  return wallTime;
}

function readWords(reader: Reader, cells: PropCells, { row, field, text }: Cell): void {
  const { file } = reader;
  const read = readCellsText(unguarded(text));
  if (!read) {
    if (field !== CELLS_COLUMN) return;
    delete cells.cellTypeId;
    const message = `${JSON.stringify(text.slice(0, 40))} does not say which cells. Write them like "3xAA", "4xD zinc-carbon" or "CR2032"; capacity and chemistry follow from that.`;
    file.faults.push({ row, field, message });
    return;
  }
  cells.cellTypeId = read.cellTypeId;
  const taken = [read.cellTypeId];
  if (read.series !== undefined) taken.push(...wiringOf(reader, cells, { row, field, series: read.series }));
  if (read.draw !== undefined && (cells['load.meanMa'] ?? null) === null) {
    readNumber(reader, cells, { row, field: 'load.meanMa', text: read.draw });
  }
  file.notes.push({ row, field, message: noteOf(text, read, taken) });
}

function wiringOf(
  { file }: Reader,
  cells: PropCells,
  { row, field, series }: { row: number; field: string; series: number },
): string[] {
  const given = cells.series ?? null;
  if (given !== null && given !== series) {
    const message = `${series} cells stand here, and series says ${given}. For rows side by side give series and parallel, and the sort of cell alone.`;
    file.faults.push({ row, field, message });
    return [];
  }
  cells.series = series;
  return [`${series} end to end`];
}

function noteOf(text: string, read: CellsText, taken: string[]): string {
  const kind = read.assumedAlkaline
    ? ' Alkaline was taken, since nothing says otherwise: zinc-carbon lasts about a third as long.'
    : '';
  return `"${text.slice(0, 40)}" was read as ${taken.join(', ')}.${kind}`;
}
