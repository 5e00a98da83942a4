import { describe, expect, test } from 'vitest';
import { aSiteWithProp } from '../rig/a-site.ts';
import { aRig } from '../rig/build-app.ts';

describe('a broken upload', () => {
  const form = 'multipart/form-data';
  test.each([
    [form, 'zz'],
    [
      `${form}; boundary=b`,
      '--b\r\nContent-Disposition: form-data; name="file"; filename="a.csv"\r\n\r\ntime,te',
    ],
    [`${form}; boundary=b`, 'garbage'],
    [`${form}; boundary=${'b'.repeat(400)}`, '--b'],
  ])('is told in a sentence, not as a fault of the server: %s', async (type, body) => {
    const rig = await aRig();
    const { site } = await aSiteWithProp(rig);
    const answer = await rig.ask.post(`/api/sites/${site.id}/weather`).set('content-type', type).send(body);
    expect(answer.status).toBe(400);
    expect(answer.body.errors[0].field).toBe('file');
  });
});

test('an own block made of several cells is one: nine volts of alkaline are six', async () => {
  const rig = await aRig();
  const block = { id: 'own-9v', kind: 'alkaline', capacityMah: 550, nominalVolts: 9, massG: 46 };
  const made = await rig.ask.post('/api/cell-types').send(block).expect(201);
  expect(made.body.cellsInside).toBe(6);
  const { prop } = await aSiteWithProp(rig, {
    cellTypeId: 'own-9v',
    series: 1,
    dimVolts: 6.6,
    load: { behaviour: 'steady', meanMa: 12, standbyMa: 0 },
  });
  await rig.ask
    .post(`/api/props/${prop.id}/swaps`)
    .send({ at: '2026-10-21T15:00:00Z', state: 'new' })
    .expect(201);
  const { body } = await rig.ask.get(`/api/props/${prop.id}/forecast`).expect(200);
  expect(body.usableMah.at20C).toBeGreaterThan(300);
  expect(body.why.warnings).toEqual([]);
});

test('gate hours the wrong way round are asked about; past midnight is fine', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  const put = (opensAt: string, closesAt: string) =>
    rig.ask.put(`/api/sites/${site.id}/show-nights`).send([{ evening: '2026-10-24', opensAt, closesAt }]);
  const swapped = await put('21:30', '18:30').expect(400);
  expect(swapped.body.errors).toEqual([
    { field: '0.closesAt', message: expect.stringContaining('swapped?') },
  ]);
  await put('18:30', '00:30').expect(200);
});

test('a forecast runs to an evening to come, not to one gone by or out of sight', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  for (const through of ['2026-01-05', '2036-01-05']) {
    const { body } = await rig.ask.get(`/api/props/${prop.id}/forecast`).query({ through }).expect(400);
    expect(body.errors[0].field).toBe('through');
  }
});

test('a moment without its zone, or cut short, is told as such', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  const said = async (at: string) =>
    (await rig.ask.post(`/api/props/${prop.id}/swaps`).send({ at, state: 'new' }).expect(400)).body.errors[0]
      .message;
  expect(await said('2026-10-21T16:00:00')).toMatch(/Z or an offset/);
  expect(await said('2026-10-21')).toMatch(/too short/);
});

test('seen dark, a prop is not bright from that evening on; an odd look takes nothing back, a bright one does', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  const post = (path: string, body: object) =>
    rig.ask.post(`/api/props/${prop.id}/${path}`).send(body).expect(201);
  const line = async () => (await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200)).body.props[0];
  const tonight = async () => {
    const { body } = await rig.ask.get(`/api/props/${prop.id}/forecast`).expect(200);
    return body.nights.find(({ evening }: { evening: string }) => evening === '2026-10-22');
  };
  await post('swaps', { at: '2026-10-20T15:00:00Z', state: 'new' });
  expect((await line()).group).toBe('fine');
  await post('sightings', { at: '2026-10-21T19:00:00Z', seen: 'dark' });
  expect(await tonight()).toMatchObject({ chanceBright: 0, chanceLit: 0 });
  expect(await line()).toMatchObject({ group: 'at-risk', swapBy: '2026-10-22', chanceBrightToNextRound: 0 });
  await post('sightings', { at: '2026-10-21T19:30:00Z', seen: 'odd' });
  expect((await line()).group).toBe('at-risk');
  await post('sightings', { at: '2026-10-21T20:00:00Z', seen: 'bright' });
  expect((await line()).group).toBe('fine');
  expect((await tonight()).chanceBright).toBeGreaterThan(0.9);
});
