import type {
  CalendarLink,
  CellType,
  Health,
  LogEntry,
  MadeCalendarLink,
  NewProp,
  NewSighting,
  NewSite,
  NewSwap,
  Night,
  Problem,
  Prop,
  PropChanges,
  PropForecast,
  PropsImported,
  ShowNight,
  Sighting,
  Site,
  SiteChanges,
  SiteForecast,
  Swap,
  TypedNight,
  WeatherImported,
  WeatherInUse,
} from './types.ts';

export type Answer<T> = { ok: true; value: T } | { ok: false; problem: Problem };

type Method = 'GET' | 'POST' | 'PATCH' | 'PUT' | 'DELETE';
type Ask = {
  query?: Record<string, string | number | null | undefined>;
  json?: unknown;
  csv?: Blob | string;
  /** The same key for every try of one deed, so that a replay cannot record it twice. */
  onceKey?: string;
};

const UNREACHABLE: Problem = {
  title: 'Duskround does not answer',
  status: 0,
  detail: 'The server cannot be reached from here. What is on the page is the last that came.',
  code: 'unreachable',
  errors: [],
};

/** The one way out. A refusal is a value, never an exception; so is silence. */
async function request<T>(method: Method, path: string, ask: Ask = {}): Promise<Answer<T>> {
  const query = new URLSearchParams();
  for (const [name, value] of Object.entries(ask.query ?? {})) {
    if (value !== null && value !== undefined) query.set(name, String(value));
  }
  const headers: Record<string, string> = { accept: 'application/json' };
  if (ask.json !== undefined) headers['content-type'] = 'application/json';
  if (ask.csv !== undefined) headers['content-type'] = 'text/csv';
  if (ask.onceKey) headers['idempotency-key'] = ask.onceKey;
  const body = ask.csv ?? (ask.json === undefined ? null : JSON.stringify(ask.json));
  const tail = query.size > 0 ? `?${query}` : '';
  try {
    const response = await fetch(`/api${path}${tail}`, { method, headers, body });
    const text = await response.text();
    if (response.ok) return { ok: true, value: (text ? JSON.parse(text) : null) as T };
    return { ok: false, problem: problemOf(response.status, text) };
  } catch {
    return { ok: false, problem: UNREACHABLE };
  }
}

function problemOf(status: number, text: string): Problem {
  try {
    const problem = JSON.parse(text) as Partial<Problem>;
    if (typeof problem.title === 'string')
      return { detail: '', code: '', errors: [], ...problem, title: problem.title, status };
  } catch {
    // Not our server's words: something between it and this page answered.
  }
  return {
    title: 'That did not work',
    status,
    detail: `The answer was ${status}, without a reason.`,
    code: 'unexplained',
    errors: [],
  };
}

/** A key for one deed. crypto.randomUUID is missing on plain http, getRandomValues is not. */
export function onceKey(): string {
  return [...crypto.getRandomValues(new Uint8Array(16))]
    .map((byte) => byte.toString(16).padStart(2, '0'))
    .join('');
}

type AsOf = string | null;

export const api = {
  health: () => request<Health>('GET', '/health'),
  sites: () => request<Site[]>('GET', '/sites'),
  addSite: (site: NewSite) => request<Site>('POST', '/sites', { json: site }),
  changeSite: (siteId: string, changes: SiteChanges) =>
    request<Site>('PATCH', `/sites/${siteId}`, { json: changes }),
  nights: (siteId: string, asOf: AsOf) =>
    request<Night[]>('GET', `/sites/${siteId}/nights`, { query: { asOf } }),
  showNights: (siteId: string, asOf: AsOf) =>
    request<ShowNight[]>('GET', `/sites/${siteId}/show-nights`, { query: { asOf } }),
  setShowNights: (siteId: string, nights: ShowNight[]) =>
    request<ShowNight[]>('PUT', `/sites/${siteId}/show-nights`, { json: nights }),
  importWeather: (siteId: string, file: Blob) =>
    request<WeatherImported>('POST', `/sites/${siteId}/weather`, { csv: file }),
  weatherInUse: (siteId: string) => request<WeatherInUse>('GET', `/sites/${siteId}/weather`),
  removeWeather: (siteId: string, of: 'typical-year' | 'hours') =>
    request<null>('DELETE', `/sites/${siteId}/weather`, { query: { of } }),
  typeNight: (siteId: string, night: TypedNight & { evening: string }) =>
    request<unknown>('PUT', `/sites/${siteId}/weather/nights/${night.evening}`, {
      json: { minC: night.minC, maxC: night.maxC },
    }),
  siteForecast: (siteId: string, asOf: AsOf) =>
    request<SiteForecast>('GET', `/sites/${siteId}/forecast`, { query: { asOf } }),
  calendarLinks: (siteId: string) => request<CalendarLink[]>('GET', `/sites/${siteId}/calendar-links`),
  addCalendarLink: (siteId: string, link: { label?: string; alarms?: boolean }) =>
    request<MadeCalendarLink>('POST', `/sites/${siteId}/calendar-links`, { json: link }),
  removeCalendarLink: (siteId: string, linkId: string) =>
    request<null>('DELETE', `/sites/${siteId}/calendar-links/${linkId}`),

  cellTypes: () => request<CellType[]>('GET', '/cell-types'),

  props: (siteId: string) => request<Prop[]>('GET', '/props', { query: { siteId } }),
  prop: (propId: string) => request<Prop>('GET', `/props/${propId}`),
  addProp: (prop: NewProp) => request<Prop>('POST', '/props', { json: prop }),
  importProps: (siteId: string, rows: Blob, { dryRun }: { dryRun: boolean }) =>
    request<PropsImported>('POST', `/sites/${siteId}/props/import`, {
      csv: rows,
      query: { dryRun: String(dryRun) },
    }),
  changeProp: (propId: string, changes: PropChanges) =>
    request<Prop>('PATCH', `/props/${propId}`, { json: changes }),
  forecast: (propId: string, asOf: AsOf) =>
    request<PropForecast>('GET', `/props/${propId}/forecast`, { query: { asOf } }),
  log: (propId: string) => request<LogEntry[]>('GET', `/props/${propId}/log`),
  recordSwap: (propId: string, swap: NewSwap, key: string) =>
    request<Swap>('POST', `/props/${propId}/swaps`, { json: swap, onceKey: key }),
  recordSighting: (propId: string, sighting: NewSighting, key: string) =>
    request<Sighting>('POST', `/props/${propId}/sightings`, { json: sighting, onceKey: key }),
  undo: (propId: string, entryId: string) => request<unknown>('DELETE', `/props/${propId}/log/${entryId}`),
};
