import type { Response } from 'supertest';
import { describe, expect, test } from 'vitest';
import { A_SITE, aProp, aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf } from '../rig/build-app.ts';

describe('sites', () => {
  test('are made, read, changed and removed', async () => {
    const { ask } = await aRig();
    const made = await ask.post('/api/sites').send(A_SITE).expect(201);
    expect(made.headers.location).toBe(`/api/sites/${made.body.id}`);
    expect(made.body).toEqual({
      ...A_SITE,
      id: made.body.id,
      confidence: 0.9,
      marginNights: 1,
      zoneOffsetsC: {},
    });
    expect((await ask.get(made.headers.location!).expect(200)).body).toEqual(made.body);
    expect((await ask.get('/api/sites').expect(200)).body).toEqual([made.body]);
    const changes = { name: ' Quarry  Top ', zoneOffsetsC: { 'Mill Race': -3 }, confidence: 0.95 };
    const changed = await ask.patch(made.headers.location!).send(changes).expect(200);
    expect(changed.body).toEqual({ ...made.body, ...changes, name: 'Quarry  Top' });
    // Some programs name a content type even where there is no content.
    await ask.delete(made.headers.location!).set('content-type', 'application/json').expect(204);
    await ask.get(made.headers.location!).expect(404);
  });

  test('come in pages by name, linked to one another', async () => {
    const { ask } = await aRig();
    for (const name of ['Beech', 'Alder', 'Cedar'])
      await ask
        .post('/api/sites')
        .send({ ...A_SITE, name })
        .expect(201);
    const names: string[] = [];
    let next: string | undefined = '/api/sites?limit=1';
    while (next) {
      const page: Response = await ask.get(next).expect(200);
      names.push(...page.body.map((site: { name: string }) => site.name));
      next = /<([^>]+)>; rel="next"/.exec(page.headers.link ?? '')?.[1];
    }
    expect(names).toEqual(['Alder', 'Beech', 'Cedar']);
  });
});

describe('nights', () => {
  test('show nights are replaced as a list and shown with their evening', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const nights = [
      { evening: '2026-10-24', opensAt: '18:30', closesAt: '21:30' },
      { evening: '2026-10-23', opensAt: '18:30', closesAt: '00:30', calledOff: true },
    ];
    const put = await rig.ask.put(`/api/sites/${site.id}/show-nights`).send(nights).expect(200);
    expect(put.body).toEqual([nights[1], { ...nights[0], calledOff: false }]);
    expect((await rig.ask.get(`/api/sites/${site.id}/show-nights`).expect(200)).body).toEqual(put.body);
    const run = '?from=2026-10-22&through=2026-10-24';
    const listed = (await rig.ask.get(`/api/sites/${site.id}/nights${run}`).expect(200)).body;
    expect(listed.map((night: { evening: string }) => night.evening)).toEqual([
      '2026-10-22',
      '2026-10-23',
      '2026-10-24',
    ]);
    expect(listed.map((night: { showNight: unknown }) => night.showNight)).toEqual([null, ...put.body]);
  });

  test('a typed night beats the climate until it is taken away', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const address = `/api/sites/${site.id}/nights?from=2026-10-23&through=2026-10-23`;
    const before = (await rig.ask.get(address).expect(200)).body[0];
    const typed = await rig.ask
      .put(`/api/sites/${site.id}/weather/nights/2026-10-23`)
      .send({ minC: -7, maxC: -2 })
      .expect(200);
    expect(typed.body).toEqual({ evening: '2026-10-23', minC: -7, maxC: -2 });
    const cold = (await rig.ask.get(address).expect(200)).body[0];
    expect(before.weather).toBe('climate');
    expect(cold.weather).not.toBe('climate');
    expect(cold.minC).toBeCloseTo(-7, 0);
    await rig.ask.delete(`/api/sites/${site.id}/weather/nights/2026-10-23`).expect(204);
    expect((await rig.ask.get(address).expect(200)).body[0]).toEqual(before);
  });
});

