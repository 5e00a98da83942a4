import type { TSchema } from 'typebox';
import type { TLocalizedValidationError } from 'typebox/error';
import { didYouMean, nearNames } from '../actions/near-names.ts';
import type { Fault } from '../actions/refusal.ts';
import { FIRST_KNOWN_YEAR, LAST_KNOWN_YEAR } from '../model/known-years.ts';

export const MOST_FAULTS = 100;

/** The parts of a JSON schema that sentences are made of. */
type Node = {
  slip?: string;
  description?: string;
  type?: string;
  format?: string;
  enum?: readonly unknown[];
  const?: unknown;
  properties?: Record<string, Node>;
  anyOf?: Node[];
} & { [keyword: string]: unknown };

/**
 * What is wrong with a value, one sentence a field: the value, what is wanted, the likely slip.
 * @param schema the schema that refused it
 * @param refused the value, the validator's errors, and what the whole is called
 */
export function faultsOf(
  schema: TSchema,
  refused: { value: unknown; errors: TLocalizedValidationError[]; whole: string },
): Fault[] {
  const root = schema as unknown as Node;
  const faults = new Map<string, Fault>();
  const errors = withoutOtherBranches(root, refused);
  for (const error of errors) {
    // A body that is not there arrives as null.
    const value = at(refused.value ?? undefined, error.instancePath);
    const node = nodeAt(root, error.schemaPath);
    for (const fault of sentences(error, { node, value, field: fieldOf(error.instancePath) })) {
      const field = fault.field || refused.whole;
      // The first error of a field says most: a text that is no number is also not between 1 and 40.
      if (!faults.has(field)) faults.set(field, { ...fault, field });
    }
  }
  const all = [...faults.values()];
  if (all.length === 0)
    return [{ field: refused.whole, message: 'This is not of the form described for this address.' }];
  return all.slice(0, MOST_FAULTS);
}

type Context = { node: Node; value: unknown; field: string };

function sentences(error: TLocalizedValidationError, context: Context): Fault[] {
  const { node, value, field } = context;
  const slip = node.slip ? ` ${node.slip}` : '';
  const under = (name: string) => (field ? `${field}.${name}` : name);
  switch (error.keyword) {
    case 'boolean':
      return [];
    case 'required':
      return error.params.requiredProperties.map((name) => ({
        field: under(name),
        message: `${name} is missing.${hintOf(node.properties?.[name])}`,
      }));
    case 'additionalProperties':
      return error.params.additionalProperties.slice(0, MOST_FAULTS).map((name) => ({
        field: under(shortened(name)),
        message: unknownField(name, Object.keys(node.properties ?? {})),
      }));
    case 'anyOf':
      return [unfit(context, branchNeed(node, value))];
    default:
      return [{ field, message: `${reason(error, context)}${slip}` }];
  }
}

const WITHOUT_OFFSET = /^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d+)?)?$/;

function formatReason(value: unknown, format: string): string {
  const year = /^(\d{4})-\d{2}-\d{2}/.exec(String(value))?.[1];
  if (year !== undefined && (Number(year) < FIRST_KNOWN_YEAR || Number(year) > LAST_KNOWN_YEAR)) {
    return `${show(value)} lies outside the years known here, ${FIRST_KNOWN_YEAR} to ${LAST_KNOWN_YEAR}.`;
  }
  if (format !== 'date' && WITHOUT_OFFSET.test(String(value))) {
    return `${show(value)} does not say in which zone: put Z or an offset like +01:00 behind it.`;
  }
  return `${show(value)} does not exist: no such ${format === 'date' ? 'date' : 'moment'} is in the calendar.`;
}

function reason(error: TLocalizedValidationError, { node, value }: Context): string {
  switch (error.keyword) {
    case 'type':
      return typeReason(value, String(node.type));
    case 'minimum':
      return `${value} is below ${error.params.limit}, the least taken here.`;
    case 'maximum':
      return `${value} is above ${error.params.limit}, the most taken here.`;
    case 'minLength':
      return String(value) === '' ? 'The text is empty.' : `${show(value)} is too short.`;
    case 'maxLength':
      return `The text has ${String(value).length} characters; at most ${error.params.limit} are kept.`;
    case 'minItems':
      return `The list has ${lengthOf(value)} entries; at least ${error.params.limit} are wanted.`;
    case 'maxItems':
      return `The list has ${lengthOf(value)} entries; at most ${error.params.limit} are taken.`;
    case 'uniqueItems':
      return 'The list names something twice.';
    case 'enum':
      return `${show(value)} is none of ${oneOf(node.enum ?? [])}.${guess(value, node.enum ?? [])}`;
    case 'const':
      return `${show(value)} is not ${show(node.const)}.`;
    case 'format':
      return formatReason(value, String(node.format));
    default:
      return `${show(value)} is not of the form wanted here.`;
  }
}

