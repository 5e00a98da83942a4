import type { FastifySchemaCompiler } from 'fastify';
import type { TSchema } from 'typebox';
import { Compile } from 'typebox/compile';
import Format from 'typebox/format';
import { Settings } from 'typebox/system';
import { Value } from 'typebox/value';
import { type Fault, Refusal } from '../actions/refusal.ts';
import { isEvening, parseInstant } from '../model/evening.ts';
import { faultsOf, MOST_FAULTS } from './faults.ts';

// A pattern knows the form of a date; only the calendar knows whether there is one.
Format.Set('date', isEvening);
Format.Set('date-time', (text) => parseInstant(text) !== null);
// Every wrong field is named, not only the first eight.
Settings.Set({ maxErrors: 3 * MOST_FAULTS });

/**
 * Checks requests by their schemas, strictly: bodies are taken as they are, never coerced; the address is text, so
 * numbers and booleans in it are read first.
 */
export const validatorCompiler: FastifySchemaCompiler<TSchema> = ({ schema, httpPart }) => {
  const compiled = Compile(schema);
  const isBody = httpPart === 'body';
  return (value: unknown) => {
    const asked = isBody ? value : Value.Convert(schema, value);
    if (compiled.Check(asked)) return { value: asked };
    const faults = faultsOf(schema, {
      value: asked,
      errors: compiled.Errors(asked),
      whole: isBody ? 'body' : 'query',
    });
    return { error: new Refusal('invalid', faults) };
  };
};

/**
 * What is wrong with a value that is no whole request, field by field; nothing when it fits.
 * @param schema what it must be
 */
export function faultFinder(schema: TSchema): (value: unknown) => Fault[] {
  const compiled = Compile(schema);
  return (value) =>
    compiled.Check(value) ? [] : faultsOf(schema, { value, errors: compiled.Errors(value), whole: 'body' });
}
