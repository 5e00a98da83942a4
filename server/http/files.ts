import fastifyMultipart from '@fastify/multipart';
import type { FastifyInstance, FastifyRequest } from 'fastify';
import { HttpProblem } from './problems.ts';

export const FILE_LIMIT_BYTES = 16 * 1024 * 1024;
/** What a file may be sent as. */
export const FILE_TYPES = ['text/csv', 'multipart/form-data'];

/**
 * Lets the routes of a scope take files; nowhere else are they read.
 * @param scope the routes that do
 */
export function takeFiles(scope: FastifyInstance): void {
  scope.addContentTypeParser(
    'text/csv',
    { parseAs: 'buffer', bodyLimit: FILE_LIMIT_BYTES },
    (_request, body, done) => done(null, body),
  );
  scope.register(fastifyMultipart, { limits: { files: 1, fields: 4, parts: 5, fileSize: FILE_LIMIT_BYTES } });
}

/**
 * The text of the file a request brings.
 * @param request of a scope that takes files
 * @throws HttpProblem 'invalid' when there is none
 */
export async function fileTextIn(request: FastifyRequest): Promise<string> {
  return decoded(await fileIn(request));
}

async function fileIn(request: FastifyRequest): Promise<Buffer> {
  if (Buffer.isBuffer(request.body)) return request.body;
  let file: Buffer | undefined;
  if (request.isMultipart()) file = await uploadedIn(request);
  if (file) return file;
  throw new HttpProblem(
    'invalid',
    'No file came. Send it as text/csv in the body, or as the one file of a form.',
    {
      faults: [{ field: 'file', message: 'The file is missing.' }],
    },
  );
}

async function uploadedIn(request: FastifyRequest): Promise<Buffer | undefined> {
  let file: Buffer | undefined;
  try {
    // To the end, so that a second file is noticed.
    for await (const part of request.files()) file = await part.toBuffer();
  } catch (error) {
    // What the framework foresaw has a code; what its parser throws at a broken form has none.
    if (typeof (error as { code?: unknown }).code === 'string') throw error;
    const message =
      'The upload broke off, or is no form at all. Choose the file once more and send it again.';
    throw new HttpProblem('invalid', message, { faults: [{ field: 'file', message }] });
  }
  return file;
}

// Files are UTF-8 or latin-1, and spreadsheets may write UTF-16; none says which.
function decoded(file: Buffer): string {
  if (file[0] === 0xff && file[1] === 0xfe) return new TextDecoder('utf-16le').decode(file);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(file);
  } catch {
    return file.toString('latin1');
  }
}
