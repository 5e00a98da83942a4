import type { Db } from './open.ts';

/** A row whose null columns are left out: an optional field nobody gave is absent, not null. */
export type Present<Row> = { [Key in keyof Row as null extends Row[Key] ? never : Key]: Row[Key] } & {
  [Key in keyof Row as null extends Row[Key] ? Key : never]?: NonNullable<Row[Key]>;
};

/**
 * The row without its nulls.
 * @param row as drizzle gives it; it is changed in place, being nobody else's
 */
export function present<Row extends object>(row: Row): Present<Row> {
  for (const key in row) if (row[key] === null) delete row[key];
  return row as unknown as Present<Row>;
}

/**
 * Statements prepared once per database: preparing costs more than running a small one.
 * @param prepare builds them with placeholders
 */
export function preparedOnce<Statements>(prepare: (db: Db) => Statements): (db: Db) => Statements {
  const known = new WeakMap<Db, Statements>();
  return (db) => {
    let statements = known.get(db);
    if (statements === undefined) {
      statements = prepare(db);
      known.set(db, statements);
    }
    return statements;
  };
}
