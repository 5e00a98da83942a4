import { connect } from 'node:net';
import { expect, test } from 'vitest';
import { withoutSecret } from '../../server/http/log-lines.ts';
import { A_SITE, aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf, type Rig } from '../rig/build-app.ts';

async function listening(rig: Rig): Promise<number> {
  await rig.app.listen({ port: 0, host: '127.0.0.1' });
  return (rig.app.server.address() as { port: number }).port;
}

/** Sends bytes as they are, and gives back what comes until the server ends the connection. */
function rawly(port: number, text: string): Promise<string> {
  return new Promise((resolve, reject) => {
    const socket = connect(port, '127.0.0.1', () => socket.write(text));
    let answer = '';
    socket.on('data', (data) => {
      answer += data;
    });
    socket.on('end', () => resolve(answer));
    socket.on('error', reject);
  });
}

const asking = (host: string, more = '') =>
  `GET /api/health HTTP/1.1\r\nHost: ${host}\r\n${more}Connection: close\r\n\r\n`;

test('answers to its own names on its own port only', async () => {
  const rig = await aRig({ publicUrl: 'https://lights.example.org' });
  const port = await listening(rig);
  for (const host of [
    `127.0.0.1:${port}`,
    `127.1.2.3:${port}`,
    `localhost:${port}`,
    `LOCALHOST:${port}`,
    `[::1]:${port}`,
    'localhost',
    'lights.example.org',
  ])
    expect(await rawly(port, asking(host)), host).toMatch(/^HTTP\/1\.1 200 /);
  for (const host of [
    'evil.example',
    `evil.example:${port}`,
    `127.0.0.1:${port + 1}`,
    `localhost.evil.example:${port}`,
    '127.0.0.1.evil.example',
    '192.168.1.20',
    'lights.example.org:81',
    '',
  ])
    expect(await rawly(port, asking(host)), host).toMatch(/^HTTP\/1\.1 421 [\s\S]*"code":"wrong-host"/);
});

test('takes changes from its own pages and from programs, not from other sites', async () => {
  const rig = await aRig({ publicUrl: 'https://lights.example.org' });
  const port = await listening(rig);
  const write = async (headers: Record<string, string>) =>
    (
      await fetch(`http://127.0.0.1:${port}/api/sites`, {
        method: 'POST',
        headers: { 'content-type': 'application/json', ...headers },
        body: JSON.stringify(A_SITE),
      })
    ).status;
  expect(await write({})).toBe(201);
  expect(await write({ origin: `http://127.0.0.1:${port}` })).toBe(201);
  const before = dumpOf(rig.store);
  for (const origin of [
    'https://evil.example',
    'null',
    `http://localhost:${port}`,
    `https://127.0.0.1:${port}`,
    `http://127.0.0.1:${port + 1}`,
  ])
    expect(await write({ origin }), origin).toBe(403);
  expect(dumpOf(rig.store)).toBe(before);
  // A browser says where a request comes from even where it leaves the origin out; fetch() cannot, a socket can.
  const body = JSON.stringify(A_SITE);
  const from = (site: string, more = '') =>
    rawly(
      port,
      `POST /api/sites HTTP/1.1\r\nHost: 127.0.0.1:${port}\r\nSec-Fetch-Site: ${site}\r\n${more}Content-Type: application/json\r\nContent-Length: ${Buffer.byteLength(body)}\r\nConnection: close\r\n\r\n${body}`,
    );
  expect(await from('cross-site')).toMatch(/^HTTP\/1\.1 403 /);
  expect(await from('same-site')).toMatch(/^HTTP\/1\.1 403 /);
  expect(await from('same-origin')).toMatch(/^HTTP\/1\.1 201 /);
  expect(await from('none')).toMatch(/^HTTP\/1\.1 201 /);
});

test('reads JSON only where JSON is wanted', async () => {
  const { ask } = await aRig();
  const text = JSON.stringify(A_SITE);
  for (const type of [
    'text/plain',
    'application/x-www-form-urlencoded',
    'multipart/form-data; boundary=x',
    'text/csv',
    'application/xml',
    '',
  ])
    expect((await ask.post('/api/sites').set('content-type', type).send(text)).status, type).toBe(415);
  await ask.post('/api/sites').set('content-type', 'application/json; charset=utf-8').send(text).expect(201);
});