const WANTED: Record<string, string> = {
  number: 'a number',
  integer: 'a whole number',
  string: 'text',
  boolean: 'true or false',
  array: 'a list',
  object: 'a JSON object',
  null: 'null',
};

function typeReason(value: unknown, type: string): string {
  if (typeof value === 'number' && !Number.isFinite(value))
    return 'This number is beyond what JSON numbers reach (about 1.8e308). Is the exponent a slip?';
  if (typeof value === 'string' && /^(number|integer)$/.test(type))
    return `${show(value)} is text, and ${WANTED[type]} is wanted: without quotes, with a point before decimals.`;
  return `${show(value)} is given where ${WANTED[type] ?? type} is wanted.`;
}

function unknownField(name: string, known: string[]): string {
  const [nearest] = nearNames(name, known, 1);
  if (nearest) return `\`${shortened(name)}\` is not a field here; did you mean \`${nearest}\`?`;
  const named = known.length > 0 ? ` The fields here are ${known.join(', ')}.` : '';
  return `\`${shortened(name)}\` is not a field here.${named}`;
}

// ---- Unions: only the branch that was meant is worth talking about ----

function withoutOtherBranches(
  root: Node,
  refused: { value: unknown; errors: TLocalizedValidationError[] },
): TLocalizedValidationError[] {
  let { errors } = refused;
  for (const union of refused.errors.filter((error) => error.keyword === 'anyOf')) {
    const branches = nodeAt(root, union.schemaPath).anyOf ?? [];
    const meant = branchMeant(branches, at(refused.value, union.instancePath));
    const branchPath = `${union.schemaPath}/anyOf/`;
    errors = errors.filter((error) => {
      if (error === union) return meant < 0;
      if (!error.schemaPath.startsWith(branchPath)) return true;
      return meant >= 0 && `${error.schemaPath}/`.startsWith(`${branchPath}${meant}/`);
    });
  }
  return errors;
}

/** The index of the branch somebody meant: the one of the same kind, or the only one that is not null; else -1. */
function branchMeant(branches: Node[], value: unknown): number {
  const solid = branches.filter((branch) => branch.type !== 'null');
  if (solid.length === 1) return branches.indexOf(solid[0]!);
  if (!isObject(value)) return -1;
  return branches.findIndex((branch) => branch.properties?.kind?.const === value.kind);
}

function branchNeed(node: Node, value: unknown): { name: string; words: unknown[]; given: unknown } {
  const words = (node.anyOf ?? []).map((branch) => branch.properties?.kind?.const);
  return { name: 'kind', words, given: isObject(value) ? value.kind : undefined };
}

function unfit({ field, value }: Context, need: { name: string; words: unknown[]; given: unknown }): Fault {
  const named = oneOf(need.words);
  if (!isObject(value))
    return {
      field,
      message: `${show(value)} is given where an object with ${need.name} is wanted: one of ${named}.`,
    };
  if (need.given === undefined)
    return { field: `${field}.${need.name}`, message: `${need.name} is missing: one of ${named}.` };
  const message = `${show(need.given)} is none of ${named}.${guess(need.given, need.words)}`;
  return { field: `${field}.${need.name}`, message };
}

// ---- Paths and values ----

function steps(path: string): string[] {
  return path
    .replace(/^#/, '')
    .split('/')
    .slice(1)
    .map((step) => step.replaceAll('~1', '/').replaceAll('~0', '~'));
}

function at(value: unknown, path: string): unknown {
  let here = value;
  for (const step of steps(path)) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, step)) return undefined;
    here = (here as Record<string, unknown>)[step];
  }
  return here;
}

function nodeAt(root: Node, path: string): Node {
  const node = at(root, path);
  return isObject(node) ? (node as Node) : {};
}

function fieldOf(instancePath: string): string {
  return steps(instancePath).map(shortened).join('.');
}

function hintOf(node: Node | undefined): string {
  const hint = node?.slip ?? node?.description;
  return hint ? ` ${hint}` : '';
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function lengthOf(value: unknown): number {
  return Array.isArray(value) ? value.length : 0;
}

function shortened(text: string): string {
  const plain = text.replace(/[\p{Cc}\p{Cs}]/gu, '?');
  return plain.length > 40 ? `${plain.slice(0, 40)}…` : plain;
}

function show(value: unknown): string {
  if (value === undefined) return 'Nothing';
  if (typeof value === 'string') return `"${shortened(value)}"`;
  if (Array.isArray(value)) return 'A list';
  return isObject(value) ? 'An object' : String(value);
}

function oneOf(words: readonly unknown[]): string {
  return words.map((word) => `"${word}"`).join(', ');
}

function guess(value: unknown, words: readonly unknown[]): string {
  return typeof value === 'string' ? didYouMean(nearNames(value, words.map(String), 1)) : '';
}
