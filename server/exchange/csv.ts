import Papa from 'papaparse';

/** A file that is no CSV we know; its message says what was found, the likely slip and the way out. */
export class CsvError extends Error {
  override readonly name = 'CsvError';
}

export type CsvCell = string | number | null | undefined;

const BYTE_ORDER_MARK = '\ufeff';

// Source: the characters OWASP lists for "CSV injection", after any blanks; its full-width forms from memory.
const FORMULA = /^'*\s*[=+\-@\t\r\n\uff0b\uff0d\uff1d\uff20]/;
const GUARD = "'";

/**
 * Text as a spreadsheet takes it for text: one apostrophe is put before what it would run as a formula. Text that
 * already has one gets a second, so that `unguarded` always gives back what was there.
 * @param text a cell that is no number
 */
export function guarded(text: string): string {
  return FORMULA.test(text) ? GUARD + text : text;
}

/**
 * Undoes `guarded`: takes one apostrophe away where it stands before a formula.
 * @param text a cell as it stands in a file
 */
export function unguarded(text: string): string {
  return text.startsWith(GUARD) && FORMULA.test(text) ? text.slice(1) : text;
}

/**
 * A CSV file by RFC 4180, with a byte order mark so that spreadsheets read UTF-8. Text is guarded, numbers are not.
 * @param headings names of the columns
 * @param rows cells in the order of the headings; nothing is an empty cell
 */
export function csvText(headings: readonly string[], rows: readonly (readonly CsvCell[])[]): string {
  const cells = rows.map((row) => row.map((cell) => (typeof cell === 'string' ? guarded(cell) : cell)));
  return `${BYTE_ORDER_MARK}${Papa.unparse([[...headings], ...cells], { newline: '\r\n' })}\r\n`;
}

export type CsvTable = {
  separator: string;
  /** The row the headings stand in, as a spreadsheet counts, 1 or more. */
  headingRow: number;
  headings: string[];
  /** Rows below the headings with anything in them; `row` as a spreadsheet counts. Cells are as they stand. */
  rows: { row: number; cells: string[] }[];
  /** The row near which a quotation mark is never closed; what follows cannot be trusted. */
  brokenRow: number | null;
};

const SEPARATORS = [',', ';', '\t'];

/**
 * Reads a CSV file: comma, semicolon or tab, whichever parts the headings into most known ones; any line ends.
 * @param text the file, with or without a byte order mark
 * @param isKnown whether a heading is one that is looked for
 * @throws CsvError when it is no text, or its first row has no known heading
 */
export function readCsv(text: string, isKnown: (heading: string) => boolean): CsvTable {
  const plain = withLineFeeds(text);
  refuseOthers(plain);
  const blankRows = /^(?:[ \t,;]*\n)*/.exec(plain)![0];
  const body = plain.slice(blankRows.length);
  const { separator, known } = sniffed(body, isKnown);
  if (known === 0)
    throw new CsvError(
      `The first row, ${JSON.stringify(body.split('\n')[0]!.slice(0, 80))}, has no heading that is known here. The first row names the columns; export once to see how.`,
    );
  const { data, errors } = Papa.parse<string[]>(body, { delimiter: separator, newline: '\n' });
  const headingRow = blankRows.split('\n').length;
  const [headings = [], ...rows] = data;
  const quote = errors.find((error) => error.type === 'Quotes');
  return {
    separator,
    headingRow,
    headings: headings.map((heading) => heading.trim()),
    rows: rows
      .map((cells, index) => ({ row: headingRow + 1 + index, cells }))
      .filter(({ cells }) => cells.some((cell) => cell.trim() !== '')),
    brokenRow: quote ? headingRow + (quote.row ?? 0) : null,
  };
}

function withLineFeeds(text: string): string {
  const plain = text.startsWith(BYTE_ORDER_MARK) ? text.slice(1) : text;
  return plain.replace(/\r\n?/g, '\n');
}

function refuseOthers(text: string): void {
  const fault = otherKind(text);
  if (fault)
    throw new CsvError(`${fault} A CSV file is wanted: plain text, its first row naming the columns.`);
}

function otherKind(text: string): string | null {
  if (text.trim() === '') return 'There is nothing in the file.';
  if (text.startsWith('PK')) return 'This is a spreadsheet (or a zip): open it and save the sheet as CSV.';
  if (text.includes('\u0000')) return 'This is no text: there are zero bytes in it.';
  if (/^\s*<(!doctype|html|\?xml)/i.test(text)) return 'This is a page of the web, not its data.';
  if (/^\s*[{[]/.test(text)) return 'This looks like JSON.';
  return null;
}

function sniffed(body: string, isKnown: (heading: string) => boolean): { separator: string; known: number } {
  const counts = SEPARATORS.map((separator) => {
    const [headings = []] = Papa.parse<string[]>(body, {
      delimiter: separator,
      newline: '\n',
      preview: 1,
    }).data;
    return { separator, known: headings.filter((heading) => isKnown(heading.trim())).length };
  });
  return counts.reduce((best, each) => (each.known > best.known ? each : best));
}