test('says no in the same form to what is hardly a request', async () => {
  const rig = await aRig();
  const port = await listening(rig);
  const host = `Host: 127.0.0.1:${port}\r\n`;
  const cases: [bytes: string, status: number, code: string][] = [
    ['nonsense\r\n\r\n', 400, 'unreadable'],
    [`GET / HTTP/1.1\r\n${host}X: ${'x'.repeat(40_000)}\r\n\r\n`, 431, 'headers-too-large'],
    [`GET /api/%zz HTTP/1.1\r\n${host}Connection: close\r\n\r\n`, 400, 'unreadable'],
    [`GET /api/sites/%00 HTTP/1.1\r\n${host}Connection: close\r\n\r\n`, 404, 'not-found'],
    [
      `GET /api/sites/${'x'.repeat(500)} HTTP/1.1\r\n${host}Connection: close\r\n\r\n`,
      414,
      'address-too-long',
    ],
    [`GET /api/nothing HTTP/1.1\r\n${host}Connection: close\r\n\r\n`, 404, 'not-found'],
    [`GET /api/../../etc/passwd HTTP/1.1\r\n${host}Connection: close\r\n\r\n`, 404, 'not-found'],
  ];
  for (const [bytes, status, code] of cases) {
    const answer = await rawly(port, bytes);
    expect(answer.slice(0, 12), bytes.slice(0, 40)).toBe(`HTTP/1.1 ${status}`);
    expect(answer.toLowerCase()).toContain('content-type: application/problem+json');
    expect(JSON.parse(answer.slice(answer.indexOf('\r\n\r\n') + 4))).toMatchObject({
      status,
      code,
      errors: [],
    });
  }
});

test('a body too large is 413, and nothing of it is kept', async () => {
  const { ask } = await aRig();
  const answer = await ask.post('/api/sites').send({ ...A_SITE, name: 'x'.repeat(1_100_000) });
  expect([answer.status, answer.body.code]).toEqual([413, 'too-large']);
});

test('every answer carries the headers that keep browsers careful, and none that opens it to others', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  for (const path of ['/api/health', `/api/sites/${site.id}/forecast`, '/api/nothing', '/api/openapi.json']) {
    const { headers } = await rig.ask.get(path).set('origin', 'https://evil.example');
    expect(headers['content-security-policy']).toContain("default-src 'self'");
    expect(headers['content-security-policy']).not.toContain('unsafe');
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['referrer-policy']).toBe('no-referrer');
    expect(headers['cross-origin-resource-policy']).toBe('same-origin');
    expect(headers['cache-control']).toMatch(/no-store|no-cache/);
    expect(Object.keys(headers).filter((name) => /^access-control|^server$|powered/.test(name))).toEqual([]);
  }
});

test('whoever writes without end is asked to wait', async () => {
  const { ask } = await aRig({ writesPerMinute: 3 });
  const statuses: number[] = [];
  for (let count = 0; count < 5; count += 1) statuses.push((await ask.delete('/api/sites/x')).status);
  expect(statuses).toEqual([404, 404, 404, 429, 429]);
  const answer = await ask.delete('/api/sites/x').expect(429);
  expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
  expect(answer.body).toMatchObject({
    code: 'too-many',
    detail: expect.stringMatching(/^More than 3 requests/),
  });
  await ask.get('/api/sites').expect(200);
});

test('a mistake of ours says nothing of the inside', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  rig.store.db.run('drop table show_nights');
  const answer = await rig.ask.get(`/api/sites/${site.id}/show-nights`).expect(500);
  expect(answer.body.code).toBe('failed');
  expect(answer.text).not.toMatch(/sqlite|select|show_nights|\/server\/|\.ts/i);
});

test('the log never shows the secret of a calendar link', () => {
  expect(withoutSecret('/calendars/abc_DEF-123.ics?x=1')).toBe('/calendars/[secret]?x=1');
  expect(withoutSecret('/api/sites?after=abc')).toBe('/api/sites?after=abc');
});
