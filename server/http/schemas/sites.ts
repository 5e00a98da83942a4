import { type Static, Type } from 'typebox';
import {
  closed,
  EveningField,
  Id,
  InstantField,
  Nullable,
  number,
  oneOf,
  text,
  WallTime,
  whole,
} from './fields.ts';

export const RoundHabits = Type.Object(
  {
    weekdays: Type.Array(whole(1, 7, { slip: 'Weekdays count from 1 (Monday) to 7 (Sunday).' }), {
      maxItems: 7,
      uniqueItems: true,
    }),
    startsAt: WallTime,
    minutesFree: number(0, 1440),
    minutesPerStop: number(0, 240),
    walkMinutes: number(0, 1440),
    cost: number(0, 1_000_000, { description: 'What one round costs, in the same money as cells.' }),
  },
  closed,
);

const twelve = (what: string) =>
  Type.Array(number(-60, 50, { slip: '°C are wanted. A value like 68 is probably °F.' }), {
    minItems: 12,
    maxItems: 12,
    description: `${what}, January first, °C`,
    slip: 'Twelve numbers are wanted, January first.',
  });

const siteFields = {
  name: text(120),
  latitudeDeg: number(-90, 90, {
    slip: 'Degrees north of the equator, south negative: was a decimal point left out?',
  }),
  longitudeDeg: number(-180, 180, {
    slip: 'Degrees east of Greenwich, west negative: was a decimal point left out?',
  }),
  timeZone: text(64, { slip: "An IANA name is wanted, like 'Europe/London'." }),
  seasonFrom: EveningField,
  seasonThrough: EveningField,
  monthlyMinC: twelve('Mean daily minima'),
  monthlyMaxC: twelve('Mean daily maxima'),
  confidence: number(0.5, 0.999, { slip: 'A share is wanted: 0.9 for 90 %.' }),
  marginNights: whole(0, 5),
  rounds: RoundHabits,
  zoneOffsetsC: Type.Record(Type.String({ minLength: 1, maxLength: 60 }), number(-15, 15), {
    maxProperties: 100,
    description: 'K warmer or colder than the site, by zone name: {"Mill Race": -3}.',
  }),
};

export const Site = Type.Object({ id: Id, ...siteFields }, { $id: 'Site' });

const optional = Type.Partial(Type.Object(siteFields), closed);
export const SiteChanges = Type.Object({ ...optional.properties }, closed);
export const NewSite = Type.Object(
  {
    name: siteFields.name,
    latitudeDeg: siteFields.latitudeDeg,
    longitudeDeg: siteFields.longitudeDeg,
    timeZone: siteFields.timeZone,
    seasonFrom: siteFields.seasonFrom,
    seasonThrough: siteFields.seasonThrough,
    monthlyMinC: siteFields.monthlyMinC,
    monthlyMaxC: siteFields.monthlyMaxC,
    confidence: Type.Optional(siteFields.confidence),
    marginNights: Type.Optional(siteFields.marginNights),
    rounds: Type.Optional(RoundHabits),
    zoneOffsetsC: Type.Optional(siteFields.zoneOffsetsC),
  },
  closed,
);

export const ShowNight = Type.Object(
  {
    evening: EveningField,
    opensAt: WallTime,
    closesAt: WallTime,
    calledOff: Type.Optional(Type.Boolean()),
  },
  closed,
);
export const ShowNights = Type.Array(ShowNight, { maxItems: 400 });

export const Night = Type.Object({
  evening: EveningField,
  sunsetAt: Nullable(InstantField),
  sunriseAt: Nullable(InstantField),
  duskAt: Nullable(InstantField),
  dawnAt: Nullable(InstantField),
  darkHours: Type.Number({ description: 'Hours between civil dusk and dawn (-6°).' }),
  sun: Type.Optional(oneOf(['never-dark', 'never-light'])),
  showNight: Nullable(ShowNight),
  meanC: Type.Number({ description: 'Mean air temperature from sunset to sunrise.' }),
  minC: Type.Number({ description: 'Lowest hour from sunset to sunrise.' }),
  weather: oneOf(['observed', 'forecast', 'climate']),
});

export const NightsQuery = Type.Object(
  {
    from: Type.Optional(EveningField),
    through: Type.Optional(EveningField),
    asOf: Type.Optional(InstantField),
  },
  closed,
);

export const TypedNight = Type.Object(
  {
    minC: number(-60, 50, { slip: '°C are wanted; 38 may be 38 °F, which is 3 °C.' }),
    maxC: number(-60, 50, { slip: '°C are wanted; 38 may be 38 °F, which is 3 °C.' }),
  },
  closed,
);

/** A typed night as it is kept. */
export const KeptTypedNight = Type.Object({
  evening: EveningField,
  minC: Type.Number(),
  maxC: Type.Number(),
});

export const WeatherQuery = Type.Object(
  {
    unit: Type.Optional(
      oneOf(['C', 'F'], { description: 'What the temperatures are in, when the file does not say.' }),
    ),
  },
  closed,
);

export const WeatherInUse = Type.Object({
  typicalYear: Nullable(Type.Object({ stationName: Type.String() })),
  hours: Nullable(
    Type.Object({
      from: EveningField,
      through: EveningField,
      count: Type.Integer({ description: 'Hours with a temperature, of those between the two dates.' }),
    }),
  ),
  typedNights: Type.Array(EveningField),
});

export const WeatherRemovalQuery = Type.Object(
  { of: oneOf(['typical-year', 'hours'], { slip: 'Say what to take out: ?of=typical-year or ?of=hours.' }) },
  closed,
);

export const SitesQuery = Type.Object(
  {
    limit: Type.Optional(whole(1, 1000)),
    after: Type.Optional(
      Type.String({ maxLength: 64, description: 'Id of the last site of the page before.' }),
    ),
  },
  closed,
);

export const WeatherImported = Type.Object({
  format: Type.String(),
  rows: Type.Integer(),
  from: Type.String(),
  through: Type.String(),
  station: Type.Optional(
    Type.Object({
      name: Type.String(),
      latitudeDeg: Type.Number(),
      longitudeDeg: Type.Number(),
      elevationM: Type.Optional(Type.Number()),
    }),
  ),
  rejected: Type.Array(Type.Object({ line: Type.Integer(), message: Type.String() })),
  warnings: Type.Array(Type.String()),
});

export type RoundHabits = Static<typeof RoundHabits>;
export type Site = Static<typeof Site>;
export type NewSite = Static<typeof NewSite>;
export type SiteChanges = Static<typeof SiteChanges>;
export type ShowNight = Static<typeof ShowNight>;
export type Night = Static<typeof Night>;
export type TypedNight = Static<typeof TypedNight>;
export type WeatherImported = Static<typeof WeatherImported>;
export type ShowNights = Static<typeof ShowNights>;
export type NightsQuery = Static<typeof NightsQuery>;
export type WeatherInUse = Static<typeof WeatherInUse>;
export type WeatherRemovalQuery = Static<typeof WeatherRemovalQuery>;
export type WeatherQuery = Static<typeof WeatherQuery>;
export type SitesQuery = Static<typeof SitesQuery>;
