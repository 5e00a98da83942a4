import { describe, expect, test } from 'vitest';
import { A_SITE, aProp, aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf, type Rig } from '../rig/build-app.ts';

// Each row: what somebody slipped on, what they sent, which field must be named, and what the sentence must say.
// '…' stands for any words between. Only what cannot be is refused; what is merely unlikely passes with a warning.
type Row = [slip: string, body: unknown, field: string, says: string];

async function refused(rig: Rig, ask: () => ReturnType<Rig['ask']['get']>, row: Row): Promise<void> {
  const [, body, field, says] = row;
  const before = dumpOf(rig.store);
  const asked = ask().set('content-type', 'application/json');
  const answer = await (typeof body === 'string' ? asked.send(body) : asked.send(JSON.stringify(body)));
  expect(answer.status, answer.text).toBe(400);
  expect(answer.headers['content-type']).toContain('application/problem+json');
  if (field) {
    const fault = answer.body.errors.find((error: { field: string }) => error.field === field);
    expect(fault, answer.text).toBeDefined();
    for (const words of says.split('…')) expect(fault.message).toContain(words);
  } else expect(answer.body.detail).toContain(says);
  expect(dumpOf(rig.store)).toBe(before);
}

const minC = (month: number, value: number) => A_SITE.monthlyMinC.with(month, value);

