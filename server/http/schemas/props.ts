import { type Static, Type } from 'typebox';
import { closed, Id, InstantField, number, oneOf, text, WallTime, whole } from './fields.ts';

const slipMa =
  'mA are wanted. A meter that shows 0.022 A reads 22 mA; mAh is how much a cell holds, not what a light takes.';

export const Load = Type.Object(
  {
    behaviour: oneOf(['steady', 'fades', 'holds']),
    meanMa: Type.Optional(number(0, 20_000, { slip: slipMa })),
    lowMa: Type.Optional(number(0, 20_000, { slip: slipMa })),
    peakMa: Type.Optional(number(0, 20_000, { slip: slipMa })),
    wave: Type.Optional(oneOf(['even-fade', 'blink', 'rc-fade', 'steady'])),
    onShare: Type.Optional(number(0, 1, { slip: 'A share is wanted: 0.25 for a quarter of the time.' })),
    standbyMa: number(0, 5_000, { slip: slipMa }),
    measuredVolts: Type.Optional(number(0.1, 60)),
    ledVolts: Type.Optional(number(0, 60)),
  },
  closed,
);

export const Switching = Type.Union([
  Type.Object(
    {
      kind: Type.Literal('light-sensor'),
      onLux: Type.Optional(number(0.001, 100_000)),
      onAltitudeDeg: Type.Optional(number(-18, 10)),
      offLux: Type.Optional(number(0.001, 100_000)),
      offAltitudeDeg: Type.Optional(number(-18, 10)),
      skyShare: Type.Optional(
        number(0.01, 1, { slip: 'The share of open sky the sensor sees, 1 in the open.' }),
      ),
      cutOffHours: Type.Optional(number(0.25, 24)),
    },
    closed,
  ),
  Type.Object({ kind: Type.Literal('clock'), onAt: WallTime, offAt: WallTime }, closed),
  Type.Object(
    {
      kind: Type.Literal('interval-timer'),
      onHours: number(0.25, 24, { slip: '6 on and 18 off makes 24.' }),
      setAt: Type.Optional(InstantField),
    },
    closed,
  ),
  Type.Object({ kind: Type.Literal('by-hand') }, closed),
  Type.Object({ kind: Type.Literal('always') }, closed),
]);

export const Trips = Type.Object(
  {
    perShowNight: number(0, 20_000),
    perNightOff: number(0, 20_000),
    seconds: number(0.1, 3_600),
    runMa: number(0.001, 20_000, { slip: slipMa }),
  },
  closed,
);

const fields = {
  tag: text(20, { slip: "A short number, unique on the site, like 'B-06'." }),
  name: text(120),
  zone: text(60),
  xM: number(-100_000, 100_000),
  yM: number(-100_000, 100_000),
  units: whole(1, 500, { slip: 'How many identical lights are tended at this one stop.' }),
  importance: oneOf(['must-not-fail', 'feature', 'background']),
  cellTypeId: Id,
  series: whole(1, 40, { slip: 'Cells end to end in one set.' }),
  parallel: whole(1, 40, { slip: 'Rows side by side in one set.' }),
  dimVolts: number(0.1, 60, { slip: 'Lit volts of the whole set, not of one cell.' }),
  stopVolts: number(0.1, 60, { slip: 'Lit volts of the whole set, not of one cell.' }),
  load: Load,
  switching: Switching,
  trips: Trips,
  offsetC: number(-15, 15),
};

export const Prop = Type.Object(
  {
    id: Id,
    siteId: Id,
    ...fields,
    xM: Type.Optional(fields.xM),
    yM: Type.Optional(fields.yM),
    stopVolts: Type.Optional(fields.stopVolts),
    trips: Type.Optional(Trips),
    offsetC: Type.Optional(fields.offsetC),
  },
  { $id: 'Prop' },
);

export const NewProp = Type.Object(
  {
    siteId: Id,
    tag: fields.tag,
    name: fields.name,
    zone: fields.zone,
    xM: Type.Optional(fields.xM),
    yM: Type.Optional(fields.yM),
    units: Type.Optional(fields.units),
    importance: Type.Optional(fields.importance),
    cellTypeId: fields.cellTypeId,
    series: fields.series,
    parallel: fields.parallel,
    dimVolts: fields.dimVolts,
    stopVolts: Type.Optional(fields.stopVolts),
    load: Load,
    switching: Switching,
    trips: Type.Optional(Trips),
    offsetC: Type.Optional(fields.offsetC),
  },
  closed,
);

/** A null takes an optional field away. */
const clearable = <T extends Parameters<typeof Type.Union>[0][number]>(schema: T) =>
  Type.Optional(Type.Union([schema, Type.Null()]));

export const PropChanges = Type.Object(
  {
    tag: Type.Optional(fields.tag),
    name: Type.Optional(fields.name),
    zone: Type.Optional(fields.zone),
    xM: clearable(fields.xM),
    yM: clearable(fields.yM),
    units: Type.Optional(fields.units),
    importance: Type.Optional(fields.importance),
    cellTypeId: Type.Optional(fields.cellTypeId),
    series: Type.Optional(fields.series),
    parallel: Type.Optional(fields.parallel),
    dimVolts: Type.Optional(fields.dimVolts),
    stopVolts: clearable(fields.stopVolts),
    load: Type.Optional(Load),
    switching: Type.Optional(Switching),
    trips: clearable(Trips),
    offsetC: clearable(fields.offsetC),
  },
  closed,
);

export const PropsQuery = Type.Object(
  {
    siteId: Type.String({ maxLength: 64, slip: 'Say which site: ?siteId=...' }),
    limit: Type.Optional(whole(1, 10_000)),
    after: Type.Optional(
      Type.String({ maxLength: 64, description: 'Id of the last prop of the page before.' }),
    ),
  },
  closed,
);

export type Load = Static<typeof Load>;
export type Switching = Static<typeof Switching>;
export type Trips = Static<typeof Trips>;
export type Prop = Static<typeof Prop>;
export type NewProp = Static<typeof NewProp>;
export type PropChanges = Static<typeof PropChanges>;
export type PropsQuery = Static<typeof PropsQuery>;
