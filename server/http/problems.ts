import { type Fault, Refusal, type RefusalCode } from '../actions/refusal.ts';
import type { Problem } from './schemas/errors.ts';

/** Every way to say no: the one table of codes. */
export const PROBLEMS = {
  invalid: { status: 400, title: 'Something in the request cannot be used' },
  unreadable: { status: 400, title: 'The request cannot be read' },
  'foreign-origin': { status: 403, title: 'Changes are taken from this service’s own pages only' },
  'not-found': { status: 404, title: 'There is nothing here' },
  'method-not-offered': { status: 405, title: 'This cannot be done here' },
  'too-slow': { status: 408, title: 'The request took too long to arrive' },
  conflict: { status: 409, title: 'What is there already stands against it' },
  'too-large': { status: 413, title: 'Too much was sent' },
  'address-too-long': { status: 414, title: 'The address is too long' },
  'wrong-content-type': { status: 415, title: 'This kind of content is not read here' },
  'wrong-host': { status: 421, title: 'This service does not go by that name' },
  'replay-differs': { status: 422, title: 'The same key came with another request' },
  'too-many': { status: 429, title: 'Too many requests' },
  'headers-too-large': { status: 431, title: 'The headers of the request are too large' },
  failed: { status: 500, title: 'Something went wrong here' },
} as const satisfies Record<string, { status: number; title: string }> &
  Record<RefusalCode, { status: number; title: string }>;

export type ProblemCode = keyof typeof PROBLEMS;

/** A no that http itself says. */
export class HttpProblem extends Error {
  override name = 'HttpProblem';
  readonly code: ProblemCode;
  readonly faults: Fault[];
  readonly headers: Record<string, string>;

  constructor(
    code: ProblemCode,
    detail: string,
    more: { faults?: Fault[]; headers?: Record<string, string> } = {},
  ) {
    super(detail);
    this.code = code;
    this.faults = more.faults ?? [];
    this.headers = more.headers ?? {};
  }
}

export const PROBLEM_TYPE = 'application/problem+json; charset=utf-8';

/**
 * The body of a no.
 * @param problem its code, the sentence for people, and what is wrong with which field
 */
export function problemBody(problem: { code: ProblemCode; message: string; faults: Fault[] }): Problem {
  const { status, title } = PROBLEMS[problem.code];
  return { title, status, detail: problem.message, code: problem.code, errors: problem.faults };
}

/**
 * Any error as the no that goes out. What nobody foresaw says nothing of the inside.
 * @param error whatever was thrown
 */
export function problemOf(error: unknown): HttpProblem {
  if (error instanceof HttpProblem) return error;
  if (error instanceof Refusal) return new HttpProblem(error.code, error.message, { faults: error.faults });
  const known = FRAMEWORK_ERRORS[codeOf(error)];
  if (known) return new HttpProblem(known[0], known[1]);
  return new HttpProblem(
    'failed',
    'The server made a mistake, and nothing was changed. Trying again may help; the reason is in the server’s own output.',
  );
}

const BAD_JSON =
  'The body is no JSON. A comma too many, a quote missing, or numbers like NaN are the usual slips.';
const TOO_LARGE = 'The body is larger than this address takes: 1 MiB of JSON, or 16 MiB of a file.';

/** What the framework may throw, in our words. */
const FRAMEWORK_ERRORS: Record<string, [ProblemCode, string]> = {
  FST_ERR_CTP_BODY_TOO_LARGE: ['too-large', TOO_LARGE],
  FST_REQ_FILE_TOO_LARGE: ['too-large', TOO_LARGE],
  FST_ERR_CTP_INVALID_MEDIA_TYPE: [
    'wrong-content-type',
    'The kind of content the request names is not read here.',
  ],
  FST_INVALID_MULTIPART_CONTENT_TYPE: ['unreadable', 'A form upload with one file was expected.'],
  FST_FILES_LIMIT: ['unreadable', 'One file at a time, please.'],
  FST_PARTS_LIMIT: ['unreadable', 'One file at a time, please, and nothing else in the form.'],
  FST_FIELDS_LIMIT: ['unreadable', 'One file at a time, please, and nothing else in the form.'],
  FST_PROTO_VIOLATION: ['unreadable', 'The names in the form cannot be used.'],
  FST_ERR_CTP_INVALID_CONTENT_LENGTH: ['unreadable', 'The body is not as long as the request says it is.'],
  FST_ERR_CTP_EMPTY_JSON_BODY: ['unreadable', 'The body is empty, and JSON was announced.'],
  FST_ERR_CTP_INVALID_JSON_BODY: ['unreadable', BAD_JSON],
  FST_ERR_BAD_URL: [
    'unreadable',
    'The address cannot be read: a % must be followed by two hexadecimal digits.',
  ],
  FST_ERR_MAX_PARAM_LENGTH: ['address-too-long', 'A part of the address is longer than any id here.'],
};

function codeOf(error: unknown): string {
  return error instanceof Error && 'code' in error ? String(error.code) : '';
}