const SITES: Row[] = [
  ['a number for a name', { ...A_SITE, name: 5 }, 'name', '5 is given where text is wanted'],
  ['a list for a name', { ...A_SITE, name: ['a'] }, 'name', 'A list is given where text is wanted'],
  ['true for a name', { ...A_SITE, name: true }, 'name', 'true is given'],
  ['nothing for a name', { ...A_SITE, name: null }, 'name', 'null is given'],
  ['only blanks', { ...A_SITE, name: '  \t' }, 'name', 'not only blanks'],
  ['a NUL', { ...A_SITE, name: 'a\u0000b' }, 'name', 'no control characters'],
  ['half a character', '{"name":"\\ud83c"}', 'name', 'Plain text'],
  ['a very long name', { ...A_SITE, name: 'x'.repeat(121) }, 'name', '121 characters; at most 120'],
  ['text for a number', { ...A_SITE, latitudeDeg: '54.4' }, 'latitudeDeg', 'without quotes'],
  ['the point forgotten', { ...A_SITE, latitudeDeg: 544 }, 'latitudeDeg', '544 is above 90'],
  ['a number beyond all', '{"latitudeDeg":1e999}', 'latitudeDeg', 'beyond what JSON numbers reach'],
  [
    'the sign of the longitude',
    { ...A_SITE, timeZone: 'America/New_York', longitudeDeg: 74 },
    'longitudeDeg',
    'Is the longitude west (-74)',
  ],
  ['a zone misspelt', { ...A_SITE, timeZone: 'Europe/Lodnon' }, 'timeZone', 'Did you mean "Europe/London"'],
  ['an offset for a zone', { ...A_SITE, timeZone: '+01:00' }, 'timeZone', "like 'Europe/London'"],
  [
    'a date that is none',
    { ...A_SITE, seasonFrom: '2026-02-30' },
    'seasonFrom',
    '"2026-02-30" does not exist',
  ],
  [
    'a year nobody can know',
    { ...A_SITE, seasonFrom: '2300-10-01' },
    'seasonFrom',
    '"2300-10-01" lies outside the years known here, 2000 to 2150',
  ],
  ['a date written otherwise', { ...A_SITE, seasonFrom: '01.10.2026' }, 'seasonFrom', "like '2026-10-25'"],
  [
    'the ends of the season swapped',
    { ...A_SITE, seasonFrom: '2026-11-08', seasonThrough: '2026-10-01' },
    'seasonThrough',
    'swapped',
  ],
  ['a season too long', { ...A_SITE, seasonThrough: '2028-11-08' }, 'seasonThrough', 'at most 400'],
  ['eleven months', { ...A_SITE, monthlyMinC: A_SITE.monthlyMinC.slice(1) }, 'monthlyMinC', 'Twelve numbers'],
  ['°F for °C', { ...A_SITE, monthlyMinC: minC(6, 68) }, 'monthlyMinC.6', '68 is above 50…°F'],
  [
    'minimum above maximum',
    { ...A_SITE, monthlyMinC: minC(0, 9) },
    'monthlyMaxC.0',
    "January's maximum 5 °C is below its minimum 9 °C",
  ],
  ['per cent for a share', { ...A_SITE, confidence: 90 }, 'confidence', '0.9 for 90 %'],
  ['half a margin', { ...A_SITE, marginNights: 0.5 }, 'marginNights', 'whole number'],
  [
    'an eighth weekday',
    { ...A_SITE, rounds: { ...A_SITE.rounds, weekdays: [8] } },
    'rounds.weekdays.0',
    '8 is above 7',
  ],
  [
    'a weekday twice',
    { ...A_SITE, rounds: { ...A_SITE.rounds, weekdays: [3, 3] } },
    'rounds.weekdays',
    'twice',
  ],
  [
    'a time that is none',
    { ...A_SITE, rounds: { ...A_SITE.rounds, startsAt: '24:00' } },
    'rounds.startsAt',
    '00:00 to 23:59',
  ],
  [
    'a zone name with a line break',
    { ...A_SITE, zoneOffsetsC: { 'a\nb': 1 } },
    'zoneOffsetsC',
    'plain characters',
  ],
  ['a zone far too warm', { ...A_SITE, zoneOffsetsC: { Mill: 40 } }, 'zoneOffsetsC.Mill', '40 is above 15'],
  [
    'a field misspelt',
    { ...A_SITE, latitudedeg: 1 },
    'latitudedeg',
    '`latitudedeg` is not a field here; did you mean `latitudeDeg`?',
  ],
  ['a field of our own', { ...A_SITE, id: 'mine' }, 'id', '`id` is not a field here'],
  ['a field missing', { ...A_SITE, timeZone: undefined }, 'timeZone', 'timeZone is missing'],
  ['a list for a body', [], 'body', 'A list is given where a JSON object is wanted'],
  ['null for a body', 'null', 'body', 'Nothing is given where a JSON object is wanted'],
  ['no JSON', '{"name": NaN}', '', 'no JSON'],
  ['a single quote', "{'name': 'x'}", '', 'no JSON'],
  ['nothing at all', '', 'body', 'Nothing is given where a JSON object is wanted'],
  ['a name for the prototype', '{"__proto__": {"x": 1}}', '', 'no JSON'],
];

test.each(SITES)('a site with %s is refused', async (...row) => {
  const rig = await aRig();
  await refused(rig, () => rig.ask.post('/api/sites'), row);
});