describe('cell types', () => {
  test('own ones are added, changed and removed; built-in ones stay', async () => {
    const { ask } = await aRig();
    const own = { id: 'shed-box', kind: 'zinc-carbon', capacityMah: 900, nominalVolts: 1.5, massG: 16 };
    const added = await ask.post('/api/cell-types').send(own).expect(201);
    expect(added.body).toEqual({
      ...own,
      name: 'shed-box',
      cellsInside: 1,
      rechargeable: false,
      builtIn: false,
    });
    const changed = await ask.patch('/api/cell-types/shed-box').send({ priceEach: 0.4 }).expect(200);
    expect(changed.body).toEqual({ ...added.body, priceEach: 0.4 });
    const all = (await ask.get('/api/cell-types').expect(200)).body;
    expect(all[0]).toEqual(changed.body);
    // The designations of IEC 60086, 61951 and 61960 (from memory) that a shop prints on its packets; lead by its volts and ampere-hours.
    const ids = new Set(all.map((type: { id: string }) => type.id));
    for (const id of 'LR6 LR03 LR14 LR20 6LR61 R6 FR6 FR03 HR6 HR03 HR14 HR20 ICR18650 INR21700 IFR18650 CR2032 PB12V7'.split(
      ' ',
    ))
      expect(ids, id).toContain(id);
    await ask.post('/api/cell-types').send(own).expect(409);
    await ask
      .post('/api/cell-types')
      .send({ ...own, id: 'LR6' })
      .expect(409);
    await ask.patch('/api/cell-types/LR6').send({ capacityMah: 9900 }).expect(409);
    await ask.delete('/api/cell-types/LR6').expect(409);
    await ask.delete('/api/cell-types/shed-box').expect(204);
    await ask.delete('/api/cell-types/shed-box').expect(404);
  });

  test('one that a prop or a swap names cannot be removed', async () => {
    const rig = await aRig();
    await rig.ask
      .post('/api/cell-types')
      .send({ id: 'spring-AA', kind: 'alkaline', capacityMah: 2000, nominalVolts: 1.5, massG: 23 })
      .expect(201);
    const { prop } = await aSiteWithProp(rig, { cellTypeId: 'spring-AA' });
    await rig.ask.delete('/api/cell-types/spring-AA').expect(409);
    await rig.ask.patch(`/api/props/${prop.id}`).send({ cellTypeId: 'LR6' }).expect(200);
    await rig.ask.delete('/api/cell-types/spring-AA').expect(204);
  });
});

describe('props', () => {
  test('are added, read, changed and removed', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    expect(prop).toEqual({ ...aProp(site.id), id: prop.id, units: 1, importance: 'feature' });
    expect((await rig.ask.get(`/api/props/${prop.id}`).expect(200)).body).toEqual(prop);
    const changes = {
      xM: 3.5,
      trips: { perShowNight: 120, perNightOff: 2, seconds: 20, runMa: 40 },
      switching: { kind: 'interval-timer', onHours: 6, setAt: '2026-10-20T16:00:00Z' },
    };
    const changed = await rig.ask.patch(`/api/props/${prop.id}`).send(changes).expect(200);
    expect(changed.body).toEqual({ ...prop, ...changes });
    const cleared = await rig.ask.patch(`/api/props/${prop.id}`).send({ xM: null, trips: null }).expect(200);
    expect(cleared.body).toEqual({ ...prop, switching: changes.switching });
    await rig.ask.delete(`/api/props/${prop.id}`).expect(204);
    await rig.ask.get(`/api/props/${prop.id}`).expect(404);
    await rig.ask.get(`/api/props/${prop.id}/log`).expect(404);
  });

  test('are listed by tag in the order people count, in pages', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig, { tag: 'A-10' });
    await rig.ask
      .post('/api/props')
      .send(aProp(site.id, { tag: 'A-2' }))
      .expect(201);
    const all = await rig.ask.get('/api/props').query({ siteId: site.id }).expect(200);
    expect(all.body.map((prop: { tag: string }) => prop.tag)).toEqual(['A-2', 'A-10']);
    const first = await rig.ask.get('/api/props').query({ siteId: site.id, limit: 1 }).expect(200);
    const next = /<([^>]+)>; rel="next"/.exec(first.headers.link!)![1]!;
    const second = await rig.ask.get(next).expect(200);
    expect([first.body[0].tag, second.body[0].tag]).toEqual(['A-2', 'A-10']);
    expect(second.headers.link).toBeUndefined();
  });

  test('an accent is one letter however it was typed, so a tag stays unique', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig, { tag: 'Entr\u00e9e' });
    await rig.ask
      .post('/api/props')
      .send(aProp(site.id, { tag: 'Entre\u0301e ' }))
      .expect(409);
  });
});

