import { type Static, Type } from 'typebox';
import { InstantField } from './fields.ts';

export const Health = Type.Object({
  status: Type.Literal('ok'),
  version: Type.String(),
  schemaVersion: Type.Integer(),
  timeZoneData: Type.String({ description: 'Version of the time zone data of the running Node.' }),
  asOf: Type.Union([InstantField, Type.Null()], {
    description: 'The fixed moment this server shows its sites as of; null = the real clock.',
  }),
});

export type Health = Static<typeof Health>;