const load = aProp('x').load;
const clock = { kind: 'clock', onAt: '18:00', offAt: '22:00' };
const PROPS: Row[] = [
  [
    'a cell type misspelt',
    { cellTypeId: 'LR66' },
    'cellTypeId',
    'No cell type is called "LR66"…Did you mean "LR6"',
  ],
  ['a cell type nobody knows', { cellTypeId: 'zzzzzzzz' }, 'cellTypeId', 'AA alkaline is "LR6"'],
  [
    'dim and stop swapped',
    { dimVolts: 2.7, stopVolts: 3.3 },
    'stopVolts',
    'stopVolts 3.3 is above dimVolts 2.7',
  ],
  [
    'dim above a fresh set',
    { cellTypeId: 'HR6', dimVolts: 4.9 },
    'dimVolts',
    '4.9 V is more than a fresh set gives',
  ],
  ['no draw', { load: { behaviour: 'steady', standbyMa: 0 } }, 'load.meanMa', 'meter'],
  [
    'a low alone',
    { load: { behaviour: 'fades', standbyMa: 0, lowMa: 4 } },
    'load.peakMa',
    'lowMa 4 alone makes no average',
  ],
  ['peak below low', { load: { ...load, lowMa: 9, peakMa: 4 } }, 'load.peakMa', 'peakMa 4 is below lowMa 9'],
  ['A for mA', { load: { ...load, meanMa: 22_000 } }, 'load.meanMa', '22000 is above 20000…22 mA'],
  ['a negative draw', { load: { ...load, meanMa: -1 } }, 'load.meanMa', '-1 is below 0'],
  ['a capital missed', { load: { ...load, peakma: 40 } }, 'load.peakma', 'did you mean `peakMa`?'],
  [
    'standby left out',
    { load: { behaviour: 'steady', meanMa: 20 } },
    'load.standbyMa',
    'standbyMa is missing',
  ],
  ['an unknown wave', { load: { ...load, wave: 'even-fad' } }, 'load.wave', 'Did you mean "even-fade"'],
  ['per cent for a share', { load: { ...load, onShare: 25 } }, 'load.onShare', '0.25 for a quarter'],
  [
    'an unknown switching',
    { switching: { kind: 'light-sensr' } },
    'switching.kind',
    'Did you mean "light-sensor"',
  ],
  ['no kind of switching', { switching: { onAt: '18:00' } }, 'switching.kind', 'kind is missing'],
  ['a word for switching', { switching: 'always' }, 'switching', 'an object with kind is wanted'],
  [
    'a clock without an end',
    { switching: { kind: 'clock', onAt: '18:00' } },
    'switching.offAt',
    'offAt is missing',
  ],
  ['a clock that never moves', { switching: { ...clock, offAt: '18:00' } }, 'switching.offAt', 'both 18:00'],
  ['an hour too many', { switching: { ...clock, onAt: '25:00' } }, 'switching.onAt', '00:00 to 23:59'],
  [
    '30 hours a day',
    { switching: { kind: 'interval-timer', onHours: 30 } },
    'switching.onHours',
    '30 is above 24…18 off',
  ],
  [
    'a field of another kind',
    { switching: { kind: 'by-hand', onLux: 10 } },
    'switching.onLux',
    'not a field here',
  ],
  [
    'the same twice',
    { switching: { kind: 'light-sensor', onLux: 9, onAltitudeDeg: -6 } },
    'switching.onAltitudeDeg',
    'Keep one',
  ],
  [
    'a timer set on no day',
    { switching: { kind: 'interval-timer', onHours: 6, setAt: '2026-02-30T12:00:00Z' } },
    'switching.setAt',
    'does not exist',
  ],
  ['half a unit', { units: 0.5 }, 'units', 'whole number'],
  ['no unit', { units: 0 }, 'units', '0 is below 1'],
  [
    'trips per season',
    { trips: { perShowNight: 40_000, perNightOff: 0, seconds: 20, runMa: 40 } },
    'trips.perShowNight',
    '40000 is above 20000',
  ],
];

test.each(PROPS)('a prop with %s is refused, new or changed', async (...row) => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  const [slip, changes, field, says] = row;
  await refused(rig, () => rig.ask.patch(`/api/props/${prop.id}`), [slip, changes, field, says]);
  const whole = { ...aProp(site.id, { tag: 'C-03' }), ...(changes as object) };
  await refused(rig, () => rig.ask.post('/api/props'), [slip, whole, field, says]);
});

