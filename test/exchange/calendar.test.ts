import fc from 'fast-check';
import ICAL from 'ical.js';
import nodeIcal from 'node-ical';
import { describe, expect, test } from 'vitest';
import { type CalendarEvent, calendarText } from '../../server/exchange/calendar.ts';

// Read back by two parsers that are no part of the project: ical.js and node-ical. The rules on octets, properties and
// text are those of RFC 5545 (3.1, 3.3.11, 3.6.1) and RFC 7986 (NAME, REFRESH-INTERVAL).

type Changes = Partial<Omit<CalendarEvent, 'content'>> & { content?: Partial<CalendarEvent['content']> };

function anEvent({ content, ...rest }: Changes = {}): CalendarEvent {
  return {
    uid: '0b0f3c52-6a0e-4c7e-9d0f-1f6f5a3f8d11',
    sequence: 2,
    createdAt: Date.parse('2026-10-20T08:00:00Z'),
    modifiedAt: Date.parse('2026-10-21T09:15:00Z'),
    state: 'due',
    ...rest,
    content: {
      startsAt: Date.parse('2026-10-24T17:30:00Z'),
      minutes: 43,
      siteName: 'Mill Walk',
      when: 'Sat 24 Oct, 18:30 (Europe/London)',
      stopCount: 2,
      stops: [
        { tag: 'B-06', name: 'Heron', zone: 'Mill Race', cellName: 'AA alkaline (LR6)', cells: 3 },
        { tag: 'B-08', name: 'Moth lantern', zone: 'Orchard', cellName: 'D alkaline (LR20)', cells: 4 },
      ],
      cells: [
        { cellName: 'AA alkaline (LR6)', cells: 3 },
        { cellName: 'D alkaline (LR20)', cells: 4 },
      ],
      ...content,
    },
  };
}

const written = (events: CalendarEvent[], rest: { name?: string; alarms?: boolean } = {}) =>
  calendarText(rest.name ?? 'Mill Walk', { events, alarms: rest.alarms ?? false });

/** Every event as ical.js reads it, with each property's values. */
function readByIcalJs(text: string) {
  const calendar = new ICAL.Component(ICAL.parse(text));
  const valuesOf = (component: ICAL.Component, name: string) =>
    component.getAllProperties(name).map((property) => property.getFirstValue());
  const events = calendar.getAllSubcomponents('vevent');
  return {
    // ical.js does not know these two as text, so it is asked to read them as it reads a summary.
    names: ['name', 'x-wr-calname'].map((name) => {
      const line = `SUMMARY:${calendar.getFirstPropertyValue(name)}`;
      return String(ICAL.Property.fromString(line).getFirstValue());
    }),
    calendar,
    events: events.map((event) => ({
      component: event,
      value: (name: string) => String(event.getFirstPropertyValue(name)),
      atMs: (name: string) => (event.getFirstPropertyValue(name) as ICAL.Time).toJSDate().getTime(),
      zoneOf: (name: string) => (event.getFirstPropertyValue(name) as ICAL.Time).zone?.tzid,
      valuesOf: (name: string) => valuesOf(event, name),
    })),
  };
}

function readByNodeIcal(text: string) {
  const read = Object.values(nodeIcal.sync.parseICS(text));
  return read.filter((part): part is nodeIcal.VEvent => part?.type === 'VEVENT');
}

/** The content lines, unfolded, after the rules every line must keep. Source: RFC 5545 3.1. */
function checkedLines(text: string): string[] {
  expect(text.endsWith('END:VCALENDAR\r\n')).toBe(true);
  expect(text.replaceAll('\r\n', '')).not.toMatch(/\p{Cc}|\p{Surrogate}|[\u2028\u2029]/u);
  const lines = text.split('\r\n').slice(0, -1);
  for (const line of lines) {
    const octets = new TextEncoder().encode(line);
    expect(octets.length).toBeLessThanOrEqual(75);
    expect(line.trim()).not.toBe('');
    // A line cut inside a letter's octets would not read as UTF-8 by itself.
    expect(new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(octets)).toBe(line);
  }
  return text.replaceAll('\r\n ', '').split('\r\n').slice(0, -1);
}

