import type { Night as NightValue } from '../actions/list-nights.ts';
import { formatInstant, type Instant } from '../model/evening.ts';
import type {
  PropForecast as PropForecastValue,
  SiteForecast as SiteForecastValue,
} from '../model/forecast.ts';
import type { LogEntry as EntryValue } from '../model/log-entry.ts';
import type { Prop as PropValue } from '../model/prop.ts';
import type { CalendarLink } from './schemas/calendar-links.ts';
import type { PropForecast, SiteForecast } from './schemas/forecasts.ts';
import type { LogEntry } from './schemas/log.ts';
import type { Prop, Switching } from './schemas/props.ts';
import type { Night } from './schemas/sites.ts';

// Values as they go out: instants become RFC 3339 text, everything else is as the model has it.

const text = (at: Instant | null): string | null => (at === null ? null : formatInstant(at));

export function propAnswer(prop: PropValue): Prop {
  return { ...prop, switching: switchingAnswer(prop.switching) };
}

function switchingAnswer(switching: PropValue['switching']): Switching {
  if (switching.kind !== 'interval-timer') return switching;
  const { setAt, ...timer } = switching;
  return setAt === undefined ? timer : { ...timer, setAt: formatInstant(setAt) };
}

export function nightAnswer(night: NightValue): Night {
  return {
    ...told(night),
    sunsetAt: text(night.sunsetAt),
    sunriseAt: text(night.sunriseAt),
    duskAt: text(night.duskAt),
    dawnAt: text(night.dawnAt),
  };
}

/** Digits of a reckoned number that are sent: the rest says nothing and makes every answer longer. */
const DIGITS_SENT = 6;

function told<Value>(value: Value): Value {
  if (typeof value === 'number') return Number(value.toPrecision(DIGITS_SENT)) as Value;
  if (Array.isArray(value)) return value.map(told) as Value;
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, each]) => [name, told(each)])) as Value;
}

export function propForecastAnswer(forecast: PropForecastValue): PropForecast {
  const { propId, asOf, fittedAt, ...reckoned } = forecast;
  return { propId, asOf: formatInstant(asOf), fittedAt: text(fittedAt), ...told(reckoned) };
}

export function siteForecastAnswer({ asOf, ...forecast }: SiteForecastValue): SiteForecast {
  return { asOf: formatInstant(asOf), ...told(forecast) };
}

export function entryAnswer(entry: EntryValue, hints: string[] = []): LogEntry {
  const { at, recordedAt, undoneAt, ...rest } = entry;
  return {
    ...rest,
    at: formatInstant(at),
    recordedAt: formatInstant(recordedAt),
    ...(undoneAt === undefined ? {} : { undoneAt: formatInstant(undoneAt) }),
    ...(hints.length > 0 ? { hints } : {}),
  };
}

export function linkAnswer(link: {
  id: string;
  label: string | null;
  alarms: boolean;
  createdAt: Instant;
  lastReadAt: Instant | null;
}): CalendarLink {
  const { id, label, alarms, createdAt, lastReadAt } = link;
  return { id, label, alarms, createdAt: formatInstant(createdAt), lastReadAt: text(lastReadAt) };
}