const at = '2026-10-21T15:00:00Z';
const SWAPS: Row[] = [
  [
    'a date ahead with day and month swapped',
    { at: '2026-11-10T15:00:00Z', state: 'new' },
    'at',
    '10 Nov 2026, 19 days ahead. Was it 11 Oct 2026',
  ],
  [
    'a date ahead',
    { at: '2026-11-30T15:00:00Z', state: 'new' },
    'at',
    '39 days ahead. Was it today, 22 Oct 2026',
  ],
  ['an unset clock', { at: '1970-01-01T00:00:00Z', state: 'new' }, 'at', 'before the year 2000'],
  ['no offset', { at: '2026-10-21T15:00:00', state: 'new' }, 'at', "like '2026-10-25T17:30:00Z'"],
  ['four cells for three', { at, state: 'new', cells: 4 }, 'cells', 'C-02 takes 3 cells, and 4 were given'],
  ['a share of a new set', { at, state: 'new', leftShare: 0.5 }, 'leftShare', 'Set state to "part-used"'],
  ['an unknown state', { at, state: 'used' }, 'state', 'none of "new", "charged", "part-used"'],
  ['unknown cells', { at, state: 'new', cellTypeId: 'AA' }, 'cellTypeId', 'No cell type is called "AA"'],
  ['a control character in a note', { at, state: 'new', note: 'a\u001bb' }, 'note', 'no control characters'],
];
const SIGHTINGS: Row[] = [
  ['volts without how', { at, seen: 'bright', volts: 4.1 }, 'taken', '4.1 V, with the light on or off'],
  ['how without volts', { at, seen: 'bright', taken: 'lit' }, 'volts', 'no volts were given'],
  ['a date ahead', { at: '2027-10-21T15:00:00Z', seen: 'dim' }, 'at', 'days ahead'],
  ['another word', { at, seen: 'fine' }, 'seen', 'none of "bright", "dim", "dark", "odd"'],
];

test.each(SWAPS)('a swap with %s is refused', async (...row) => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  await refused(rig, () => rig.ask.post(`/api/props/${prop.id}/swaps`), row);
});

test.each(SIGHTINGS)('a sighting with %s is refused', async (...row) => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  await refused(rig, () => rig.ask.post(`/api/props/${prop.id}/sightings`), row);
});

const night = { evening: '2026-10-24', opensAt: '18:30', closesAt: '21:30' };
const NIGHTS: Row[] = [
  ['a date that is none', [{ ...night, evening: '2026-11-31' }], '0.evening', 'does not exist'],
  [
    'the same evening twice',
    [night, { ...night, opensAt: '19:00' }],
    '1.evening',
    'listed twice, at places 1 and 2',
  ],
  [
    'no time between the gates',
    [{ ...night, closesAt: '18:30' }],
    '0.closesAt',
    'closes at 18:30, the moment it opens',
  ],
  ['one night that is no list', night, 'body', 'An object is given where a list is wanted'],
];

test.each(NIGHTS)('show nights with %s are refused', async (...row) => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  await refused(rig, () => rig.ask.put(`/api/sites/${site.id}/show-nights`), row);
});

const TYPED: Row[] = [
  ['low and high swapped', { minC: 3, maxC: -2 }, 'maxC', '-2 °C is below the low 3 °C'],
  ['°F', { minC: 41, maxC: 59 }, 'maxC', '59 is above 50'],
];

test.each(TYPED)('a typed night with %s is refused', async (...row) => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  await refused(rig, () => rig.ask.put(`/api/sites/${site.id}/weather/nights/2026-10-24`), row);
  const real = row[1];
  if (row[0] === '°F') return;
  await refused(rig, () => rig.ask.put(`/api/sites/${site.id}/weather/nights/2026-02-30`), [
    '',
    real,
    'evening',
    'no date',
  ]);
});

