import { afterAll, describe, expect, test } from 'vitest';
import { NewCalendarLink } from '../../server/http/schemas/calendar-links.ts';
import { CellType } from '../../server/http/schemas/cell-types.ts';
import { NewSighting, NewSwap } from '../../server/http/schemas/log.ts';
import { Load, Prop, Switching, Trips } from '../../server/http/schemas/props.ts';
import { RoundHabits, ShowNight, Site, TypedNight } from '../../server/http/schemas/sites.ts';
import { insertCalendarLink } from '../../server/store/calendar-links.ts';
import { insertCellType } from '../../server/store/cell-types.ts';
import { insertEntry } from '../../server/store/log.ts';
import type { Db } from '../../server/store/open.ts';
import { insertProp } from '../../server/store/props.ts';
import { replaceShowNights } from '../../server/store/show-nights.ts';
import { insertSite } from '../../server/store/sites.ts';
import { saveTypedNight } from '../../server/store/weather.ts';
import {
  sampleCellType,
  sampleProp,
  sampleSighting,
  sampleSite,
  sampleSwap,
  storeWithSamples,
} from './samples.ts';

// What the HTTP schemas let through, the tables must take, or a good request would fail inside; and what they
// refuse, the tables must refuse too. The expected bounds are those of the schemas, read here field by field.

type FieldSchema = {
  type?: string;
  minimum?: number;
  maximum?: number;
  maxLength?: number;
  enum?: string[];
  const?: string;
  pattern?: string;
};
type Fields = Record<string, FieldSchema>;
type Put = (db: Db, changes: Record<string, unknown>) => void;

const fieldsOf = (schema: { properties: object }) => schema.properties as Fields;
const site = { ...sampleSite, id: 'new-site' };
const prop = { ...sampleProp, id: 'new-prop', tag: 'N-01' };
const night = {
  evening: '2026-10-30',
  opensAt: '18:30',
  closesAt: '21:30',
  calledOff: false,
  addedAt: 0,
  calledOffAt: null,
};
const link = {
  id: 'link',
  siteId: sampleSite.id,
  secretHash: 'ab'.repeat(32),
  label: null,
  alarms: true,
  createdAt: 0,
};
const wrong = (value: unknown) => value as never;

const nouns: [noun: string, fields: Fields, put: Put][] = [
  ['site', fieldsOf(Site), (db, changes) => insertSite(db, wrong({ ...site, ...changes }))],
  [
    'round habits',
    fieldsOf(RoundHabits),
    (db, changes) => insertSite(db, wrong({ ...site, rounds: { ...site.rounds, ...changes } })),
  ],
  [
    'show night',
    fieldsOf(ShowNight),
    (db, changes) => replaceShowNights(db, sampleSite.id, [wrong({ ...night, ...changes })]),
  ],
  [
    'typed night',
    fieldsOf(TypedNight),
    (db, changes) =>
      saveTypedNight(db, sampleSite.id, '2026-10-30', wrong({ minC: 1, maxC: 2, ...changes }), 0),
  ],
  [
    'cell type',
    fieldsOf(CellType),
    (db, changes) => insertCellType(db, wrong({ ...sampleCellType, ...changes })),
  ],
  ['prop', fieldsOf(Prop), (db, changes) => insertProp(db, wrong({ ...prop, ...changes }))],
  [
    'load',
    fieldsOf(Load),
    (db, changes) => insertProp(db, wrong({ ...prop, load: { ...prop.load, ...changes } })),
  ],
  ...Switching.anyOf.map((kind): [string, Fields, Put] => {
    const { kind: word, ...fields } = fieldsOf(kind);
    return [
      `switching ${word!.const}`,
      { kind: word!, ...fields },
      (db, changes) => insertProp(db, wrong({ ...prop, switching: { kind: word!.const, ...changes } })),
    ];
  }),
  [
    'trips',
    fieldsOf(Trips),
    (db, changes) => {
      const trips = { perShowNight: 10, perNightOff: 0, seconds: 20, runMa: 300, ...changes };
      insertProp(db, wrong({ ...prop, trips }));
    },
  ],
  ['swap', fieldsOf(NewSwap), (db, changes) => insertEntry(db, wrong({ ...sampleSwap, ...changes }))],
  [
    'sighting',
    fieldsOf(NewSighting),
    (db, changes) => insertEntry(db, wrong({ ...sampleSighting, ...changes })),
  ],
  [
    'calendar link',
    fieldsOf(NewCalendarLink),
    (db, changes) => insertCalendarLink(db, wrong({ ...link, ...changes })),
  ],
];

/** Identities of other rows, what the store itself sets, and instants, which are text outside and numbers inside. */
const elsewhere = new Set([
  'prop.siteId',
  'cell type.builtIn',
  'swap.at',
  'sighting.at',
  'switching interval-timer.setAt',
]);

function numberProbes(schema: FieldSchema & { minimum: number; maximum: number }) {
  const { minimum, maximum } = schema;
  const isWhole = schema.type === 'integer';
  const beyond = (value: number) => (isWhole ? 1 : Math.max(Math.abs(value) * 1e-12, 1e-9));
  return {
    good: [minimum, maximum, isWhole ? minimum : (minimum + maximum) / 2],
    bad: [
      minimum - beyond(minimum),
      maximum + beyond(maximum),
      Number.NaN,
      Number.POSITIVE_INFINITY,
      Number.NEGATIVE_INFINITY,
      'many',
      ...(isWhole ? [minimum + 0.5] : []),
    ],
  };
}

