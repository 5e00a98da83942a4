import { type Static, Type } from 'typebox';

export const FieldFault = Type.Object({
  field: Type.String({ description: 'Where in the request, as a path: `load.peakMa`.' }),
  message: Type.String({ description: 'What was sent, what probably happened and what to do.' }),
});

/** RFC 9457. */
export const Problem = Type.Object(
  {
    title: Type.String(),
    status: Type.Integer(),
    detail: Type.String(),
    code: Type.String(),
    errors: Type.Array(FieldFault),
  },
  { $id: 'Problem' },
);

export type FieldFault = Static<typeof FieldFault>;
export type Problem = Static<typeof Problem>;