describe('questions in the address', () => {
  const QUERIES: [path: string, field: string, says: string][] = [
    ['/api/sites/S/forecast?asof=2026-10-22T09:00:00Z', 'asof', 'did you mean `asOf`?'],
    ['/api/sites/S/forecast?asOf=2026-02-30T09:00:00Z', 'asOf', 'does not exist'],
    ['/api/sites/S/forecast?asOf=yesterday', 'asOf', "like '2026-10-25T17:30:00Z'"],
    ['/api/sites/S/forecast?asOf=2026-10-22T09:00:00Z&asOf=2026-10-23T09:00:00Z', 'asOf', 'A list'],
    ['/api/props/P/forecast?through=2026-13-01', 'through', 'does not exist'],
    ['/api/sites/S/nights?from=2026-10-30&through=2026-10-01', 'through', 'is before'],
    ['/api/sites/S/nights?from=2020-10-30', 'through', 'at most 400'],
    ['/api/sites?limit=0', 'limit', '0 is below 1'],
    ['/api/sites?limit=many', 'limit', 'a whole number is wanted'],
    ['/api/sites?limit=1001', 'limit', '1001 is above 1000'],
    ['/api/props', 'siteId', 'Say which site'],
    ['/api/props?siteId=S&limit=10001', 'limit', '10001 is above 10000'],
    ['/api/props/P/log?limit=501', 'limit', '501 is above 500'],
    ['/api/props/P/log?before=x', 'before', 'before'],
  ];

  test.each(QUERIES)('%s is refused', async (path, field, says) => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    const asked = path
      .replace('/S/', `/${site.id}/`)
      .replace('=S', `=${site.id}`)
      .replace('/P/', `/${prop.id}/`);
    const answer = await rig.ask.get(asked).expect(400);
    expect(answer.body.errors).toContainEqual({ field, message: expect.stringContaining(says) });
  });

  test('a site nobody knows is 404 also where it is asked for', async () => {
    const rig = await aRig();
    await rig.ask.get('/api/props?siteId=nobody').expect(404);
    await rig.ask.post('/api/props').send(aProp('nobody')).expect(404);
  });
});

test('every wrong field is named at once', async () => {
  const { ask } = await aRig();
  const body = {
    ...A_SITE,
    name: 1,
    latitudeDeg: 91,
    longitudeDeg: 181,
    timeZone: 2,
    seasonFrom: 3,
    seasonThrough: 4,
    monthlyMinC: 5,
    monthlyMaxC: 6,
    confidence: 7,
    marginNights: 8,
    rounds: 9,
  };
  const answer = await ask.post('/api/sites').send(body).expect(400);
  expect(answer.body.errors.map((error: { field: string }) => error.field).sort()).toEqual(
    Object.keys(body).sort(),
  );
  expect(answer.body.detail).toContain('10 other fields');
});

test('a taken tag is 409 and names the prop that has it', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  const taken = await rig.ask
    .post('/api/props')
    .send(aProp(site.id, { name: 'Another' }))
    .expect(409);
  expect(taken.body.errors[0]).toEqual({
    field: 'tag',
    message: expect.stringContaining('C-02 is already "Moth lantern" in Ferny Bank'),
  });
  const other = await rig.ask
    .post('/api/props')
    .send(aProp(site.id, { tag: 'C-03' }))
    .expect(201);
  await rig.ask.patch(`/api/props/${other.body.id}`).send({ tag: 'C-02' }).expect(409);
  await rig.ask.patch(`/api/props/${prop.id}`).send({ tag: 'C-02' }).expect(200);
});

test('a long text does not hold the service up', async () => {
  const { ask } = await aRig();
  const startedAt = performance.now();
  for (const name of ['a'.repeat(1_000_000), `${' '.repeat(1_000_000)}`, `${'a '.repeat(500_000)}\u0001`])
    await ask
      .post('/api/sites')
      .send({ ...A_SITE, name })
      .expect(400);
  const manyFields = Object.fromEntries(
    Array.from({ length: 50_000 }, (_, index) => [`latitudeDe${index}`, 1]),
  );
  await ask.post('/api/sites').send(manyFields).expect(400);
  await ask.post('/api/sites').set('content-type', 'application/json').send('['.repeat(500_000)).expect(400);
  expect(performance.now() - startedAt).toBeLessThan(5_000);
});
