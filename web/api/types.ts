// The server's schemas are the one source of these types; nothing but types comes across.
export type { CalendarLink, MadeCalendarLink } from '../../server/http/schemas/calendar-links.ts';
export type { CellType } from '../../server/http/schemas/cell-types.ts';
export type { PropsImported } from '../../server/http/schemas/csv.ts';
export type { FieldFault, Problem } from '../../server/http/schemas/errors.ts';
export type {
  EveningRange,
  ForecastNight,
  PropForecast,
  SiteForecast,
  SiteForecastProp,
} from '../../server/http/schemas/forecasts.ts';
export type { Health } from '../../server/http/schemas/health.ts';
export type { LogEntry, NewSighting, NewSwap, Sighting, Swap } from '../../server/http/schemas/log.ts';
export type { Load, NewProp, Prop, PropChanges, Switching, Trips } from '../../server/http/schemas/props.ts';
export type {
  NewSite,
  Night,
  RoundHabits,
  ShowNight,
  Site,
  SiteChanges,
  TypedNight,
  WeatherImported,
  WeatherInUse,
} from '../../server/http/schemas/sites.ts';
