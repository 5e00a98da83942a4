import fc from 'fast-check';
import { expect, test } from 'vitest';
import { A_SITE, aProp, aSiteWithProp } from '../rig/a-site.ts';
import { aRig } from '../rig/build-app.ts';

// Requests nobody would write: whatever comes, the answer is a yes or a no with a reason, never a mistake of ours.

const SWAP = { at: '2026-10-21T15:00:00Z', state: 'new', cells: 3, note: 'x' };
const SIGHTING = { at: '2026-10-21T15:00:00Z', seen: 'bright', volts: 4, taken: 'lit' };
const CELL_TYPE = { kind: 'nickel', capacityMah: 2000, nominalVolts: 1.2, massG: 27, name: 'Shed' };
const NIGHTS = [{ evening: '2026-10-24', opensAt: '18:30', closesAt: '21:30', calledOff: true }];

/** Values at the edges of what JSON, JavaScript and SQLite can tell apart. */
const oddValue = fc.oneof(
  fc.constantFrom<unknown>(
    null,
    true,
    0,
    -0,
    -1,
    1e308,
    5e-324,
    2 ** 53,
    '',
    ' ',
    '\u0000',
    '\ud800',
    '🦇',
    '\u202e',
    [],
    {},
    [[]],
    '2026-02-30',
    '9999-12-31',
    '2026-10-25T01:30:00+01:00',
    '24:00',
    'constructor',
    "'; drop table props; --",
    '=1+1',
    'Europe/London',
  ),
  fc.jsonValue({ maxDepth: 2 }),
  fc.string({ unit: 'binary', maxLength: 200 }),
  fc.double({ noNaN: true }),
);

/** A good body with a few of its values, at any depth, replaced, taken out or added to. */
function spoilt(body: unknown): fc.Arbitrary<unknown> {
  const paths = pathsOf(body);
  const change = fc.record({
    path: fc.constantFrom(...paths),
    value: oddValue,
    drop: fc.boolean(),
    key: fc.string({ maxLength: 8 }),
  });
  return fc
    .array(change, { minLength: 1, maxLength: 3 })
    .map((changes) => changes.reduce<unknown>(withChange, structuredClone(body)));
}

type Change = { path: string[]; value: unknown; drop: boolean; key: string };

function withChange(body: unknown, { path, value, drop, key }: Change): unknown {
  const copy = structuredClone(body) as Record<string, unknown>;
  let here: Record<string, unknown> = copy;
  for (const step of path.slice(0, -1)) {
    const next = here?.[step];
    if (typeof next !== 'object' || next === null) return copy;
    here = next as Record<string, unknown>;
  }
  const last = path.at(-1);
  if (last === undefined || typeof here !== 'object' || here === null) return value;
  if (drop) delete here[last];
  else here[last] = value;
  if (key.length === 3) here[key] = value;
  return copy;
}

function pathsOf(value: unknown, above: string[] = []): string[][] {
  if (typeof value !== 'object' || value === null) return [above];
  return [above, ...Object.entries(value).flatMap(([key, inner]) => pathsOf(inner, [...above, key]))];
}

const anyBody = (good: unknown) =>
  fc.oneof({ weight: 4, arbitrary: spoilt(good) }, { weight: 1, arbitrary: oddValue });