describe('log', () => {
  test('swaps and sightings come newest first; an undo leaves a trace', async () => {
    const rig = await aRig();
    const { prop } = await aSiteWithProp(rig);
    const swap = {
      at: '2026-10-17T15:00:00Z',
      state: 'new',
      cellTypeId: 'FR6',
      oldSet: 'dim',
      note: 'lid stiff',
    };
    const swapped = await rig.ask.post(`/api/props/${prop.id}/swaps`).send(swap).expect(201);
    expect(swapped.body).toEqual({
      ...swap,
      kind: 'swap',
      id: swapped.body.id,
      propId: prop.id,
      recordedAt: '2026-10-22T09:00:00Z',
    });
    const sighting = { at: '2026-10-21T20:10:00+01:00', seen: 'bright', volts: 4.1, taken: 'lit' };
    const seen = await rig.ask.post(`/api/props/${prop.id}/sightings`).send(sighting).expect(201);
    expect(seen.body).toMatchObject({ ...sighting, at: '2026-10-21T19:10:00Z', kind: 'sighting' });
    expect((await rig.ask.get(seen.headers.location!).expect(200)).body).toEqual(seen.body);
    const log = `/api/props/${prop.id}/log`;
    expect((await rig.ask.get(log).expect(200)).body).toEqual([seen.body, swapped.body]);

    rig.clock.set(Date.UTC(2026, 9, 22, 10));
    const undone = await rig.ask.delete(`${log}/${swapped.body.id}`).expect(200);
    expect(undone.body).toEqual({ ...swapped.body, undoneAt: '2026-10-22T10:00:00Z' });
    rig.clock.set(Date.UTC(2026, 9, 22, 11));
    expect((await rig.ask.delete(`${log}/${swapped.body.id}`).expect(200)).body).toEqual(undone.body);
    expect((await rig.ask.get(log).expect(200)).body).toEqual([seen.body]);
    expect((await rig.ask.get(log).query({ undone: true }).expect(200)).body).toEqual([
      seen.body,
      undone.body,
    ]);
  });

  test('pages of a log neither repeat nor lose an entry of the same moment', async () => {
    const rig = await aRig();
    const { prop } = await aSiteWithProp(rig);
    const ids: string[] = [];
    for (let count = 0; count < 5; count += 1) {
      const seen = { at: '2026-10-20T19:00:00Z', seen: 'bright' };
      ids.push((await rig.ask.post(`/api/props/${prop.id}/sightings`).send(seen).expect(201)).body.id);
    }
    const paged: string[] = [];
    let next: string | undefined = `/api/props/${prop.id}/log?limit=2`;
    while (next) {
      const page: { body: { id: string }[]; headers: Record<string, string> } = await rig.ask
        .get(next)
        .expect(200);
      paged.push(...page.body.map((entry) => entry.id));
      next = page.headers.link?.match(/<([^>]+)>; rel="next"/)?.[1];
    }
    expect(paged).toHaveLength(5);
    expect(new Set(paged)).toEqual(new Set(ids));
  });

  test("an entry of another prop is nobody's business here", async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    const other = (
      await rig.ask
        .post('/api/props')
        .send(aProp(site.id, { tag: 'C-03' }))
        .expect(201)
    ).body;
    const seen = { at: '2026-10-20T19:00:00Z', seen: 'odd' };
    const { id } = (await rig.ask.post(`/api/props/${prop.id}/sightings`).send(seen).expect(201)).body;
    await rig.ask.delete(`/api/props/${other.id}/log/${id}`).expect(404);
    await rig.ask.get(`/api/props/${prop.id}/log/${id}`).expect(200);
  });
});

