import { type TSchema, Type } from 'typebox';

const UNPRINTABLE = '\\u0000-\\u0008\\u000b-\\u001f\\u007f\\ud800-\\udfff';

/**
 * The fields that several nouns share. `slip` is our own annotation: what somebody probably meant when the
 * value is refused, and the way out. `http/errors.ts` puts it behind the number.
 */
type FieldOptions = { description?: string; slip?: string };

/**
 * Text a person typed: no control characters and no half characters, so that it survives CSV, iCalendar and a log
 * line. Written so that no text, however long, makes the pattern go back over it.
 */
export const text = (maxLength: number, options: FieldOptions = {}) =>
  Type.String({
    minLength: 1,
    maxLength,
    pattern: `^\\s*[^\\s${UNPRINTABLE}][^${UNPRINTABLE}]*$`,
    slip: 'Plain text is wanted here: no control characters, and not only blanks.',
    ...options,
  });

export const number = (minimum: number, maximum: number, options: FieldOptions = {}) =>
  Type.Number({ minimum, maximum, ...options });

export const whole = (minimum: number, maximum: number, options: FieldOptions = {}) =>
  Type.Integer({ minimum, maximum, ...options });

export const oneOf = <const Words extends [string, ...string[]]>(words: Words, options: FieldOptions = {}) =>
  Type.Unsafe<Words[number]>(Type.Enum(words, options));

export const Id = Type.String({ minLength: 1, maxLength: 64, pattern: '^[A-Za-z0-9][A-Za-z0-9-]*$' });

/** Checked again as a real date by the action; the pattern keeps nonsense out of the database. */
export const EveningField = Type.String({
  format: 'date',
  pattern: '^\\d{4}-\\d{2}-\\d{2}$',
  description: 'A local date: the stretch from that noon to the next.',
  slip: "Evenings are written like '2026-10-25'.",
});

export const InstantField = Type.String({
  format: 'date-time',
  minLength: 17,
  maxLength: 40,
  pattern: '^\\d{4}-\\d{2}-\\d{2}T\\d{2}:\\d{2}',
  description: 'RFC 3339 with Z or an offset.',
  slip: "Instants are written like '2026-10-25T17:30:00Z' or '2026-10-25T18:30:00+01:00'.",
});

export const WallTime = Type.String({
  pattern: '^([01]\\d|2[0-3]):[0-5]\\d$',
  description: 'Wall time at the site.',
  slip: "Times are written like '18:30', 00:00 to 23:59.",
});

export const Chance = Type.Number({ minimum: 0, maximum: 1 });

export const Nullable = <T extends TSchema>(schema: T) => Type.Union([schema, Type.Null()]);

/** Bodies refuse what they do not know: a misspelt field would otherwise be lost without a word. */
export const closed = { additionalProperties: false } as const;
