import ical, { ICalAlarmType, ICalEventStatus, ICalEventTransparency } from 'ical-generator';
import type { DueEvent } from '../model/due-event.ts';
import type { DueContent } from '../planning/due-evenings.ts';

export type CalendarEvent = Pick<DueEvent, 'uid' | 'sequence' | 'createdAt' | 'modifiedAt' | 'state'> & {
  content: DueContent;
};

const REFRESH_SECONDS = 4 * 3600;
const ALARM_SECONDS_BEFORE = 30 * 60;
const TAGS_IN_SUMMARY = 4;
const MINUTE_MS = 60_000;

/**
 * A site's due evenings as iCalendar text (RFC 5545), fit for a subscription. The same events give the same bytes
 * whenever and wherever they are asked for: only UTC instants, and no stamp of the asking. Nothing tells where the
 * site is. Source: RFC 5545, RFC 7986 (NAME, REFRESH-INTERVAL).
 * @param siteName what the calendar is called after
 * @param options.events in the order they are to stand in
 * @param options.alarms whether events that are due ring, half an hour before
 * @returns text whose lines all end in CRLF; without events a calendar with nothing in it, which RFC 5545 has no
 *   word for but readers take
 */
export function calendarText(
  siteName: string,
  options: { events: readonly CalendarEvent[]; alarms: boolean },
): string {
  const calendar = ical({
    // The library writes the name as it comes, so it is escaped here.
    name: escaped(`${oneLine(siteName)}: swaps due`),
    prodId: { company: 'Duskround', product: 'Swaps due', language: 'EN' },
    ttl: REFRESH_SECONDS,
  });
  for (const event of options.events) {
    const { content } = event;
    const modified = new Date(event.modifiedAt);
    const due = event.state === 'due';
    calendar.createEvent({
      id: oneLine(event.uid),
      sequence: event.sequence,
      start: new Date(content.startsAt),
      end: new Date(content.startsAt + content.minutes * MINUTE_MS),
      stamp: modified,
      lastModified: modified,
      created: new Date(event.createdAt),
      summary: `${due ? '' : 'Cancelled: '}${summaryOf(content)}`,
      description: due ? dueDescription(content) : cancelledDescription(content),
      status: due ? ICalEventStatus.CONFIRMED : ICalEventStatus.CANCELLED,
      transparency: ICalEventTransparency.TRANSPARENT,
      categories: [{ name: 'Swaps due' }],
      alarms:
        due && options.alarms ? [{ type: ICalAlarmType.display, triggerBefore: ALARM_SECONDS_BEFORE }] : [],
    });
  }
  return `${alarmsLast(calendar.toString())}\r\n`;
}

/** RFC 5545 3.6.1 wants an event's alarms after its properties; the library writes some properties behind them. */
function alarmsLast(text: string): string {
  return text.replace(/^(BEGIN:VALARM\r\n[\s\S]*?^END:VALARM\r\n)([\s\S]*?)(?=^END:VEVENT\r\n)/gm, '$2$1');
}

function summaryOf({ stopCount, stops }: DueContent): string {
  const props = stopCount === 1 ? '1 prop' : `${stopCount} props`;
  const told = stopCount > TAGS_IN_SUMMARY ? TAGS_IN_SUMMARY - 1 : stopCount;
  const tags = stops.slice(0, told).map((stop) => oneLine(stop.tag));
  const more = stopCount > told ? ` and ${stopCount - told} more` : '';
  return `Swap ${props}: ${tags.join(', ')}${more}`;
}

function dueDescription(content: DueContent): string {
  const { stops, stopCount } = content;
  return [
    `${oneLine(content.siteName)}: ${content.when}, about ${content.minutes} minutes.`,
    '',
    ...stops.map(
      (stop) => `${oneLine(stop.zone)} · ${oneLine(stop.tag)} ${oneLine(stop.name)}: ${cellsText(stop)}`,
    ),
    ...(stopCount > stops.length ? [`… and ${stopCount - stops.length} more props.`] : []),
    '',
    `Cells in all: ${content.cells.map(cellsText).join(', ')}`,
    'Reminders, not assurance.',
  ].join('\n');
}

function cancelledDescription(content: DueContent): string {
  return [
    `${oneLine(content.siteName)}: ${content.when}.`,
    'Nothing falls due this evening any more: it is swapped already, or the forecast moved.',
    'Reminders, not assurance.',
  ].join('\n');
}

function cellsText({ cells, cellName }: { cells: number; cellName: string }): string {
  return `${cells} × ${oneLine(cellName)}`;
}

/**
 * A free text kept to its line and fit for UTF-8. Line breaks of every alphabet become blanks, so that no name can
 * pass for a line of its own; other control characters, which RFC 5545 3.3.11 bans, go.
 */
function oneLine(text: string): string {
  return text
    .replace(/\r\n|[\t\n\v\f\r\u0085\u2028\u2029]/g, ' ')
    .replace(/\p{Cc}/gu, '')
    .replace(/\p{Surrogate}/gu, '\uFFFD');
}

/** RFC 5545 3.3.11, TEXT. */
function escaped(text: string): string {
  return text.replace(/[\\;,]/g, (sign) => `\\${sign}`);
}