test('both parsers read the same event, in UTC, to the second', () => {
  const text = written([anEvent()]);
  const [event] = readByIcalJs(text).events;
  const [other] = readByNodeIcal(text);
  expect(event!.value('uid')).toBe('0b0f3c52-6a0e-4c7e-9d0f-1f6f5a3f8d11');
  expect(other!.uid).toBe('0b0f3c52-6a0e-4c7e-9d0f-1f6f5a3f8d11');
  const startsAt = Date.parse('2026-10-24T17:30:00Z');
  const endsAt = Date.parse('2026-10-24T18:13:00Z');
  expect([event!.atMs('dtstart'), event!.atMs('dtend')]).toEqual([startsAt, endsAt]);
  expect([other!.start.getTime(), other!.end!.getTime()]).toEqual([startsAt, endsAt]);
  expect([event!.zoneOf('dtstart'), event!.zoneOf('dtend')]).toEqual(['UTC', 'UTC']);
  expect(event!.value('summary')).toBe('Swap 2 props: B-06, B-08');
  expect(other!.summary).toBe('Swap 2 props: B-06, B-08');
  const description = [
    'Mill Walk: Sat 24 Oct, 18:30 (Europe/London), about 43 minutes.',
    '',
    'Mill Race · B-06 Heron: 3 × AA alkaline (LR6)',
    'Orchard · B-08 Moth lantern: 4 × D alkaline (LR20)',
    '',
    'Cells in all: 3 × AA alkaline (LR6), 4 × D alkaline (LR20)',
    'Reminders, not assurance.',
  ].join('\n');
  expect(event!.value('description')).toBe(description);
  expect(other!.description).toBe(description);
  expect(event!.value('status')).toBe('CONFIRMED');
  expect(event!.value('transp')).toBe('TRANSPARENT');
  expect(event!.value('sequence')).toBe('2');
  expect(event!.value('categories')).toBe('Swaps due');
});

test('the stamp is the last change, never the asking', () => {
  const [event] = readByIcalJs(written([anEvent()])).events;
  const modifiedAt = Date.parse('2026-10-21T09:15:00Z');
  expect([event!.atMs('dtstamp'), event!.atMs('last-modified')]).toEqual([modifiedAt, modifiedAt]);
  expect(event!.atMs('created')).toBe(Date.parse('2026-10-20T08:00:00Z'));
  expect(written([anEvent()])).toBe(written([anEvent()]));
});

test('the calendar says what it is, how often to look, and nothing that makes it an invitation or a map', () => {
  const lines = checkedLines(written([anEvent()], { name: 'Mill, Walk; "upper" \\ end' }));
  for (const line of ['VERSION:2.0', 'REFRESH-INTERVAL;VALUE=DURATION:PT4H', 'X-PUBLISHED-TTL:PT4H'])
    expect(lines.filter((other) => other === line)).toHaveLength(1);
  const names = lines.map((line) => line.split(/[:;]/)[0]);
  expect(names.filter((name) => name === 'PRODID')).toHaveLength(1);
  for (const absent of [
    'METHOD',
    'ATTENDEE',
    'ORGANIZER',
    'GEO',
    'LOCATION',
    'TZID',
    'X-WR-TIMEZONE',
    'SOURCE',
  ])
    expect(names).not.toContain(absent);
  const name = 'Mill, Walk; "upper" \\ end: swaps due';
  expect(readByIcalJs(written([], { name: 'Mill, Walk; "upper" \\ end' })).names).toEqual([name, name]);
});

test('no property stands twice in an event', () => {
  const lines = checkedLines(written([anEvent()]));
  const event = lines.slice(lines.indexOf('BEGIN:VEVENT') + 1, lines.indexOf('END:VEVENT'));
  const names = event.map((line) => line.split(/[:;]/)[0]);
  expect(names.length).toBeGreaterThan(10);
  expect(new Set(names).size).toBe(names.length);
});

