import fastify from 'fastify';
import request from 'supertest';
import { expect, onTestFinished, test } from 'vitest';
import { answerErrors } from '../../server/http/errors.ts';
import { type CalendarReader, calendarRoutes } from '../../server/http/routes/calendar.ts';
import { Problem } from '../../server/http/schemas/errors.ts';

// What a calendar program sees, whatever is in the calendar. Source: RFC 9110 (ETag 8.8.3, If-None-Match 13.1.2, 304 15.4.5), RFC 5545 8.1 (text/calendar), RFC 6266 (file name).
async function aFeed(read: CalendarReader) {
  const app = fastify();
  app.addSchema(Problem);
  answerErrors(app);
  app.register(async (routes) => calendarRoutes(routes, read));
  await app.ready();
  onTestFinished(() => app.close());
  return request(app.server);
}

const TEXT = 'BEGIN:VCALENDAR\r\nSUMMARY:Träger Nebel 🦇\r\nEND:VCALENDAR\r\n';
const reader: CalendarReader = (secret) => (secret === 'right' ? { text: TEXT, etag: '"1"' } : null);

test('the feed is sent as calendars like it', async () => {
  const ask = await aFeed(reader);
  const answer = await ask.get('/calendars/right.ics').buffer(true).expect(200);
  expect(answer.headers['content-type']).toBe('text/calendar; charset=utf-8');
  expect(answer.headers['content-disposition']).toBe('inline; filename="rounds.ics"');
  expect(answer.headers['cache-control']).toBe('private, no-cache');
  expect(answer.headers['x-robots-tag']).toBe('noindex');
  expect(answer.headers['set-cookie']).toBeUndefined();
  expect(answer.text).toBe(TEXT);
});

test('HEAD says the same without the body; any Accept and further questions do not matter', async () => {
  const ask = await aFeed(reader);
  const get = await ask.get('/calendars/right.ics').expect(200);
  const head = await ask.head('/calendars/right.ics?x=1').set('accept', 'image/png').expect(200);
  for (const name of ['content-type', 'content-length', 'etag', 'cache-control'])
    expect(head.headers[name], name).toBe(get.headers[name]);
  expect(head.headers['content-length']).toBe(String(Buffer.byteLength(TEXT)));
  expect(head.text ?? '').toBe('');
});

test('an unchanged feed is 304, by a list, a weak mark or a star; a date alone is not believed', async () => {
  let etagNow = '"1"';
  const ask = await aFeed(() => ({ text: TEXT, etag: etagNow }));
  const { etag } = (await ask.get('/calendars/right.ics').expect(200)).headers;
  for (const mark of [etag!, `W/${etag}`, `"a", ${etag} , "b"`, '*']) {
    const answer = await ask.get('/calendars/right.ics').set('if-none-match', mark).expect(304);
    expect(answer.headers).toMatchObject({ etag, 'cache-control': 'private, no-cache' });
    expect(answer.text).toBe('');
  }
  await ask.get('/calendars/right.ics').set('if-modified-since', 'Fri, 01 Jan 2100 00:00:00 GMT').expect(200);
  etagNow = '"2"';
  const changed = await ask.get('/calendars/right.ics').set('if-none-match', etag!).expect(200);
  expect(changed.headers.etag).not.toBe(etag);
});

test('a wrong secret is told from no address at all by nothing', async () => {
  const ask = await aFeed(reader);
  const wrong = await ask.get('/calendars/wrong.ics').expect(404);
  const other = await ask.get('/calendars/right').expect(404);
  const none = await ask.get('/calendar').expect(404);
  expect(wrong.body).toEqual(other.body);
  expect(wrong.body).toEqual(none.body);
});

test('other methods are 405', async () => {
  const ask = await aFeed(reader);
  const answer = await ask.put('/calendars/right.ics').expect(405);
  expect(answer.headers.allow).toBe('GET, HEAD');
});
