import { type Static, Type } from 'typebox';
import { closed, Id, InstantField, Nullable, text } from './fields.ts';

export const NewCalendarLink = Type.Object(
  { label: Type.Optional(text(80)), alarms: Type.Optional(Type.Boolean()) },
  closed,
);
export const CalendarLink = Type.Object(
  {
    id: Id,
    label: Nullable(Type.String()),
    alarms: Type.Boolean(),
    createdAt: InstantField,
    lastReadAt: Nullable(InstantField),
  },
  { $id: 'CalendarLink' },
);
export const MadeCalendarLink = Type.Object({
  id: Id,
  url: Type.String({ description: 'Secret; shown this once.' }),
});

export type CalendarLink = Static<typeof CalendarLink>;
export type MadeCalendarLink = Static<typeof MadeCalendarLink>;
export type NewCalendarLink = Static<typeof NewCalendarLink>;
