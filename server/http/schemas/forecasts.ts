import { type Static, Type } from 'typebox';
import { Chance, closed, EveningField, Id, InstantField, Nullable, oneOf } from './fields.ts';

export const EveningRange = Type.Object({
  early: Nullable(EveningField),
  likely: Nullable(EveningField),
  late: Nullable(EveningField),
});

export const ForecastNight = Type.Object({
  evening: EveningField,
  litHours: Type.Number(),
  usedMah: Type.Number(),
  usableMah: Type.Number(),
  chanceBright: Chance,
  chanceLit: Chance,
  meanC: Type.Number(),
  weather: oneOf(['observed', 'forecast', 'climate']),
  showNight: Type.Boolean(),
  likely: oneOf(['bright', 'dim', 'dark-cold', 'dark-used-up', 'not-lit']),
});

export const Warning = Type.Object({ code: Type.String(), text: Type.String() });

export const Why = Type.Object({
  meanMa: Nullable(
    Type.Number({ description: 'While lit tonight: of a fading light, at its present volts.' }),
  ),
  standbyMa: Type.Number(),
  litHoursTonight: Type.Number(),
  tripMahTonight: Type.Number({ description: 'What trips take of it.' }),
  mahTonight: Type.Number(),
  rateMa: Type.Number({ description: 'Current for which rateShare was looked up.' }),
  capacityMah: Type.Number(),
  coldShare: Type.Number(),
  rateShare: Type.Number(),
  cutOffShare: Type.Number(),
  weakestShare: Type.Number(),
  healthShare: Type.Number(),
  leftAtStartShare: Type.Number(),
  tonightC: Type.Number(),
  defaults: Type.Array(Type.String()),
  warnings: Type.Array(Warning),
});

export const PropForecast = Type.Object(
  {
    propId: Id,
    asOf: InstantField,
    fittedAt: Nullable(InstantField),
    cellTypeId: Id,
    usedMah: Nullable(Type.Number()),
    usedShare: Nullable(Type.Number()),
    usableMah: Nullable(Type.Object({ at20C: Type.Number(), tonight: Type.Number() })),
    dim: EveningRange,
    dark: EveningRange,
    swapBy: Nullable(EveningField),
    cause: Nullable(oneOf(['used-up', 'cold'])),
    drainFactor: Type.Object({ low: Type.Number(), likely: Type.Number(), high: Type.Number() }),
    nights: Type.Array(ForecastNight),
    why: Why,
  },
  { $id: 'PropForecast' },
);

export const SiteForecastProp = Type.Object({
  propId: Id,
  tag: Type.String(),
  name: Type.String(),
  zone: Type.String(),
  group: oneOf(['fine', 'next-round', 'at-risk', 'unknown']),
  dim: EveningRange,
  dark: EveningRange,
  swapBy: Nullable(EveningField),
  chanceBrightToNextRound: Nullable(Chance),
  cause: Nullable(oneOf(['used-up', 'cold'])),
  importance: oneOf(['must-not-fail', 'feature', 'background']),
  leftShare: Nullable(
    Type.Number({ description: 'Share of tonight’s usable charge still there, likely, 0..1.' }),
  ),
  lastSeen: Nullable(oneOf(['bright', 'dim', 'dark', 'odd'])),
  note: Nullable(Type.String({ description: 'Why it is in this group, in a sentence.' })),
});

export const SiteForecast = Type.Object(
  {
    asOf: InstantField,
    evening: EveningField,
    nextRound: Nullable(EveningField),
    props: Type.Array(SiteForecastProp),
  },
  { $id: 'SiteForecast' },
);

export const ForecastQuery = Type.Object(
  { asOf: Type.Optional(InstantField), through: Type.Optional(EveningField) },
  closed,
);
export const SiteForecastQuery = Type.Object({ asOf: Type.Optional(InstantField) }, closed);

export type EveningRange = Static<typeof EveningRange>;
export type ForecastNight = Static<typeof ForecastNight>;
export type PropForecast = Static<typeof PropForecast>;
export type SiteForecastProp = Static<typeof SiteForecastProp>;
export type SiteForecast = Static<typeof SiteForecast>;
export type ForecastQuery = Static<typeof ForecastQuery>;
export type SiteForecastQuery = Static<typeof SiteForecastQuery>;
