import { type Static, type TSchema, Type } from 'typebox';

/**
 * A shared schema by name, so that it is described once.
 * @param schema one with an $id that the app knows
 */
export function ref<Schema extends TSchema>(schema: Schema) {
  return Type.Unsafe<Static<Schema>>(Type.Ref((schema as unknown as { $id: string }).$id));
}

export const NotModified = Type.Null({ description: 'What the asker has is still right.' });
export const NoContent = Type.Null({ description: 'Done; there is nothing to say.' });
