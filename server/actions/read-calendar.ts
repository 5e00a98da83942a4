import { createHash } from 'node:crypto';
import { calendarText } from '../exchange/calendar.ts';
import { builtInCellType } from '../model/cell-types-built-in.ts';
import type { DueEvent } from '../model/due-event.ts';
import { HOUR_MS } from '../model/evening.ts';
import { cellsIn } from '../model/set-in-use.ts';
import { contentOf, dueEvenings, type PropCells, reconcile } from '../planning/due-evenings.ts';
import { type CalendarLink, findCalendarLinkByHash, touchCalendarLink } from '../store/calendar-links.ts';
import { listCellTypes } from '../store/cell-types.ts';
import { listDueEvents, saveDueEvents } from '../store/due-evenings.ts';
import type { Db, Store } from '../store/open.ts';
import { listProps } from '../store/props.ts';
import type { Deps } from './deps.ts';
import { siteOf } from './find-site.ts';
import { forecastSite, siteForecastMark } from './forecast-site.ts';
import { hashOfSecret } from './make-calendar-link.ts';

export type Calendar = { text: string; etag: string };

const MOST_CALENDARS_KEPT = 200;
// Calendars poll an unchanged site for months, so what was last written is kept, for each store apart.
const calendarsKept = new WeakMap<Store, Map<string, Calendar>>();

/**
 * The calendar behind a secret: one event for each evening by which sets must be swapped. The same state gives the
 * same bytes; an event keeps its identity when the forecast moves it.
 * @param deps what a deed needs
 * @param input.secret the part of the address nobody can guess
 * @returns null for a secret nobody has, or has any more
 */
export function readCalendar(deps: Deps, input: { secret: string }): Calendar | null {
  const link = findCalendarLinkByHash(deps.store.db, hashOfSecret(input.secret));
  if (!link) return null;
  rememberReading(deps, link);
  const kept = calendarsKept.get(deps.store) ?? new Map<string, Calendar>();
  calendarsKept.set(deps.store, kept);
  const key = `${link.alarms} ${siteForecastMark(deps, { siteId: link.siteId })}`;
  const known = kept.get(key);
  if (known) return known;
  const calendar = writtenCalendar(deps, link);
  if (kept.size >= MOST_CALENDARS_KEPT) kept.clear();
  kept.set(key, calendar);
  return calendar;
}

/** When a link was last read is worth knowing to the hour; a write each time would make polling dear. */
function rememberReading({ store, clock }: Deps, { id, lastReadAt }: CalendarLink): void {
  const now = clock.now();
  if (lastReadAt === null || now - lastReadAt >= HOUR_MS) touchCalendarLink(store.db, id, now);
}

function writtenCalendar(deps: Deps, { siteId, alarms }: CalendarLink): Calendar {
  const site = siteOf(deps.store.db, siteId);
  const events = toldEvents(deps, siteId);
  const text = calendarText(site.name, {
    alarms,
    events: events.map((event) => ({ ...event, content: contentOf(event) })),
  });
  return { text, etag: `"${createHash('sha256').update(text).digest('base64url')}"` };
}

/** What calendars are told of the site now, kept when it is not what they were told before. */
function toldEvents(deps: Deps, siteId: string): DueEvent[] {
  return deps.store.transact((db) => {
    const forecast = forecastSite(deps, { siteId });
    const stored = listDueEvents(db, siteId);
    const events = reconcile({
      stored,
      due: dueEvenings(forecast, cellsByProp(db, siteId)),
      site: siteOf(db, siteId),
      today: forecast.evening,
      at: forecast.asOf,
      newId: deps.newId,
    });
    // An event that stays as told is the very same one.
    const same = events.length === stored.length && events.every((event, n) => event === stored[n]);
    if (!same) saveDueEvents(db, siteId, events);
    return events;
  });
}

function cellsByProp(db: Db, siteId: string): (propId: string) => PropCells {
  const ownNames = new Map(listCellTypes(db).map(({ id, name }) => [id, name]));
  const nameOf = (id: string) => {
    const builtIn = builtInCellType(id);
    return builtIn ? `${builtIn.name} (${id})` : (ownNames.get(id) ?? id);
  };
  const cells = new Map(
    listProps(db, siteId).map((prop) => [
      prop.id,
      { cellName: nameOf(prop.cellTypeId), cells: cellsIn(prop) },
    ]),
  );
  return (propId) => cells.get(propId)!;
}
