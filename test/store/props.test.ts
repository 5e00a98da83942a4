import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { Prop } from '../../server/model/prop.ts';
import { findEntry, insertEntry } from '../../server/store/log.ts';
import {
  countProps,
  findProp,
  findPropByTag,
  insertProp,
  listProps,
  removeProp,
  saveProps,
  updateProp,
} from '../../server/store/props.ts';
import { insertSite } from '../../server/store/sites.ts';
import { tagOrder } from '../../server/store/tag-order.ts';
import { sampleProp, sampleSite, sampleSwap, storeWithSamples } from './samples.ts';

/** SQLite keeps no minus zero, and JSON writes it as 0. */
const measure = (min: number, max: number) => fc.double({ min, max, noNaN: true }).map((value) => value + 0);
const words = (maxLength: number) =>
  fc
    .string({ unit: 'grapheme', minLength: 1, maxLength })
    .filter(
      (text) =>
        [...text].length <= maxLength && /\S/.test(text) && !/\p{Cc}/u.test(text) && text.trim() !== '',
    );
const wallTime = fc
  .tuple(fc.integer({ min: 0, max: 23 }), fc.integer({ min: 0, max: 59 }))
  .map((parts) => parts.map((part) => String(part).padStart(2, '0')).join(':'));
const ma = () => measure(0, 5000);
const record = <Fields extends object, Needed extends keyof Fields>(
  fields: { [Key in keyof Fields]: fc.Arbitrary<Fields[Key]> },
  needed: Needed[],
) => fc.record(fields, { requiredKeys: needed, noNullPrototype: true });

const load = record(
  {
    behaviour: fc.constantFrom('steady' as const, 'fades' as const, 'holds' as const),
    meanMa: ma(),
    lowMa: ma(),
    peakMa: ma(),
    wave: fc.constantFrom('even-fade' as const, 'blink' as const, 'rc-fade' as const, 'steady' as const),
    onShare: measure(0, 1),
    standbyMa: ma(),
    measuredVolts: measure(0.1, 60),
    ledVolts: measure(0, 60),
  },
  ['behaviour', 'standbyMa'],
);
const switching = fc.oneof(
  record(
    {
      kind: fc.constant('light-sensor' as const),
      onLux: measure(0.001, 100_000),
      onAltitudeDeg: measure(-18, 10),
      offLux: measure(0.001, 100_000),
      offAltitudeDeg: measure(-18, 10),
      skyShare: measure(0.01, 1),
      cutOffHours: measure(0.25, 24),
    },
    ['kind'],
  ),
  record({ kind: fc.constant('clock' as const), onAt: wallTime, offAt: wallTime }, ['kind', 'onAt', 'offAt']),
  record(
    {
      kind: fc.constant('interval-timer' as const),
      onHours: measure(0.25, 24),
      setAt: fc.integer({ min: 0, max: 4e12 }),
    },
    ['kind', 'onHours'],
  ),
  fc.constant({ kind: 'by-hand' as const }),
  fc.constant({ kind: 'always' as const }),
);
const trips = record(
  {
    perShowNight: measure(0, 20_000),
    perNightOff: measure(0, 20_000),
    seconds: measure(0.1, 3600),
    runMa: measure(0.001, 20_000),
  },
  ['perShowNight', 'perNightOff', 'seconds', 'runMa'],
);
const anyProp: fc.Arbitrary<Prop> = record(
  {
    id: fc.constant('any-prop'),
    siteId: fc.constant(sampleSite.id),
    tag: words(20),
    name: words(120),
    zone: words(60),
    xM: measure(-100_000, 100_000),
    yM: measure(-100_000, 100_000),
    units: fc.integer({ min: 1, max: 500 }),
    importance: fc.constantFrom('must-not-fail' as const, 'feature' as const, 'background' as const),
    cellTypeId: fc.stringMatching(/^[A-Za-z0-9][A-Za-z0-9-]{0,63}$/),
    series: fc.integer({ min: 1, max: 40 }),
    parallel: fc.integer({ min: 1, max: 40 }),
    dimVolts: measure(0.1, 60),
    stopVolts: measure(0.1, 60),
    load,
    switching,
    trips,
    offsetC: measure(-15, 15),
  },
  [
    'id',
    'siteId',
    'tag',
    'name',
    'zone',
    'units',
    'importance',
    'cellTypeId',
    'series',
    'parallel',
    'dimVolts',
    'load',
    'switching',
  ],
);