describe('calendar links', () => {
  test('the secret is told once, and only its hash is kept', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const links = `/api/sites/${site.id}/calendar-links`;
    const made = await rig.ask.post(links).send({ label: 'Ann’s phone', alarms: true }).expect(201);
    const secret = /^http:\/\/127\.0\.0\.1:\d+\/calendars\/([\w-]{43})\.ics$/.exec(made.body.url)![1]!;
    const listed = (await rig.ask.get(links).expect(200)).body;
    expect(listed).toEqual([
      {
        id: made.body.id,
        label: 'Ann’s phone',
        alarms: true,
        createdAt: '2026-10-22T09:00:00Z',
        lastReadAt: null,
      },
    ]);
    expect(dumpOf(rig.store)).not.toContain(secret);
    await rig.ask.delete(`${links}/${made.body.id}`).expect(204);
    expect((await rig.ask.get(links).expect(200)).body).toEqual([]);
    await rig.ask.delete(`${links}/${made.body.id}`).expect(404);
  });

  test('the address opens the calendar until it is revoked', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    await rig.ask
      .post(`/api/props/${prop.id}/swaps`)
      .send({ at: '2026-10-18T15:00:00Z', state: 'new' })
      .expect(201);
    const made = await rig.ask.post(`/api/sites/${site.id}/calendar-links`).send({}).expect(201);
    const feed = new URL(made.body.url).pathname;
    const calendar = await rig.ask.get(feed).buffer(true).expect(200);
    expect(calendar.text).toMatch(/^BEGIN:VCALENDAR\r\n[\s\S]*C-02[\s\S]*END:VCALENDAR\r\n$/);
    await rig.ask.get(feed).set('if-none-match', calendar.headers.etag!).expect(304);
    const [link] = (await rig.ask.get(`/api/sites/${site.id}/calendar-links`).expect(200)).body;
    expect(link.lastReadAt).toBe('2026-10-22T09:00:00Z');
    await rig.ask.delete(`/api/sites/${site.id}/calendar-links/${made.body.id}`).expect(204);
    await rig.ask.get(feed).set('if-none-match', calendar.headers.etag!).expect(404);
  });

  test('an empty request will do', async () => {
    const rig = await aRig({ publicUrl: 'https://lights.example.org/walk' });
    const { site } = await aSiteWithProp(rig);
    const made = await rig.ask.post(`/api/sites/${site.id}/calendar-links`).expect(201);
    expect(made.body.url).toMatch(/^https:\/\/lights\.example\.org\/walk\/calendars\/[\w-]{43}\.ics$/);
  });
});

describe('forecasts', () => {
  test('a site forecast is not sent again while nothing changed', async () => {
    const rig = await aRig();
    const { site, prop } = await aSiteWithProp(rig);
    const address = `/api/sites/${site.id}/forecast`;
    const first = await rig.ask.get(address).expect(200);
    expect(first.body.props.map((row: { propId: string }) => row.propId)).toEqual([prop.id]);
    const etag = first.headers.etag!;
    const again = await rig.ask
      .get(address)
      .set('if-none-match', `"other", ${etag.replace('W/', '')}`)
      .expect(304);
    expect(again.text).toBe('');
    expect(again.headers.etag).toBe(etag);
    await rig.ask
      .post(`/api/props/${prop.id}/swaps`)
      .send({ at: '2026-10-21T15:00:00Z', state: 'new' })
      .expect(201);
    const changed = await rig.ask.get(address).set('if-none-match', etag).expect(200);
    expect(changed.headers.etag).not.toBe(etag);
    expect(changed.body.props[0].swapBy).not.toEqual(first.body.props[0].swapBy);
  });

  test('a site can be looked at as of another day', async () => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const then = await rig.ask
      .get(`/api/sites/${site.id}/forecast?asOf=2026-10-10T12:30:00%2B01:00`)
      .expect(200);
    expect(then.body).toMatchObject({ asOf: '2026-10-10T11:30:00Z', evening: '2026-10-10' });
    // After midnight it is still the evening before.
    const late = await rig.ask.get(`/api/sites/${site.id}/forecast?asOf=2026-10-10T01:00:00Z`).expect(200);
    expect(late.body.evening).toBe('2026-10-09');
  });

  test('a prop forecast names its nights through the evening asked for', async () => {
    const rig = await aRig();
    const { prop } = await aSiteWithProp(rig);
    await rig.ask
      .post(`/api/props/${prop.id}/swaps`)
      .send({ at: '2026-10-21T15:00:00Z', state: 'new' })
      .expect(201);
    const forecast = await rig.ask.get(`/api/props/${prop.id}/forecast?through=2026-10-30`).expect(200);
    expect(forecast.body.fittedAt).toBe('2026-10-21T15:00:00Z');
    expect(forecast.body.nights.at(-1).evening).toBe('2026-10-30');
  });
});

test('health tells the version, the schema, and whether the clock stands still', async () => {
  const { ask, store } = await aRig();
  expect((await ask.get('/api/health').expect(200)).body).toEqual({
    status: 'ok',
    version: expect.stringMatching(/^\d+\.\d+\.\d+/),
    schemaVersion: store.schemaVersion,
    timeZoneData: process.versions.tz,
    asOf: '2026-10-22T09:00:00Z',
  });
});
