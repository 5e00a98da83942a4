import { type Static, type TSchema, Type } from 'typebox';
import { PROBLEMS } from './problems.ts';

/**
 * A shared schema by name, so that it is described once.
 * @param schema one with an $id that the app knows
 */
export function ref<Schema extends TSchema>(schema: Schema) {
  return Type.Unsafe<Static<Schema>>(Type.Ref((schema as unknown as { $id: string }).$id));
}

const READ_PROBLEMS = [400, 404, 421, 500];
const WRITE_PROBLEMS = [400, 403, 404, 409, 413, 415, 421, 422, 429, 500];

const described = (statuses: readonly number[]) =>
  Object.fromEntries(
    statuses.map((status) => [
      status,
      {
        description: titleOf(status),
        content: { 'application/problem+json': { schema: Type.Ref('Problem') } },
      },
    ]),
  );

function titleOf(status: number): string {
  const rows = Object.values(PROBLEMS).filter((row) => row.status === status);
  return rows.map((row) => row.title).join('; or: ');
}

/** What a read answers: its own statuses, and every no there is. */
export const readAnswers = <Own extends Record<number, unknown>>(own: Own): Own => ({
  ...described(READ_PROBLEMS),
  ...own,
});

/** The same for a write. */
export const writeAnswers = <Own extends Record<number, unknown>>(own: Own): Own => ({
  ...described(WRITE_PROBLEMS),
  ...own,
});

export const NotModified = Type.Null({ description: 'What the asker has is still right.' });
export const NoContent = Type.Null({ description: 'Done; there is nothing to say.' });