test('many props are kept at once: new ones added, known ones replaced whole, and their logs stay', () => {
  const { db, close } = storeWithSamples();
  insertEntry(db, sampleSwap);
  fc.assert(
    fc.property(anyProp, (changed) => {
      const known = { ...changed, id: sampleProp.id };
      const others = Array.from({ length: 401 }, (_, n) => ({ ...sampleProp, id: `n${n}`, tag: `New-${n}` }));
      saveProps(db, [known, ...others.filter(({ tag }) => tag !== known.tag)]);
      expect(findProp(db, known.id)).toStrictEqual(known);
      expect(countProps(db, sampleProp.siteId)).toBe(402);
      expect(findEntry(db, sampleSwap.id)).toMatchObject({ propId: sampleProp.id });
    }),
    { numRuns: 20 },
  );
  expect(findProp(db, 'n400')).toStrictEqual({ ...sampleProp, id: 'n400', tag: 'New-400' });
  close();
});

test('any prop comes back as it went in, and as any other it was changed to', () => {
  const { db, close } = storeWithSamples();
  removeProp(db, sampleProp.id);
  fc.assert(
    fc.property(anyProp, anyProp, (prop, changed) => {
      insertProp(db, prop);
      expect(findProp(db, prop.id)).toStrictEqual(prop);
      expect(findPropByTag(db, prop.siteId, prop.tag)).toStrictEqual(prop);
      updateProp(db, changed);
      expect(listProps(db, prop.siteId)).toStrictEqual([changed]);
      expect(removeProp(db, prop.id)).toBe(true);
    }),
    { numRuns: 300 },
  );
  close();
});

test('pages of props go in the order people count in and miss none', () => {
  const { db, close } = storeWithSamples();
  const tags = ['A-10', 'A-2', 'a-3', 'A-02', 'B-6b', 'B-6', 'A-1', '10', '9'];
  for (const tag of tags) insertProp(db, { ...sampleProp, id: `of-${tag}`, tag });
  const expected = ['9', '10', 'A-1', 'A-02', 'A-2', 'a-3', 'A-10', 'B-06', 'B-6', 'B-6b'];
  expect(listProps(db, sampleSite.id).map((prop) => prop.tag)).toEqual(expected);
  const walked: Prop[] = [];
  for (;;) {
    const last = walked.at(-1);
    const page = listProps(db, sampleSite.id, last ? { limit: 3, after: last.id } : { limit: 3 });
    if (page.length === 0) break;
    walked.push(...page);
  }
  expect(walked.map((prop) => prop.tag)).toEqual(expected);
  expect(listProps(db, sampleSite.id, { after: 'B-6 is gone' })).toEqual([]);
  expect(countProps(db, sampleSite.id)).toBe(expected.length);
  close();
});

// Source: the numeric collation of Unicode's CLDR root, as the runtime's Intl.Collator has it.
test('tags are ordered as a numeric collation orders them', () => {
  const collator = new Intl.Collator('en', { numeric: true, sensitivity: 'accent' });
  const tag = fc.stringMatching(/^[A-Za-z]{1,2}-?[0-9]{1,6}[a-z]?$/);
  fc.assert(
    fc.property(tag, tag, (one, other) => {
      const byKey = tagOrder(one) < tagOrder(other) ? -1 : tagOrder(one) > tagOrder(other) ? 1 : 0;
      expect(byKey).toBe(Math.sign(collator.compare(one, other)));
    }),
    { numRuns: 2000 },
  );
});

test('a tag is unique on its site, and free on another', () => {
  const { db, close } = storeWithSamples();
  expect(() => insertProp(db, { ...sampleProp, id: 'prop-2' })).toThrow(/UNIQUE/);
  insertSite(db, { ...sampleSite, id: 'other' });
  insertProp(db, { ...sampleProp, id: 'prop-2', siteId: 'other' });
  expect(findPropByTag(db, 'other', sampleProp.tag)?.id).toBe('prop-2');
  expect(findPropByTag(db, 'other', 'B-07')).toBeNull();
  close();
});

test('a prop of an unknown site is refused, and with a prop goes its log', () => {
  const { db, close } = storeWithSamples();
  expect(() => insertProp(db, { ...sampleProp, id: 'prop-2', siteId: 'nowhere' })).toThrow(/FOREIGN KEY/);
  insertEntry(db, sampleSwap);
  expect(removeProp(db, sampleProp.id)).toBe(true);
  expect(removeProp(db, sampleProp.id)).toBe(false);
  expect(findEntry(db, sampleSwap.id)).toBeNull();
  close();
});
