import { type Static, Type } from 'typebox';
import { closed, Id, InstantField, number, oneOf, text, whole } from './fields.ts';

const swapFields = {
  at: InstantField,
  state: oneOf(['new', 'charged', 'part-used']),
  leftShare: Type.Optional(number(0, 1, { slip: 'A share is wanted: 0.6 for 60 % left.' })),
  cellTypeId: Type.Optional(Id),
  cells: Type.Optional(whole(1, 20_000)),
  setId: Type.Optional(text(40)),
  healthShare: Type.Optional(number(0.05, 1.2, { slip: 'Measured ÷ label capacity: 0.8 for a tired set.' })),
  oldSet: Type.Optional(oneOf(['bright', 'dim', 'dark'])),
  note: Type.Optional(text(500)),
};
const sightingFields = {
  at: InstantField,
  seen: oneOf(['bright', 'dim', 'dark', 'odd']),
  volts: Type.Optional(number(0, 60)),
  taken: Type.Optional(
    oneOf(['lit', 'resting'], { slip: 'Say whether the light was on when the volts were read.' }),
  ),
  note: Type.Optional(text(500)),
};
const traced = {
  id: Id,
  propId: Id,
  recordedAt: InstantField,
  undoneAt: Type.Optional(InstantField),
};

export const NewSwap = Type.Object(swapFields, closed);
export const NewSighting = Type.Object(sightingFields, closed);
/** Something worth knowing at once after a deed: a part batch, a resting reading, a timer that starts now. */
const hints = { hints: Type.Optional(Type.Array(Type.String())) };
export const Swap = Type.Object(
  { kind: Type.Literal('swap'), ...traced, ...swapFields, ...hints },
  { $id: 'Swap' },
);
export const Sighting = Type.Object(
  { kind: Type.Literal('sighting'), ...traced, ...sightingFields, ...hints },
  { $id: 'Sighting' },
);
export const LogEntry = Type.Union([Swap, Sighting]);
export const LogQuery = Type.Object(
  {
    limit: Type.Optional(whole(1, 500)),
    after: Type.Optional(Id),
    undone: Type.Optional(Type.Boolean({ description: 'Also what was undone.' })),
  },
  closed,
);

export type NewSwap = Static<typeof NewSwap>;
export type NewSighting = Static<typeof NewSighting>;
export type Swap = Static<typeof Swap>;
export type Sighting = Static<typeof Sighting>;
export type LogEntry = Static<typeof LogEntry>;
export type LogQuery = Static<typeof LogQuery>;
