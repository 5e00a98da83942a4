// Columns that refuse what SQLite would quietly turn into something else.

import { type AnyColumn, type SQL, sql } from 'drizzle-orm';
import { customType } from 'drizzle-orm/sqlite-core';
import { StoreError } from './store-error.ts';

/** better-sqlite3 stores NaN as NULL, so an optional number would be lost without a word; Infinity it keeps. */
function finite(value: number): number {
  if (!Number.isFinite(value))
    throw new StoreError(`${value} is not a number that can be kept: a finite one is wanted.`);
  return value;
}

/** JSON writes NaN and Infinity as null; here they are refused instead. */
function strictJson(value: unknown): string {
  return JSON.stringify(value, (_key, inner) => (typeof inner === 'number' ? finite(inner) : inner));
}

export const measure = customType<{ data: number; driverData: number }>({
  dataType: () => 'real',
  toDriver: finite,
});

export const whole = customType<{ data: number; driverData: number }>({
  dataType: () => 'integer',
  toDriver: finite,
});

/** A value kept as JSON text. */
export const json = <Value>() =>
  customType<{ data: Value; driverData: string }>({
    dataType: () => 'text',
    toDriver: strictJson,
    fromDriver: (text) => JSON.parse(text) as Value,
  })();

// Conditions for CHECK constraints. All let NULL pass: whether a column may be absent is said by NOT NULL.

const literal = (value: number | string) =>
  sql.raw(typeof value === 'number' ? String(value) : `'${value.replaceAll("'", "''")}'`);

export const within = (column: AnyColumn, min: number, max: number): SQL =>
  sql`${column} between ${literal(min)} and ${literal(max)}`;

export const wholeWithin = (column: AnyColumn, min: number, max: number): SQL =>
  sql`typeof(${column}) in ('integer', 'null') and ${within(column, min, max)}`;

/** 1900-01-01 to 2200-01-02, epoch milliseconds: the evenings the model knows. */
export const INSTANT_BOUNDS = [Date.UTC(1900, 0, 1), Date.UTC(2200, 0, 2)] as const;

export const instant = (column: AnyColumn): SQL => wholeWithin(column, ...INSTANT_BOUNDS);

export const flag = (column: AnyColumn): SQL => sql`${column} in (0, 1)`;

export const oneOf = (column: AnyColumn, words: readonly string[]): SQL =>
  sql`${column} in (${sql.join(words.map(literal), sql`, `)})`;

/** Text a person typed: not blank, no control characters except tab and line feed (the character codes below). */
export const plainText = (column: AnyColumn, maxLength: number): SQL =>
  sql`length(${column}) between 1 and ${literal(maxLength)} and instr(${column}, char(0)) = 0 and trim(${column}, char(9, 10, 32)) <> '' and ${column} not glob '*[' || char(1, 45, 8, 11, 45, 31, 127) || ']*'`;

export const id = (column: AnyColumn): SQL =>
  sql`length(${column}) between 1 and 64 and instr(${column}, char(0)) = 0 and ${column} glob '[A-Za-z0-9]*' and ${column} not glob '*[^A-Za-z0-9-]*'`;

/** The pattern first, since date() alone would take 'now'; `is`, since date('2026-13-01') is NULL and NULL passes. */
export const evening = (column: AnyColumn): SQL =>
  sql`${column} glob '[0-9][0-9][0-9][0-9]-[0-9][0-9]-[0-9][0-9]' and date(${column}) is ${column}`;

export const wallTime = (column: AnyColumn): SQL =>
  sql`${column} glob '[0-2][0-9]:[0-5][0-9]' and ${column} < '24:00'`;

export const jsonObject = (column: AnyColumn, neededFields: readonly string[] = []): SQL =>
  sql.join(
    [
      sql`json_valid(${column}) and json_type(${column}) = 'object'`,
      ...neededFields.map((field) => sql`json_type(${column}, ${literal(`$.${field}`)}) is not null`),
    ],
    sql` and `,
  );

export const jsonArray = (column: AnyColumn): SQL =>
  sql`json_valid(${column}) and json_type(${column}) = 'array'`;

/** Twelve numbers, each within the bounds. A CHECK may hold no subquery, so the twelve are written out. */
export const twelveWithin = (column: AnyColumn, min: number, max: number): SQL =>
  sql`${jsonArray(column)} and json_array_length(${column}) = 12 and ${sql.join(
    Array.from(
      { length: 12 },
      (_, month) =>
        sql`ifnull(json_extract(${column}, ${literal(`$[${month}]`)}), 'none') between ${literal(min)} and ${literal(max)}`,
    ),
    sql` and `,
  )}`;

/** Bounds of numbers inside a JSON object; a key that is not there passes. */
export const fieldsWithin = (
  column: AnyColumn,
  bounds: Record<string, readonly [min: number, max: number]>,
): SQL =>
  sql.join(
    Object.entries(bounds).map(
      ([field, [min, max]]) =>
        sql`json_extract(${column}, ${literal(`$.${field}`)}) between ${literal(min)} and ${literal(max)}`,
    ),
    sql` and `,
  );

/** Words a field of a JSON object may hold; a key that is not there passes. */
export const fieldOneOf = (column: AnyColumn, field: string, words: readonly string[]): SQL =>
  sql`json_extract(${column}, ${literal(`$.${field}`)}) in (${sql.join(words.map(literal), sql`, `)})`;
