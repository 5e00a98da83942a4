// The tables. Property names are the model's, so that a row without its nulls is a value; the column of an
// instant ends in _at_ms. Bounds repeat those of the HTTP schemas: what reaches a table by any other way
// must not be able to poison a forecast.

import { type SQL, sql } from 'drizzle-orm';
import {
  blob,
  check,
  index,
  integer,
  primaryKey,
  sqliteTable,
  text,
  uniqueIndex,
} from 'drizzle-orm/sqlite-core';
import type { CellKind } from '../model/cell-type.ts';
import type { Load, Trips } from '../model/load.ts';
import type { Seen, SetState } from '../model/log-entry.ts';
import type { Importance } from '../model/prop.ts';
import type { RoundHabits } from '../model/site.ts';
import type { Switching } from '../model/switching.ts';
import {
  evening,
  fieldOneOf,
  fieldsWithin,
  flag,
  id,
  instant,
  json,
  jsonArray,
  jsonObject,
  measure,
  oneOf,
  plainText,
  twelveWithin,
  wallTime,
  whole,
  wholeWithin,
  within,
} from './column-types.ts';
import { LOAD_BOUNDS, ROUND_BOUNDS, SWITCHING_BOUNDS, TRIPS_BOUNDS } from './json-bounds.ts';

const checks = (table: string, conditions: Record<string, SQL>) =>
  Object.entries(conditions).map(([name, condition]) => check(`${table}_${name}`, condition));

export const sites = sqliteTable(
  'sites',
  {
    id: text().primaryKey(),
    name: text().notNull(),
    latitudeDeg: measure().notNull(),
    longitudeDeg: measure().notNull(),
    timeZone: text().notNull(),
    seasonFrom: text().notNull(),
    seasonThrough: text().notNull(),
    monthlyMinC: json<number[]>().notNull(),
    monthlyMaxC: json<number[]>().notNull(),
    confidence: measure().notNull(),
    marginNights: whole().notNull(),
    rounds: json<RoundHabits>().notNull(),
    zoneOffsetsC: json<Record<string, number>>().notNull(),
    revision: whole().notNull().default(0),
    changedAt: whole('changed_at_ms').notNull().default(0),
  },
  (site) => [
    index('sites_by_name').on(site.name, site.id),
    ...checks('sites', {
      id: id(site.id),
      name: plainText(site.name, 120),
      latitude: within(site.latitudeDeg, -90, 90),
      longitude: within(site.longitudeDeg, -180, 180),
      time_zone: plainText(site.timeZone, 64),
      season_from: evening(site.seasonFrom),
      season_through: evening(site.seasonThrough),
      monthly_min: twelveWithin(site.monthlyMinC, -60, 50),
      monthly_max: twelveWithin(site.monthlyMaxC, -60, 50),
      confidence: within(site.confidence, 0.5, 0.999),
      margin_nights: wholeWithin(site.marginNights, 0, 5),
      rounds: jsonObject(site.rounds, [
        'weekdays',
        'startsAt',
        'minutesFree',
        'minutesPerStop',
        'walkMinutes',
        'cost',
      ]),
      rounds_bounds: fieldsWithin(site.rounds, ROUND_BOUNDS),
      zone_offsets: jsonObject(site.zoneOffsetsC),
      revision: wholeWithin(site.revision, 0, Number.MAX_SAFE_INTEGER),
      changed_at: instant(site.changedAt),
    }),
  ],
);

const siteId = () =>
  text()
    .notNull()
    .references(() => sites.id, { onDelete: 'cascade' });

export const showNights = sqliteTable(
  'show_nights',
  {
    siteId: siteId(),
    evening: text().notNull(),
    opensAt: text().notNull(),
    closesAt: text().notNull(),
    calledOff: integer({ mode: 'boolean' }).notNull(),
    addedAt: whole('added_at_ms').notNull(),
    calledOffAt: whole('called_off_at_ms'),
  },
  (night) => [
    primaryKey({ columns: [night.siteId, night.evening] }),
    ...checks('show_nights', {
      evening: evening(night.evening),
      opens: wallTime(night.opensAt),
      closes: wallTime(night.closesAt),
      called_off: flag(night.calledOff),
      added_at: instant(night.addedAt),
      called_off_at: instant(night.calledOffAt),
    }),
  ],
);

/** Imported temperatures: 32-bit floats, little end first, one per hour of the UTC month; NaN = missing. */
export const weatherMonths = sqliteTable(
  'weather_months',
  {
    siteId: siteId(),
    monthAt: whole('month_at_ms').notNull(),
    tempC: blob({ mode: 'buffer' }).notNull(),
  },
  (month) => [
    primaryKey({ columns: [month.siteId, month.monthAt] }),
    ...checks('weather_months', {
      month_at: instant(month.monthAt),
      size: sql`typeof(${month.tempC}) = 'blob' and length(${month.tempC}) in (2688, 2784, 2880, 2976)`,
    }),
  ],
);

