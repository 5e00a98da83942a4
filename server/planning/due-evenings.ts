import type { DueEvent } from '../model/due-event.ts';
import {
  addEvenings,
  type Evening,
  eveningsBetween,
  type Instant,
  instantInEvening,
  wallTimeOf,
} from '../model/evening.ts';
import type { SiteForecast } from '../model/forecast.ts';
import type { Site } from '../model/site.ts';
import { eveningWords } from './evening-words.ts';

/** The cells a prop takes: which, in words, and how many in all its units. */
export type PropCells = { cellName: string; cells: number };
export type DueStop = PropCells & { propId: string; tag: string; name: string; zone: string };
/** An evening by which sets must be swapped, and the stops of a round that swaps them. */
export type DueEvening = { evening: Evening; stops: DueStop[] };

/** What calendars are told of a due evening; with the state it is all that shows. */
export type DueContent = {
  startsAt: Instant;
  minutes: number;
  siteName: string;
  /** The usual start of rounds that evening: 'Thu 22 Oct, 16:30 (Europe/London)'. */
  when: string;
  stopCount: number;
  /** At most `MOST_STOPS_TOLD` of them. */
  stops: Omit<DueStop, 'propId'>[];
  /** Of all stops together. */
  cells: PropCells[];
};

/** Nobody walks more stops in an evening, and a neglected site's calendar must stay under a megabyte. Ours. */
export const MOST_STOPS_TOLD = 60;
const SHORTEST_MINUTES = 15;
// Calendars lose what is dropped, but some refuse long files. From memory of how calendar programs behave.
const PAST_EVENINGS_KEPT = 60;
const CANCELLED_EVENINGS_KEPT = 7;
const LATEST_DAYS_AHEAD = 548;
const SECOND_MS = 1000;

/**
 * The evenings of a forecast by which sets must be swapped, in order, each with its stops by zone, then tag.
 * @param forecast the site's; its props by tag
 * @param cellsOf the cells a prop takes, by its id
 */
export function dueEvenings(forecast: SiteForecast, cellsOf: (propId: string) => PropCells): DueEvening[] {
  const byEvening = new Map<Evening, DueStop[]>();
  for (const { propId, tag, name, zone, swapBy } of forecast.props) {
    if (swapBy === null || eveningsBetween(forecast.evening, swapBy) > LATEST_DAYS_AHEAD) continue;
    const stop = { propId, tag, name, zone, ...cellsOf(propId) };
    const stops = byEvening.get(swapBy);
    if (stops) stops.push(stop);
    else byEvening.set(swapBy, [stop]);
  }
  // Sorting keeps the order of equals, so within a zone the tags stay as counted: A-2 before A-10.
  for (const stops of byEvening.values()) stops.sort((a, b) => compare(a.zone, b.zone));
  return [...byEvening]
    .map(([evening, stops]) => ({ evening, stops }))
    .sort((a, b) => compare(a.evening, b.evening));
}

/**
 * What calendars are told of a due evening: it starts when rounds usually do and lasts as long as the walk and the
 * stops take, whether or not there is time for that.
 * @param due the evening and its stops
 * @param site whose habits and time zone count
 */
export function dueContent({ evening, stops }: DueEvening, site: Site): DueContent {
  const { rounds, timeZone } = site;
  const startsAt = instantInEvening(evening, rounds.startsAt, timeZone);
  const wallTime = wallTimeOf(startsAt, timeZone);
  // An evening ends at the next noon, so a round at nine in the morning carries the next date.
  const date = wallTime < '12:00' ? addEvenings(evening, 1) : evening;
  const cells = new Map<string, number>();
  for (const stop of stops) cells.set(stop.cellName, (cells.get(stop.cellName) ?? 0) + stop.cells);
  return {
    startsAt,
    minutes: Math.max(
      SHORTEST_MINUTES,
      Math.round(rounds.walkMinutes + stops.length * rounds.minutesPerStop),
    ),
    siteName: site.name,
    when: `${eveningWords(date)}, ${wallTime} (${timeZone})`,
    stopCount: stops.length,
    stops: stops.slice(0, MOST_STOPS_TOLD).map(({ propId: _, ...told }) => told),
    cells: [...cells]
      .map(([cellName, count]) => ({ cellName, cells: count }))
      .sort((a, b) => compare(a.cellName, b.cellName)),
  };
}

/** What calendars were told of an event. @param event one that `reconcile` gave */
export function contentOf(event: DueEvent): DueContent {
  return JSON.parse(event.fingerprint) as DueContent;
}

type Told = { due: DueEvening; content: DueContent; fingerprint: string };

/**
 * What calendars are to be told next, given what they were told and what the forecast says now. Identities stay: an
 * evening still due keeps its event; an event whose evening is due no more moves to the nearest new due evening that
 * takes more than half of its props, and is cancelled where there is none. Past events stay as they were told.
 * Where nothing changed the result equals `stored`. Ours.
 * @param of.stored the site's events as last told
 * @param of.due what is due now
 * @param of.today the evening it is
 * @param of.at the moment the forecast was made for
 * @param of.newId an id nobody has yet
 * @returns by evening, then uid
 */
