import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { packageRoot } from '../../server/config.ts';
import { A_SITE, aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf } from '../rig/build-app.ts';

const HOURS = Array.from({ length: 48 }, (_, hour) => {
  const day = 20 + Math.floor(hour / 24);
  // Invented: a plain wave with its warmest hour at 14:00.
  const tempC = 8 + 4 * Math.cos(((hour - 14) / 24) * 2 * Math.PI);
  return `2026-10-${day}T${String(hour % 24).padStart(2, '0')}:00:00Z,${tempC.toFixed(1)}`;
});
const CSV = ['time,tempC', ...HOURS].join('\n');

describe('a weather file', () => {
  test('as text/csv is read, told about, and used', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const imported = await rig.ask
      .post(`/api/sites/${site.id}/weather`)
      .set('content-type', 'text/csv')
      .send(CSV)
      .expect(200);
    expect(imported.body).toMatchObject({ format: 'time-temp', rows: 48, rejected: [] });
    const nights = (
      await rig.ask.get(`/api/sites/${site.id}/nights?from=2026-10-19&through=2026-10-21`).expect(200)
    ).body;
    const sources = nights.map((night: { weather: string }) => night.weather);
    expect(sources).toEqual(['climate', 'observed', 'climate']);
    // The wave's own bounds.
    expect(nights[1].meanC).toBeGreaterThan(4);
    expect(nights[1].meanC).toBeLessThan(12);
  });

  test('as a form upload is the same', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const plain = await rig.ask
      .post(`/api/sites/${site.id}/weather`)
      .set('content-type', 'text/csv')
      .send(CSV)
      .expect(200);
    const form = await rig.ask
      .post(`/api/sites/${site.id}/weather`)
      .attach('file', Buffer.from(CSV), { filename: 'week.csv', contentType: 'text/csv' })
      .expect(200);
    expect(form.body).toEqual(plain.body);
  });

  test('changes what is forecast', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
    await rig.ask.post(`/api/sites/${site.id}/weather`).set('content-type', 'text/csv').send(CSV).expect(200);
    const after = await rig.ask
      .get(`/api/sites/${site.id}/forecast`)
      .set('if-none-match', before.headers.etag!)
      .expect(200);
    expect(after.headers.etag).not.toBe(before.headers.etag);
  });

  test('that is none is refused in a sentence, and nothing changes', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const before = dumpOf(rig.store);
    const address = `/api/sites/${site.id}/weather`;
    const refusedBodies = ['', 'hello', 'a,b\n1,2\n', '\u0000\u0001\u0002', '{"tempC": 4}'];
    for (const body of refusedBodies) {
      const answer = await rig.ask.post(address).set('content-type', 'text/csv').send(body);
      expect([body, answer.status]).toEqual([body, 400]);
      expect(answer.body.errors[0]).toEqual({ field: 'file', message: expect.stringMatching(/\w{3,}.*\./) });
    }
    await rig.ask.post(address).send({ tempC: 4 }).expect(415);
    await rig.ask.post(address).field('note', 'no file').expect(400);
    await rig.ask
      .post(address)
      .attach('a', Buffer.from(CSV), 'a.csv')
      .attach('b', Buffer.from(CSV), 'b.csv')
      .expect(400);
    await rig.ask.post(`${address}?unit=K`).set('content-type', 'text/csv').send(CSV).expect(400);
    expect(dumpOf(rig.store)).toBe(before);
  });

  test('is taken up to 16 MiB, and refused beyond', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const address = `/api/sites/${site.id}/weather`;
    const padded = (bytes: number) => `${CSV}\n${'# x\n'.repeat(Math.ceil((bytes - CSV.length) / 4))}`;
    const large = await rig.ask
      .post(address)
      .set('content-type', 'text/csv')
      .send(padded(2 * 1024 * 1024));
    expect(large.status).not.toBe(413);
    await rig.ask
      .post(address)
      .set('content-type', 'text/csv')
      .send(padded(16 * 1024 * 1024 + 10))
      .expect(413);
    await rig.ask
      .post(address)
      .attach('file', Buffer.from(padded(16 * 1024 * 1024 + 10)), 'x.csv')
      .expect(413);
    // JSON keeps its own, smaller limit on the addresses beside it.
    const night = `/api/sites/${site.id}/weather/nights/2026-10-24`;
    const json = `{"minC":1,"maxC":2${' '.repeat(1_100_000)}}`;
    await rig.ask.put(night).set('content-type', 'application/json').send(json).expect(413);
  });
});