/** A typical year: 8760 floats, written like the months above. */
export const typicalYears = sqliteTable(
  'typical_years',
  {
    siteId: text()
      .primaryKey()
      .references(() => sites.id, { onDelete: 'cascade' }),
    stationName: text().notNull(),
    standardOffsetHours: measure().notNull(),
    tempC: blob({ mode: 'buffer' }).notNull(),
  },
  (year) =>
    checks('typical_years', {
      offset: within(year.standardOffsetHours, -14, 15),
      station: sql`length(${year.stationName}) <= 200`,
      size: sql`typeof(${year.tempC}) = 'blob' and length(${year.tempC}) = 35040`,
    }),
);

export const typedNights = sqliteTable(
  'typed_nights',
  {
    siteId: siteId(),
    evening: text().notNull(),
    minC: measure().notNull(),
    maxC: measure().notNull(),
    typedAt: whole('typed_at_ms').notNull(),
  },
  (night) => [
    primaryKey({ columns: [night.siteId, night.evening] }),
    ...checks('typed_nights', {
      evening: evening(night.evening),
      min: within(night.minC, -60, 50),
      max: within(night.maxC, -60, 50),
      typed_at: instant(night.typedAt),
    }),
  ],
);

/** The crew's own cell types; the built-in ones are part of the model. */
export const cellTypes = sqliteTable(
  'cell_types',
  {
    id: text().primaryKey(),
    name: text().notNull(),
    kind: text().$type<CellKind>().notNull(),
    capacityMah: measure().notNull(),
    nominalVolts: measure().notNull(),
    cellsInside: whole().notNull(),
    priceEach: measure(),
    massG: measure().notNull(),
    rechargeable: integer({ mode: 'boolean' }).notNull(),
  },
  (type) =>
    checks('cell_types', {
      id: id(type.id),
      name: plainText(type.name, 120),
      kind: oneOf(type.kind, [
        'alkaline',
        'zinc-carbon',
        'lithium-aa',
        'nickel',
        'nickel-standard',
        'lithium-ion',
        'lithium-iron',
        'coin',
        'lead',
      ]),
      capacity: within(type.capacityMah, 1, 1_000_000),
      nominal: within(type.nominalVolts, 0.5, 48),
      cells_inside: wholeWithin(type.cellsInside, 1, 24),
      price: within(type.priceEach, 0, 100_000),
      mass: within(type.massG, 0, 100_000),
      rechargeable: flag(type.rechargeable),
    }),
);

export const props = sqliteTable(
  'props',
  {
    id: text().primaryKey(),
    siteId: siteId(),
    tag: text().notNull(),
    /** The tag written so that plain text order puts A-2 before A-10. */
    tagOrder: text().notNull(),
    name: text().notNull(),
    zone: text().notNull(),
    xM: measure(),
    yM: measure(),
    units: whole().notNull(),
    importance: text().$type<Importance>().notNull(),
    /** Built-in or own, so no foreign key. */
    cellTypeId: text().notNull(),
    series: whole().notNull(),
    parallel: whole().notNull(),
    dimVolts: measure().notNull(),
    stopVolts: measure(),
    load: json<Load>().notNull(),
    switching: json<Switching>().notNull(),
    trips: json<Trips>(),
    offsetC: measure(),
  },
  (prop) => [
    uniqueIndex('props_tag').on(prop.siteId, prop.tag),
    index('props_in_order').on(prop.siteId, prop.tagOrder, prop.tag),
    index('props_by_cell_type').on(prop.cellTypeId),
    ...checks('props', {
      id: id(prop.id),
      tag: plainText(prop.tag, 20),
      name: plainText(prop.name, 120),
      zone: plainText(prop.zone, 60),
      x: within(prop.xM, -100_000, 100_000),
      y: within(prop.yM, -100_000, 100_000),
      units: wholeWithin(prop.units, 1, 500),
      importance: oneOf(prop.importance, ['must-not-fail', 'feature', 'background']),
      cell_type: id(prop.cellTypeId),
      series: wholeWithin(prop.series, 1, 40),
      parallel: wholeWithin(prop.parallel, 1, 40),
      dim: within(prop.dimVolts, 0.1, 60),
      stop: within(prop.stopVolts, 0.1, 60),
      offset: within(prop.offsetC, -15, 15),
      load: jsonObject(prop.load, ['behaviour', 'standbyMa']),
      load_words: sql`${fieldOneOf(prop.load, 'behaviour', ['steady', 'fades', 'holds'])} and ${fieldOneOf(prop.load, 'wave', ['even-fade', 'blink', 'rc-fade', 'steady'])}`,
      load_bounds: fieldsWithin(prop.load, LOAD_BOUNDS),
      switching: jsonObject(prop.switching, ['kind']),
      switching_words: fieldOneOf(prop.switching, 'kind', [
        'light-sensor',
        'clock',
        'interval-timer',
        'by-hand',
        'always',
      ]),
      switching_bounds: fieldsWithin(prop.switching, SWITCHING_BOUNDS),
      trips: jsonObject(prop.trips),
      trips_bounds: fieldsWithin(prop.trips, TRIPS_BOUNDS),
    }),
  ],
);

