import { type Static, Type } from 'typebox';
import { closed } from './fields.ts';

export const PropsImportQuery = Type.Object(
  { dryRun: Type.Optional(Type.Boolean({ description: 'Only say what would happen.' })) },
  closed,
);

const CellRemark = Type.Object({
  row: Type.Integer({ description: 'As a spreadsheet counts, the headings being row 1.' }),
  field: Type.String(),
  message: Type.String(),
});

const counts = {
  rows: Type.Integer({ description: 'Rows with a prop in them.' }),
  accepted: Type.Integer({ description: 'Props taken in, or that would be; 0 when anything is rejected.' }),
  added: Type.Integer(),
  changed: Type.Integer(),
  unchanged: Type.Integer(),
};

export const PropsImported = Type.Object({
  ...counts,
  rejected: Type.Array(CellRemark),
  unlisted: Type.Integer({ description: 'Further faults that are not listed.' }),
  notes: Type.Array(CellRemark, { description: 'What was read in another way than it stands there.' }),
  changes: Type.Array(
    Type.Object({
      row: Type.Integer(),
      tag: Type.String(),
      name: Type.String(),
      isNew: Type.Boolean(),
      fields: Type.Array(Type.String()),
    }),
    { description: 'What is new or changes, the first rows.' },
  ),
});

export type PropsImportQuery = Static<typeof PropsImportQuery>;
export type PropsImported = Static<typeof PropsImported>;