describe('weather in use', () => {
  test('is told, and a file taken out again leaves the nights as they were', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const address = `/api/sites/${site.id}/weather`;
    const nights = async () =>
      (await rig.ask.get(`/api/sites/${site.id}/nights?from=2026-10-19&through=2026-10-21`).expect(200)).body;
    const inUse = async () => (await rig.ask.get(address).expect(200)).body;
    const nothing = { typicalYear: null, hours: null, typedNights: [] };
    expect(await inUse()).toEqual(nothing);
    const before = await nights();
    await rig.ask.post(address).set('content-type', 'text/csv').send(CSV).expect(200);
    await rig.ask.put(`${address}/nights/2026-10-24`).send({ minC: 1, maxC: 2 }).expect(200);
    // The hours run from 00:00 UTC on the 20th to 23:00 UTC on the 21st, which is midnight in Britain's summer time.
    const hours = { from: '2026-10-20', through: '2026-10-22', count: 48 };
    expect(await inUse()).toEqual({ ...nothing, hours, typedNights: ['2026-10-24'] });
    expect(await nights()).not.toEqual(before);
    const forecast = await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
    await rig.ask.delete(`${address}?of=hours`).expect(204);
    expect(await inUse()).toEqual({ ...nothing, typedNights: ['2026-10-24'] });
    expect(await nights()).toEqual(before);
    const after = await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
    expect(after.headers.etag).not.toBe(forecast.headers.etag);
  });

  test('of another site stays, and what is not there or not said is refused', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const other = (await rig.ask.post('/api/sites').send(A_SITE).expect(201)).body;
    await rig.ask
      .post(`/api/sites/${other.id}/weather`)
      .set('content-type', 'text/csv')
      .send(CSV)
      .expect(200);
    const before = dumpOf(rig.store);
    await rig.ask.delete(`/api/sites/${site.id}/weather?of=hours`).expect(404);
    await rig.ask.delete(`/api/sites/${site.id}/weather?of=typical-year`).expect(404);
    await rig.ask.delete('/api/sites/nobody/weather?of=hours').expect(404);
    const { body } = await rig.ask.delete(`/api/sites/${other.id}/weather`).expect(400);
    expect(body.errors[0].field).toBe('of');
    await rig.ask.delete(`/api/sites/${other.id}/weather?of=everything`).expect(400);
    expect(dumpOf(rig.store)).toBe(before);
  });
});

const FARGO = join(packageRoot(), '..', 'shared', 'reference', 'weather', 'fargo_nd_727530_tmy3.epw');

describe.runIf(existsSync(FARGO))('a published typical year', () => {
  test('of Fargo becomes the climate of a site there', async () => {
    const { ask } = await aRig();
    // Place and zone as the file's first line says: 46.93 N, 96.82 W.
    const fargo = { ...A_SITE, latitudeDeg: 46.93, longitudeDeg: -96.82, timeZone: 'America/Chicago' };
    const site = (await ask.post('/api/sites').send(fargo).expect(201)).body;
    const address = `/api/sites/${site.id}/nights?from=2027-01-10&through=2027-01-20`;
    const milder = (await ask.get(address).expect(200)).body;
    const imported = await ask
      .post(`/api/sites/${site.id}/weather`)
      .set('content-type', 'text/csv')
      .send(readFileSync(FARGO))
      .expect(200);
    expect(imported.body).toMatchObject({ format: 'epw', rows: 8760, warnings: [] });
    const weather = `/api/sites/${site.id}/weather`;
    expect((await ask.get(weather).expect(200)).body).toMatchObject({
      typicalYear: { stationName: imported.body.station.name },
      hours: null,
    });
    const nights = (await ask.get(address).expect(200)).body;
    for (const [index, night] of nights.entries()) {
      expect(night.weather).toBe('climate');
      // January nights in Fargo are far below those of the upland English months the site was made with.
      expect(night.meanC).toBeLessThan(-5);
      expect(night.meanC).toBeLessThan(milder[index].meanC);
    }
    await ask.delete(`${weather}?of=typical-year`).expect(204);
    expect((await ask.get(address).expect(200)).body).toEqual(milder);
  });
});
