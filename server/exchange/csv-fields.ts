const FIELD = /[ \t]*"((?:[^"]|"")*)"[ \t]*(?:,|$)|([^,"]*)(?:,|$)/y;

/**
 * The first fields of one comma-separated line, quotes removed: for wide lines of which only a few columns matter.
 * @param line without its line end, and without one inside quotes
 * @param count fields to read; fewer come back where the line has fewer
 * @returns null where a quotation mark is never closed or stands inside an unquoted field
 */
export function csvFields(line: string, count: number): string[] | null {
  const fields: string[] = [];
  FIELD.lastIndex = 0;
  while (fields.length < count) {
    const match = FIELD.exec(line);
    if (!match) return null;
    fields.push(match[1]?.replaceAll('""', '"') ?? match[2]!);
    if (!match[0].endsWith(',')) break;
  }
  return fields;
}

/** The number a field holds; NaN when it holds nothing or something else. */
export function numberOrNaN(field: string): number {
  return field.trim() === '' ? Number.NaN : Number(field);
}