function textProbes(schema: FieldSchema & { maxLength: number }) {
  const isId = schema.pattern?.startsWith('^[A-Za-z0-9]');
  const good = isId
    ? ['a', '9-', 'x'.repeat(schema.maxLength)]
    : ['a', 'x'.repeat(schema.maxLength), '🦇'.repeat(schema.maxLength), 'a\tb\nc'];
  const bad = ['', ' ', 'x'.repeat(schema.maxLength + 1), 'a\0b', 'a\u0007b', 'a\u001fb', 'a\u007fb', 'a\rb'];
  return { good, bad: isId ? [...bad, 'a b', '-a', 'ä', 'a/b'] : [...bad, '\n\t '] };
}

function probesOf(schema: FieldSchema): { good: unknown[]; bad: unknown[] } | null {
  if (schema.enum) return { good: schema.enum, bad: ['another', '', schema.enum[0]!.toUpperCase()] };
  if (schema.const) return { good: [schema.const], bad: ['another', ''] };
  const { minimum, maximum, maxLength } = schema;
  if (minimum !== undefined && maximum !== undefined) return numberProbes({ ...schema, minimum, maximum });
  if (schema.type === 'string' && maxLength !== undefined) return textProbes({ ...schema, maxLength });
  return null;
}

const store = storeWithSamples();
afterAll(() => store.close());

/** 'taken', or why not; the store is left as it was. */
function attempt(put: Put, changes: Record<string, unknown>): string {
  const taken = new Error('taken');
  try {
    return store.transact((db) => {
      put(db, changes);
      throw taken;
    });
  } catch (error) {
    return (error as Error).message;
  }
}

describe.each(nouns)('%s', (noun, fields, put) => {
  const probed = Object.entries(fields).flatMap(([field, schema]) => {
    const probes = elsewhere.has(`${noun}.${field}`) ? null : probesOf(schema);
    return probes ? [{ field, probes }] : [];
  });

  test('is taken as the samples have it', () => {
    expect(attempt(put, {})).toBe('taken');
  });

  test.each(probed)('$field has the bounds of its HTTP schema', ({ field, probes }) => {
    for (const value of probes.good)
      expect([value, attempt(put, { [field]: value })]).toEqual([value, 'taken']);
    for (const value of probes.bad) {
      const refused = expect(attempt(put, { [field]: value }), `${field} = ${JSON.stringify(value)}`);
      refused.toMatch(/CHECK constraint|finite/);
    }
  });
});

test('every noun has bounds to compare, but for show nights, whose evenings and times have a test of their own', () => {
  const without = nouns.filter(([, fields]) =>
    Object.values(fields).every((schema) => probesOf(schema) === null),
  );
  expect(without.map(([noun]) => noun)).toEqual(['show night']);
});

test.each([
  ['eleven months', { monthlyMinC: sampleSite.monthlyMinC.slice(1) }],
  ['thirteen months', { monthlyMaxC: [...sampleSite.monthlyMaxC, 1] }],
  ['a month too cold', { monthlyMinC: sampleSite.monthlyMinC.with(11, -60.1) }],
  ['a month that is °F', { monthlyMaxC: sampleSite.monthlyMaxC.with(0, 68) }],
  ['a month that is a word', { monthlyMaxC: sampleSite.monthlyMaxC.with(0, 'mild' as never) }],
  ['a month that is null', { monthlyMinC: sampleSite.monthlyMinC.with(6, null as never) }],
  ['a month that is not a number', { monthlyMinC: sampleSite.monthlyMinC.with(6, Number.NaN) }],
  ['a season from no real date', { seasonFrom: '2026-02-30' }],
  ['a season through a time', { seasonThrough: '2026-11-08T12:00' }],
  ['round habits without a cost', { rounds: { ...sampleSite.rounds, cost: undefined as never } }],
  ['zones in a list', { zoneOffsetsC: [] as never }],
])('a site with %s is refused', (_, changes) => {
  const put: Put = (db, more) => insertSite(db, { ...site, ...more });
  expect(attempt(put, changes)).toMatch(/CHECK constraint|finite/);
});

test.each([
  ['a load without its behaviour', { load: { standbyMa: 0 } }],
  ['a load without its standby', { load: { behaviour: 'steady' } }],
  ['switching without its kind', { switching: {} }],
  ['a load that is a list', { load: [] }],
])('a prop with %s is refused', (_, changes) => {
  const put: Put = (db, more) => insertProp(db, wrong({ ...prop, ...more }));
  expect(attempt(put, changes)).toMatch(/CHECK constraint/);
});

test('instants before 1900, after 2200, in fractions of a millisecond or not finite are refused', () => {
  const put: Put = (db, more) => insertEntry(db, { ...sampleSwap, ...more });
  for (const at of [
    Date.UTC(1899, 11, 31),
    Date.UTC(2201, 0, 1),
    1.5,
    Number.NaN,
    Number.POSITIVE_INFINITY,
  ]) {
    expect(attempt(put, { at }), String(at)).toMatch(/CHECK constraint|finite/);
  }
  expect(attempt(put, { undoneAt: Number.NaN })).toMatch(/finite/);
  const setTimer: Put = (db, more) =>
    insertProp(db, { ...prop, switching: { kind: 'interval-timer', onHours: 6, ...more } });
  expect(attempt(setTimer, { setAt: sampleSwap.at })).toBe('taken');
  for (const setAt of [Date.UTC(1899, 11, 31), Date.UTC(2201, 0, 1), '2026-10-17T15:00:00Z']) {
    expect(attempt(setTimer, { setAt }), String(setAt)).toMatch(/CHECK constraint/);
  }
});
