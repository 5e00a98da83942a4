import { expect, test } from 'vitest';
import { A_SITE, aProp, aSiteWithProp } from '../rig/a-site.ts';
import { aRig } from '../rig/build-app.ts';

test('a Location is an address that answers; a calendar link, told in its body alone, has none', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  const own = { id: 'shed-box', kind: 'zinc-carbon', capacityMah: 900, nominalVolts: 1.5, massG: 16 };
  const added = await rig.ask.post('/api/cell-types').send(own).expect(201);
  expect((await rig.ask.get(added.headers.location!).expect(200)).body).toEqual(added.body);
  expect((await rig.ask.get('/api/cell-types/LR6').expect(200)).body).toMatchObject({ builtIn: true });
  await rig.ask.get('/api/cell-types/LR66').expect(404);
  const made = await rig.ask.post(`/api/sites/${site.id}/calendar-links`).send({}).expect(201);
  expect(made.headers.location).toBeUndefined();
});

test('a page that follows an entry no longer in the list says so, in every list alike', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  const other = (await rig.ask.post('/api/sites').send(A_SITE).expect(201)).body;
  const elsewhere = (await rig.ask.post('/api/props').send(aProp(other.id)).expect(201)).body;
  const seen = { at: '2026-10-21T19:00:00Z', seen: 'bright' };
  const entry = (await rig.ask.post(`/api/props/${elsewhere.id}/sightings`).send(seen).expect(201)).body;
  const pages: [list: string, after: string][] = [
    ['/api/sites?', 'gone'],
    [`/api/props?siteId=${site.id}&`, 'gone'],
    [`/api/props?siteId=${site.id}&`, elsewhere.id],
    [`/api/props/${prop.id}/log?`, 'gone'],
    [`/api/props/${prop.id}/log?`, entry.id],
  ];
  for (const [list, after] of pages) {
    const { body } = await rig.ask.get(`${list}limit=1&after=${after}`).expect(400);
    expect(body.errors).toEqual([{ field: 'after', message: expect.stringContaining('Start it again') }]);
  }
  const undone = `/api/props/${elsewhere.id}/log`;
  await rig.ask.delete(`${undone}/${entry.id}`).expect(200);
  expect((await rig.ask.get(`${undone}?after=${entry.id}`).expect(200)).body).toEqual([]);
});