export function reconcile(of: {
  stored: readonly DueEvent[];
  due: readonly DueEvening[];
  site: Site;
  today: Evening;
  at: Instant;
  newId: () => string;
}): DueEvent[] {
  const { stored, site, today, at } = of;
  const result = stored.filter((event) => event.evening < today && isKept(event, today));
  const coming = stored.filter((event) => event.evening >= today);
  const dues = of.due
    .filter(({ evening }) => evening >= today)
    .map((due) => {
      const content = dueContent(due, site);
      return { due, content, fingerprint: JSON.stringify(content) };
    });
  const eventFor = matchEvents(coming, dues);
  for (const told of dues) {
    const before = eventFor.get(told);
    result.push(
      before ? retold(before, told, at) : newlyTold(told, { siteId: site.id, uid: of.newId(), at }),
    );
  }
  const matched = new Set(eventFor.values());
  for (const event of coming)
    if (!matched.has(event)) result.push(event.state === 'cancelled' ? event : cancelled(event, at));
  return result.sort((a, b) => compare(a.evening, b.evening) || compare(a.uid, b.uid));
}

function isKept(event: DueEvent, today: Evening): boolean {
  const ago = eveningsBetween(event.evening, today);
  return ago <= (event.state === 'due' ? PAST_EVENINGS_KEPT : CANCELLED_EVENINGS_KEPT);
}

/** Which event tells of which due evening: the one of the same evening, else the nearest that shares its props. */
function matchEvents(coming: readonly DueEvent[], dues: readonly Told[]): Map<Told, DueEvent> {
  const eventFor = new Map<Told, DueEvent>();
  const free = new Set(coming);
  for (const told of dues) {
    const same = coming.filter(({ evening }) => evening === told.due.evening);
    const event = same.find(({ state }) => state === 'due') ?? same[0];
    if (!event) continue;
    eventFor.set(told, event);
    free.delete(event);
  }
  for (const { event, told } of movesOf(
    [...free].filter(({ state }) => state === 'due'),
    dues.filter((told) => !eventFor.has(told)),
  )) {
    if (!free.has(event) || eventFor.has(told)) continue;
    eventFor.set(told, event);
    free.delete(event);
  }
  return eventFor;
}

/** Every move that would keep more than half of an event's props together, nearest first, then most props. */
function movesOf(events: readonly DueEvent[], dues: readonly Told[]) {
  const moves = [];
  for (const told of dues) {
    const propIds = new Set(told.due.stops.map(({ propId }) => propId));
    for (const event of events) {
      const shared = event.propIds.filter((propId) => propIds.has(propId)).length;
      if (shared * 2 <= event.propIds.length) continue;
      moves.push({ event, told, shared, far: Math.abs(eveningsBetween(event.evening, told.due.evening)) });
    }
  }
  return moves.sort(
    (a, b) =>
      a.far - b.far ||
      b.shared - a.shared ||
      compare(a.told.due.evening, b.told.due.evening) ||
      compare(a.event.evening, b.event.evening) ||
      compare(a.event.uid, b.event.uid),
  );
}

function newlyTold({ due, fingerprint }: Told, of: { siteId: string; uid: string; at: Instant }): DueEvent {
  return {
    uid: of.uid,
    siteId: of.siteId,
    evening: due.evening,
    sequence: 0,
    createdAt: of.at,
    modifiedAt: of.at,
    state: 'due',
    fingerprint,
    propIds: propIdsOf(due),
  };
}

function propIdsOf({ stops }: DueEvening): string[] {
  return stops.map(({ propId }) => propId);
}

function retold(before: DueEvent, { due, content, fingerprint }: Told, at: Instant): DueEvent {
  const propIds = propIdsOf(due);
  const { evening } = due;
  const sameProps =
    propIds.length === before.propIds.length && propIds.every((id, n) => id === before.propIds[n]);
  const sameText = fingerprint === before.fingerprint;
  if (sameText && sameProps && before.state === 'due' && before.evening === evening) return before;
  const shown = { ...before, evening, state: 'due' as const, fingerprint, propIds };
  if (sameText && before.state === 'due' && before.evening === evening) return shown;
  const told = contentOf(before);
  const sameTimes = told.startsAt === content.startsAt && told.minutes === content.minutes;
  // A text alone may change without being counted. Source: RFC 5546 2.1.4.
  const counted = before.state === 'cancelled' || before.evening !== evening || !sameTimes;
  return { ...shown, sequence: before.sequence + (counted ? 1 : 0), modifiedAt: laterThan(before, at) };
}

function cancelled(event: DueEvent, at: Instant): DueEvent {
  return { ...event, state: 'cancelled', sequence: event.sequence + 1, modifiedAt: laterThan(event, at) };
}

/** Calendars read whole seconds, and must see every change as later than the one before. */
function laterThan(event: DueEvent, at: Instant): Instant {
  return Math.max(at, event.modifiedAt + SECOND_MS);
}

function compare(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
