import { describe, expect, test } from 'vitest';
import { PROBLEMS } from '../../server/http/problems.ts';
import { type ApiDocument, undocumented } from '../rig/as-documented.ts';
import { aRig } from '../rig/build-app.ts';

async function aDocument(): Promise<{
  document: ApiDocument;
  operations: [string, ApiDocument['paths'][string][string]][];
}> {
  const { ask } = await aRig();
  const document: ApiDocument = (await ask.get('/api/openapi.json').expect(200)).body;
  const operations = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(
      ([method, operation]) => [`${method.toUpperCase()} ${path}`, operation] as [string, typeof operation],
    ),
  );
  return { document, operations };
}

// What programs of a crew may rely on: a path that is taken away or renamed must be taken away here too.
const CONTRACT = `
GET /api/health
POST /api/sites
GET /api/sites
GET /api/sites/{siteId}
PATCH /api/sites/{siteId}
DELETE /api/sites/{siteId}
PUT /api/sites/{siteId}/show-nights
GET /api/sites/{siteId}/show-nights
GET /api/sites/{siteId}/nights
GET /api/sites/{siteId}/weather
POST /api/sites/{siteId}/weather
DELETE /api/sites/{siteId}/weather
PUT /api/sites/{siteId}/weather/nights/{evening}
GET /api/cell-types
POST /api/cell-types
GET /api/cell-types/{cellTypeId}
PATCH /api/cell-types/{cellTypeId}
DELETE /api/cell-types/{cellTypeId}
POST /api/props
GET /api/props
GET /api/props/{propId}
PATCH /api/props/{propId}
DELETE /api/props/{propId}
POST /api/props/{propId}/swaps
POST /api/props/{propId}/sightings
GET /api/props/{propId}/log
DELETE /api/props/{propId}/log/{entryId}
GET /api/props/{propId}/forecast
GET /api/sites/{siteId}/forecast
POST /api/sites/{siteId}/props/import
GET /api/sites/{siteId}/props.csv
GET /api/sites/{siteId}/log.csv
GET /api/sites/{siteId}/forecast.csv
POST /api/sites/{siteId}/calendar-links
GET /api/sites/{siteId}/calendar-links
DELETE /api/sites/{siteId}/calendar-links/{linkId}`
  .trim()
  .split('\n');