test('a long list is short in the summary and whole in the text', () => {
  const stops = ['B-06', 'B-08', 'C-01', 'C-02', 'C-03'].map((tag) => ({
    ...anEvent().content.stops[0]!,
    tag,
  }));
  const summary = (count: number) => {
    const text = written([anEvent({ content: { stops: stops.slice(0, count), stopCount: count } })]);
    return readByIcalJs(text).events[0]!.value('summary');
  };
  expect(summary(1)).toBe('Swap 1 prop: B-06');
  expect(summary(4)).toBe('Swap 4 props: B-06, B-08, C-01, C-02');
  expect(summary(5)).toBe('Swap 5 props: B-06, B-08, C-01 and 2 more');
  const cut = written([anEvent({ content: { stops, stopCount: 65 } })]);
  expect(readByIcalJs(cut).events[0]!.value('description')).toContain('… and 60 more props.');
});

describe('alarms', () => {
  test('none unless asked for', () => expect(written([anEvent()])).not.toContain('VALARM'));

  test('one that shows, half an hour before, behind the properties', () => {
    const text = written([anEvent(), anEvent({ uid: 'two' })], { alarms: true });
    const lines = checkedLines(text);
    for (const { component } of readByIcalJs(text).events) {
      const alarms = component.getAllSubcomponents('valarm');
      expect(alarms).toHaveLength(1);
      expect(alarms[0]!.getFirstPropertyValue('action')).toBe('DISPLAY');
      expect(String(alarms[0]!.getFirstPropertyValue('trigger'))).toBe('-PT30M');
      expect(alarms[0]!.getFirstPropertyValue('description')).toBe('Swap 2 props: B-06, B-08');
    }
    // eventc = BEGIN, properties, alarms, END. Source: RFC 5545 3.6.1.
    const ends = lines.flatMap((line, n) => (line === 'END:VALARM' ? [lines[n + 1]] : []));
    expect(ends).toEqual(['END:VEVENT', 'END:VEVENT']);
    // Apart from its alarms the file is the same.
    const silent = text.replace(/BEGIN:VALARM\r\n[\s\S]*?END:VALARM\r\n/g, '');
    expect(silent).toBe(written([anEvent(), anEvent({ uid: 'two' })]));
  });

  test('a text that looks like an alarm is left alone', () => {
    const name = 'BEGIN:VALARM\r\nEND:VALARM\r\nEND:VEVENT';
    const stop = { ...anEvent().content.stops[0]!, name, tag: name };
    const text = written([anEvent({ content: { stops: [stop], stopCount: 1 } })], { alarms: true });
    const { events } = readByIcalJs(text);
    expect(events).toHaveLength(1);
    expect(events[0]!.component.getAllSubcomponents('valarm')).toHaveLength(1);
    expect(events[0]!.value('summary')).toBe('Swap 1 prop: BEGIN:VALARM END:VALARM END:VEVENT');
  });
});

test('a cancelled event says so, in words and in status, and does not ring', () => {
  const text = written([anEvent({ state: 'cancelled' })], { alarms: true });
  const [event] = readByIcalJs(text).events;
  expect(event!.value('status')).toBe('CANCELLED');
  expect(event!.value('summary')).toBe('Cancelled: Swap 2 props: B-06, B-08');
  expect(text).not.toContain('VALARM');
});

const TEXTS = [
  'Träger Nebel, Öhringen',
  'one; two: three, four',
  'she said "boo" and \'hiss\'',
  // node-ical 0.26 takes a backslash before an n for a line break even where it is escaped; ical.js is asked below.
  'back\\slash, \\, \\; \\\\ \\',
  '🦇👩‍👩‍👧‍👦🎃'.repeat(12),
  'ﬀ é e\u0301 漢字かな '.repeat(9).trim(),
];

test.each(TEXTS)('%s comes back from both parsers', (free) => {
  const stop = { tag: free, name: free, zone: free, cellName: free, cells: 1 };
  const content = { stops: [stop], stopCount: 1, siteName: free, cells: [{ cellName: free, cells: 1 }] };
  const text = written([anEvent({ content })], { name: free });
  checkedLines(text);
  const { names, events } = readByIcalJs(text);
  expect(names).toEqual([`${free}: swaps due`, `${free}: swaps due`]);
  const [other] = readByNodeIcal(text);
  for (const [summary, description] of [
    [events[0]!.value('summary'), events[0]!.value('description')],
    [other!.summary, other!.description],
  ]) {
    expect(summary).toBe(`Swap 1 prop: ${free}`);
    expect(String(description).split('\n')).toContain(`${free} · ${free} ${free}: 1 × ${free}`);
  }
});