test('random bodies on every route that takes one', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  await rig.app.listen({ port: 0, host: '127.0.0.1' });
  const { id: cellTypeId } = (await rig.ask.post('/api/cell-types').send(CELL_TYPE).expect(201)).body;
  const routes: [method: 'post' | 'put' | 'patch', path: string, good: unknown][] = [
    ['post', '/api/sites', A_SITE],
    ['patch', `/api/sites/${site.id}`, { ...A_SITE, zoneOffsetsC: { Mill: -3 }, confidence: 0.9 }],
    ['put', `/api/sites/${site.id}/show-nights`, NIGHTS],
    ['put', `/api/sites/${site.id}/weather/nights/2026-10-24`, { minC: -3, maxC: 4 }],
    ['post', '/api/cell-types', CELL_TYPE],
    ['patch', `/api/cell-types/${cellTypeId}`, { capacityMah: 1900, priceEach: 2 }],
    [
      'post',
      '/api/props',
      aProp(site.id, { trips: { perShowNight: 9, perNightOff: 1, seconds: 9, runMa: 9 }, xM: 2 }),
    ],
    ['patch', `/api/props/${prop.id}`, { ...aProp(site.id), siteId: undefined, offsetC: 3 }],
    ['post', `/api/props/${prop.id}/swaps`, SWAP],
    ['post', `/api/props/${prop.id}/sightings`, SIGHTING],
    ['post', `/api/sites/${site.id}/calendar-links`, { label: 'x', alarms: true }],
  ];
  for (const [method, path, good] of routes) {
    await fc.assert(
      fc.asyncProperty(anyBody(good), async (body) => {
        const answer = await rig.ask[method](path)
          .set('content-type', 'application/json')
          .send(JSON.stringify(body) ?? '');
        // More is refused once there are too many of a thing.
        expect(
          [200, 201, 400, 404, 409],
          `${method} ${path} ${JSON.stringify(body)} ${answer.text}`,
        ).toContain(answer.status);
        if (answer.status >= 400) expect(answer.body.detail).not.toBe('');
      }),
      { numRuns: 60 },
    );
  }
  // Whatever was let in can be reckoned with.
  await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
  await rig.ask.get(`/api/sites/${site.id}/nights`).expect(200);
  await rig.ask.get(`/api/props/${prop.id}/log?limit=500`).expect(200);
}, 60_000);

test('random questions in the address', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  await rig.app.listen({ port: 0, host: '127.0.0.1' });
  const paths = [
    '/api/sites',
    `/api/sites/${site.id}/nights`,
    `/api/sites/${site.id}/forecast`,
    '/api/props',
    `/api/props/${prop.id}/log`,
    `/api/props/${prop.id}/forecast`,
  ];
  const moments = [
    '1900-01-01T00:00:00Z',
    '2199-12-31T23:59:59Z',
    '2026-03-29T01:30:00Z',
    '1900-01-01T00:00:00+23:59',
  ];
  const evenings = ['1900-01-01', '2199-12-31', '2026-10-25', '2026-12-31', '0000-01-01'];
  const odd = fc.oneof(
    fc.constantFrom(...moments, ...evenings, site.id, '1', '1e3', ''),
    fc.string({ maxLength: 30 }),
  );
  const query = fc.dictionary(
    fc.constantFrom('asOf', 'from', 'through', 'limit', 'after', 'before', 'siteId', 'undone', 'x'),
    odd,
    { maxKeys: 3 },
  );
  await fc.assert(
    fc.asyncProperty(fc.constantFrom(...paths), query, async (path, asked) => {
      const answer = await rig.ask.get(path).query(asked);
      expect([200, 400, 404], `${path} ${JSON.stringify(asked)} ${answer.text.slice(0, 300)}`).toContain(
        answer.status,
      );
    }),
    { numRuns: 400 },
  );
}, 60_000);

test('random bytes as a weather file', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  await rig.app.listen({ port: 0, host: '127.0.0.1' });
  const lines = fc.array(
    fc.oneof(
      fc.string({ maxLength: 40 }),
      fc.constantFrom('time,tempC', '2026-10-21T15:00,4', 'LOCATION,x', ';;;'),
    ),
    { maxLength: 20 },
  );
  const file = fc.oneof(
    fc.uint8Array({ maxLength: 300 }).map((bytes) => Buffer.from(bytes)),
    lines.map((all) => Buffer.from(all.join('\n'))),
  );
  await fc.assert(
    fc.asyncProperty(file, async (bytes) => {
      const answer = await rig.ask
        .post(`/api/sites/${site.id}/weather`)
        .set('content-type', 'text/csv')
        .send(bytes.toString('latin1'));
      expect([200, 400], answer.text.slice(0, 300)).toContain(answer.status);
    }),
    { numRuns: 150 },
  );
}, 60_000);