/** Swaps and sightings in one table, since they are read in one order. */
export const log = sqliteTable(
  'log',
  {
    id: text().primaryKey(),
    propId: text()
      .notNull()
      .references(() => props.id, { onDelete: 'cascade' }),
    kind: text().$type<'swap' | 'sighting'>().notNull(),
    at: whole('at_ms').notNull(),
    recordedAt: whole('recorded_at_ms').notNull(),
    state: text().$type<SetState>(),
    leftShare: measure(),
    cellTypeId: text(),
    cells: whole(),
    setId: text(),
    healthShare: measure(),
    oldSet: text().$type<'bright' | 'dim' | 'dark'>(),
    seen: text().$type<Seen>(),
    volts: measure(),
    taken: text().$type<'lit' | 'resting'>(),
    note: text(),
    undoneAt: whole('undone_at_ms'),
  },
  (entry) => [
    index('log_in_order').on(entry.propId, entry.at, entry.recordedAt, entry.id),
    index('log_by_cell_type').on(entry.cellTypeId).where(sql`${entry.cellTypeId} is not null`),
    ...checks('log', {
      id: id(entry.id),
      at: instant(entry.at),
      recorded_at: instant(entry.recordedAt),
      undone_at: instant(entry.undoneAt),
      kind: sql`(${entry.kind} = 'swap' and ${entry.state} is not null and ${entry.seen} is null and ${entry.volts} is null and ${entry.taken} is null) or (${entry.kind} = 'sighting' and ${entry.seen} is not null and ${entry.state} is null and ${entry.leftShare} is null and ${entry.cellTypeId} is null and ${entry.cells} is null and ${entry.setId} is null and ${entry.healthShare} is null and ${entry.oldSet} is null)`,
      state: oneOf(entry.state, ['new', 'charged', 'part-used']),
      left: within(entry.leftShare, 0, 1),
      cell_type: id(entry.cellTypeId),
      cells: wholeWithin(entry.cells, 1, 20_000),
      set: plainText(entry.setId, 40),
      health: within(entry.healthShare, 0.05, 1.2),
      old_set: oneOf(entry.oldSet, ['bright', 'dim', 'dark']),
      seen: oneOf(entry.seen, ['bright', 'dim', 'dark', 'odd']),
      volts: within(entry.volts, 0, 60),
      taken: oneOf(entry.taken, ['lit', 'resting']),
      note: plainText(entry.note, 500),
    }),
  ],
);

/** Secret addresses of the calendar feed; only the hash of the secret is kept. */
export const calendarLinks = sqliteTable(
  'calendar_links',
  {
    id: text().primaryKey(),
    siteId: siteId(),
    secretHash: text().notNull(),
    label: text(),
    alarms: integer({ mode: 'boolean' }).notNull(),
    createdAt: whole('created_at_ms').notNull(),
    lastReadAt: whole('last_read_at_ms'),
  },
  (link) => [
    uniqueIndex('calendar_links_secret').on(link.secretHash),
    index('calendar_links_by_site').on(link.siteId, link.createdAt),
    ...checks('calendar_links', {
      id: id(link.id),
      secret: sql`length(${link.secretHash}) between 16 and 128`,
      label: plainText(link.label, 80),
      alarms: flag(link.alarms),
      created_at: instant(link.createdAt),
      last_read_at: instant(link.lastReadAt),
    }),
  ],
);

/** What calendars were last told of each evening, so that an event keeps its identity and counts its changes. */
export const dueEvenings = sqliteTable(
  'due_evenings',
  {
    uid: text().primaryKey(),
    siteId: siteId(),
    evening: text().notNull(),
    sequence: whole().notNull(),
    createdAt: whole('created_at_ms').notNull(),
    modifiedAt: whole('modified_at_ms').notNull(),
    state: text().$type<'due' | 'cancelled'>().notNull(),
    fingerprint: text().notNull(),
    propIds: json<string[]>().notNull(),
  },
  (due) => [
    index('due_evenings_by_site').on(due.siteId, due.evening),
    ...checks('due_evenings', {
      uid: plainText(due.uid, 255),
      evening: evening(due.evening),
      sequence: wholeWithin(due.sequence, 0, 2_147_483_647),
      created_at: instant(due.createdAt),
      modified_at: instant(due.modifiedAt),
      state: oneOf(due.state, ['due', 'cancelled']),
      prop_ids: jsonArray(due.propIds),
    }),
  ],
);

/** First answers to requests that carried an Idempotency-Key. */
export const replays = sqliteTable(
  'replays',
  {
    key: text().primaryKey(),
    bodyHash: text().notNull(),
    status: whole().notNull(),
    body: text().notNull(),
    at: whole('at_ms').notNull(),
  },
  (replay) => [
    index('replays_by_age').on(replay.at),
    ...checks('replays', {
      key: plainText(replay.key, 600),
      status: wholeWithin(replay.status, 100, 599),
      at: instant(replay.at),
    }),
  ],
);