describe('the API’s description of itself', () => {
  test('is OpenAPI 3.1 and names every address of the contract', async () => {
    const { document, operations } = await aDocument();
    expect((document as unknown as { openapi: string }).openapi).toBe('3.1.0');
    expect(operations.map(([name]) => name)).toEqual(expect.arrayContaining(CONTRACT));
  });

  test('gives every operation a name of its own, and path parameters for all placeholders', async () => {
    const { operations } = await aDocument();
    const names = operations.map(([, operation]) => operation.operationId);
    expect(names.filter((name) => !/^[a-z][A-Za-z]+$/.test(name))).toEqual([]);
    expect(new Set(names).size).toBe(names.length);
    for (const [name, operation] of operations) {
      const placeholders = [...name.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      const { parameters = [] } = operation as {
        parameters?: { name: string; in: string; required?: boolean }[];
      };
      const inPath = parameters.filter((parameter) => parameter.in === 'path' && parameter.required);
      expect(inPath.map((parameter) => parameter.name).sort(), name).toEqual(placeholders.sort());
    }
  });

  test('every success is described, and every no is a problem document', async () => {
    const { operations } = await aDocument();
    for (const [name, { responses }] of operations) {
      const statuses = Object.keys(responses).map(Number);
      expect(statuses.filter((status) => status < 300).length, name).toBe(1);
      for (const status of statuses.filter((status) => status >= 400))
        expect(responses[status]!.content, `${name} ${status}`).toEqual({
          'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } },
        });
      for (const status of [400, 404, 500]) expect(statuses, name).toContain(status);
    }
  });

  test('says what a weather file may be sent as', async () => {
    const { operations } = await aDocument();
    const operation = new Map(operations).get('POST /api/sites/{siteId}/weather') as unknown as {
      requestBody: { content: object };
    };
    expect(Object.keys(operation.requestBody.content).sort()).toEqual(['multipart/form-data', 'text/csv']);
  });

  test('has no reference that leads nowhere, and nothing of OpenAPI 3.0', async () => {
    const { document } = await aDocument();
    const text = JSON.stringify(document);
    for (const [, name] of text.matchAll(/"#\/components\/schemas\/([^"]+)"/g))
      expect(document.components.schemas).toHaveProperty(name!);
    expect(text).not.toContain('"nullable"');
    expect(text).not.toContain('def-0');
  });

  test('the check of live answers sees a field too many and one too few', async () => {
    const { document } = await aDocument();
    const health = { status: 'ok', version: '1', schemaVersion: 1, timeZoneData: 'x', asOf: null };
    const sent = (body: object) => ({
      method: 'GET',
      route: '/api/health',
      status: 200,
      type: 'application/json',
      body: JSON.stringify(body),
    });
    expect(undocumented(document, sent(health))).toBeNull();
    expect(undocumented(document, sent({ ...health, more: 1 }))).toContain('not as described');
    expect(undocumented(document, sent({ ...health, version: undefined }))).toContain('not as described');
    expect(undocumented(document, { ...sent(health), status: 418 })).toContain('not described');
  });
});

test('the table of problems says each thing once', () => {
  const titles = Object.values(PROBLEMS).map((row) => row.title);
  expect(new Set(titles).size).toBe(titles.length);
  for (const { status } of Object.values(PROBLEMS)) expect(status).toBeGreaterThanOrEqual(400);
});

test('an unknown id is 404 in the same words on every route', async () => {
  const { ask } = await aRig();
  const bodies: Record<string, object> = {
    changeSite: { name: 'x' },
    setShowNights: [],
    typeNight: { minC: 1, maxC: 2 },
    changeProp: { name: 'x' },
    changeCellType: { name: 'x' },
    recordSwap: { at: '2026-10-20T10:00:00Z', state: 'new' },
    recordSighting: { at: '2026-10-20T10:00:00Z', seen: 'dim' },
    makeCalendarLink: {},
  };
  const { operations } = await aDocument();
  let tried = 0;
  for (const [name, { operationId }] of operations) {
    const [method, template] = name.split(' ') as [string, string];
    if (!template.includes('{') || template.startsWith('/calendars')) continue;
    const path = template.replace('{evening}', '2026-10-20').replace(/\{\w+\}/g, 'nobody');
    const query = operationId === 'removeWeather' ? '?of=hours' : '';
    const asked = ask[method.toLowerCase() as 'get'](`${path}${query}`);
    const answer =
      operationId === 'importWeather' || operationId === 'importProps'
        ? await asked.set('content-type', 'text/csv').send('time,tempC\n')
        : await asked.send(bodies[operationId]);
    expect([name, answer.status, answer.body.code]).toEqual([name, 404, 'not-found']);
    expect(answer.body.detail).toMatch(/^There is no (site|prop|entry|cell type) "nobody" here\./);
    tried += 1;
  }
  expect(tried).toBeGreaterThanOrEqual(20);
});

test('a method that is not offered is 405 and says which are', async () => {
  const { ask } = await aRig();
  const { operations } = await aDocument();
  const offered = new Map<string, Set<string>>();
  for (const [name] of operations) {
    const [method, path] = name.split(' ') as [string, string];
    offered.set(path, (offered.get(path) ?? new Set()).add(method));
  }
  for (const [path, methods] of offered) {
    if (methods.has('GET')) methods.add('HEAD');
    for (const method of ['put', 'patch', 'delete', 'post', 'options'] as const) {
      if (methods.has(method.toUpperCase())) continue;
      const answer = await ask[method](path.replace(/\{\w+\}/g, 'x')).expect(405);
      expect(answer.headers.allow, path).toBe([...methods].sort().join(', '));
      expect(answer.body.code).toBe('method-not-offered');
    }
  }
});