test('a backslash before an n is no line break', () => {
  const stop = { ...anEvent().content.stops[0]!, tag: 'a\\nb\\Nc' };
  const text = written([anEvent({ content: { stops: [stop], stopCount: 1 } })]);
  expect(readByIcalJs(text).events[0]!.value('summary')).toBe('Swap 1 prop: a\\nb\\Nc');
});

const INJECTION =
  'x\r\nATTACH:http://example.org/\nEND:VEVENT\rBEGIN:VEVENT\u2028UID:y\u0085Z\u2029\u0000\u0007\u001b[1m\u007f\u009f';

test('no free text can start a line of its own', () => {
  const stop = { tag: INJECTION, name: INJECTION, zone: INJECTION, cellName: INJECTION, cells: 1 };
  const content = { stops: [stop], stopCount: 1, siteName: INJECTION, when: 'Sat 24 Oct', cells: [stop] };
  const plain = checkedLines(written([anEvent()], { alarms: true })).map((line) => line.split(/[:;]/)[0]);
  const text = written([anEvent({ uid: INJECTION, content })], { name: INJECTION, alarms: true });
  const lines = checkedLines(text);
  expect(lines.map((line) => line.split(/[:;]/)[0])).toEqual(plain);
  const kept = 'x ATTACH:http://example.org/ END:VEVENT BEGIN:VEVENT UID:y Z [1m';
  const [event] = readByIcalJs(text).events;
  expect(event!.value('summary')).toBe(`Swap 1 prop: ${kept}`);
  expect(event!.value('description').split('\n')).toHaveLength(6);
});

test('any text comes back, but for control characters and halves of letters', () => {
  const sign = fc.oneof(
    fc.constantFrom(...'\\;,:"n N'),
    fc.string({ unit: 'binary', minLength: 1, maxLength: 1 }),
  );
  const anyText = fc
    .string({ unit: sign, maxLength: 120 })
    .map((text) => text.replace(/[\p{Cc}\u2028\u2029]/gu, '·'));
  fc.assert(
    fc.property(anyText, anyText, (name, tag) => {
      const stop = { ...anEvent().content.stops[0]!, tag, name };
      const text = written([anEvent({ content: { stops: [stop], stopCount: 1 } })], { name });
      checkedLines(text);
      const { names, events } = readByIcalJs(text);
      expect(names).toEqual([`${name}: swaps due`, `${name}: swaps due`]);
      expect(events[0]!.value('summary')).toBe(`Swap 1 prop: ${tag}`);
      expect(events[0]!.value('description')).toContain(
        `Mill Race · ${tag} ${name}: 3 × AA alkaline (LR6)\n`,
      );
    }),
    { numRuns: 300 },
  );
});

test('lone halves of letters and control characters of any kind leave a file that reads', () => {
  const rough = fc.array(
    fc.integer({ min: 0, max: 0xffff }).map((unit) => String.fromCharCode(unit)),
    { maxLength: 80 },
  );
  fc.assert(
    fc.property(rough, (units) => {
      const name = units.join('');
      const stop = { ...anEvent().content.stops[0]!, name, tag: name };
      const text = written([anEvent({ uid: `u${name}`, content: { stops: [stop], stopCount: 1 } })], {
        name,
      });
      checkedLines(text);
      expect(readByIcalJs(text).events).toHaveLength(1);
      expect(readByNodeIcal(text)).toHaveLength(1);
    }),
    { numRuns: 200 },
  );
});

test('a thousand events stay under a megabyte', () => {
  // Online calendars refuse more. From memory of how they behave.
  const events = Array.from({ length: 1000 }, (_, n) => anEvent({ uid: `uid-${n}` }));
  const text = written(events, { alarms: true });
  expect(Buffer.byteLength(text)).toBeLessThan(1_000_000);
  expect(readByIcalJs(text).events).toHaveLength(1000);
});
