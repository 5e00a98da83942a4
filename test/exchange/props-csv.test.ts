import fc from 'fast-check';
import { expect, test } from 'vitest';
import { propCells, propOfCells, propsCsv } from '../../server/exchange/props-csv.ts';
import { readPropsCsv } from '../../server/exchange/read-props-csv.ts';
import { parseInstant } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';

const words = fc
  .tuple(
    fc.constantFrom('', '=', "'=", '-', ' @', '"', ';', '3,5'),
    fc.string({ unit: 'grapheme', maxLength: 12 }),
  )
  .map((parts) => parts.join('').replaceAll('\r', ''))
  .filter((text) => text.trim() !== '');
// -0 is written as 0, which is the same number of metres.
const measure = fc.double({ min: -1e5, max: 1e5, noNaN: true }).map((value) => value + 0);
const switching: fc.Arbitrary<Prop['switching']> = fc.oneof(
  fc.record(
    { kind: fc.constant('light-sensor' as const), onLux: measure, skyShare: measure, cutOffHours: measure },
    { requiredKeys: ['kind'] },
  ),
  fc.constant({ kind: 'clock' as const, onAt: '06:05', offAt: '23:59' }),
  fc.record(
    {
      kind: fc.constant('interval-timer' as const),
      onHours: measure,
      setAt: fc.integer({ min: Date.UTC(2000, 0, 1), max: Date.UTC(2150, 0, 1) }),
    },
    { requiredKeys: ['kind', 'onHours'] },
  ),
  fc.constant({ kind: 'always' as const }),
);
const prop: fc.Arbitrary<Prop> = fc.record(
  {
    id: fc.constant('p'),
    siteId: fc.constant('s'),
    tag: words,
    name: words,
    zone: words,
    xM: measure,
    yM: measure,
    units: fc.integer({ min: 1, max: 500 }),
    importance: fc.constantFrom('must-not-fail' as const, 'feature' as const, 'background' as const),
    cellTypeId: fc.constantFrom('LR6', 'own-cell', 'AA'),
    series: fc.integer({ min: 1, max: 40 }),
    parallel: fc.integer({ min: 1, max: 40 }),
    dimVolts: measure,
    stopVolts: measure,
    load: fc.record(
      { behaviour: fc.constant('fades' as const), meanMa: measure, standbyMa: measure, ledVolts: measure },
      { requiredKeys: ['behaviour', 'standbyMa'] },
    ),
    switching,
    trips: fc.record({ perShowNight: measure, perNightOff: measure, seconds: measure, runMa: measure }),
    offsetC: measure,
  },
  {
    requiredKeys: [
      ...(['id', 'siteId', 'tag', 'name', 'zone', 'units', 'importance', 'cellTypeId'] as const),
      ...(['series', 'parallel', 'dimVolts', 'load', 'switching'] as const),
    ],
    noNullPrototype: true,
  },
);

/** As a deed has it: instants are numbers, and blanks around texts are not kept. */
function kept(value: Record<string, unknown>): unknown {
  const { switching: given, ...rest } = value as { switching: { setAt?: string } };
  const setAt = given.setAt === undefined ? {} : { setAt: parseInstant(given.setAt) };
  return { ...rest, switching: { ...given, ...setAt } };
}

test('whatever a prop holds, what is read is what was written, to the last bit', () => {
  fc.assert(
    fc.property(fc.array(prop, { minLength: 1, maxLength: 4 }), (props) => {
      const text = propsCsv(props);
      const file = readPropsCsv(text, () => true);
      expect(file).toMatchObject({ faults: [], notes: [], strangers: [] });
      const wanted = props.map(({ id: _, siteId: __, ...fields }) => fields);
      expect(file.rows.map(({ cells }) => kept(propOfCells(cells)))).toEqual(wanted);
      expect(file.rows.map(({ cells }) => cells)).toEqual(props.map(propCells));
    }),
    { numRuns: 500 },
  );
});
