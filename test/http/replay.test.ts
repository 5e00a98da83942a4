import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { expect, onTestFinished, test } from 'vitest';
import { openStore } from '../../server/store/open.ts';
import { aSiteWithProp } from '../rig/a-site.ts';
import { aRig, dumpOf, type Rig } from '../rig/build-app.ts';

const SWAP = { at: '2026-10-21T15:00:00Z', state: 'new', cells: 3 };

const swapWith = (rig: Rig, propId: string, key: string, body: object = SWAP) =>
  rig.ask.post(`/api/props/${propId}/swaps`).set('idempotency-key', key).send(body);

const entriesOf = async (rig: Rig, propId: string) =>
  (await rig.ask.get(`/api/props/${propId}/log`).expect(200)).body;

test('eight tries at once are one swap, and all get its answer', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  await rig.app.listen({ port: 0, host: '127.0.0.1' });
  const answers = await Promise.all(Array.from({ length: 8 }, () => swapWith(rig, prop.id, 'phone-1')));
  expect(answers.map((answer) => answer.status)).toEqual(Array(8).fill(201));
  expect(new Set(answers.map((answer) => answer.text)).size).toBe(1);
  expect(new Set(answers.map((answer) => answer.headers.location)).size).toBe(1);
  expect(answers.filter((answer) => answer.headers['idempotency-replayed'] === 'true')).toHaveLength(7);
  expect(await entriesOf(rig, prop.id)).toHaveLength(1);
});

test('without a key two requests are two swaps', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  await rig.ask.post(`/api/props/${prop.id}/swaps`).send(SWAP).expect(201);
  const second = await rig.ask.post(`/api/props/${prop.id}/swaps`).send(SWAP).expect(201);
  expect(second.body.hints).toContainEqual(expect.stringContaining('Two swaps of C-02'));
  expect(await entriesOf(rig, prop.id)).toHaveLength(2);
});

test('a replay is answered the same whatever has happened since', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  const first = await swapWith(rig, prop.id, 'k').expect(201);
  await rig.ask.delete(first.headers.location!).expect(200);
  rig.clock.set(Date.UTC(2026, 10, 2));
  await rig.ask.delete(`/api/props/${prop.id}`).expect(204);
  const before = dumpOf(rig.store);
  const again = await swapWith(rig, prop.id, 'k', { cells: 3, state: 'new', at: SWAP.at }).expect(201);
  expect(again.text).toBe(first.text);
  expect(dumpOf(rig.store)).toBe(before);
});

test('the same key with another body is 422, and is another key on another prop or deed', async () => {
  const rig = await aRig();
  const { site, prop } = await aSiteWithProp(rig);
  await swapWith(rig, prop.id, 'k').expect(201);
  const differs = await swapWith(rig, prop.id, 'k', { ...SWAP, cells: 2 }).expect(422);
  expect(differs.body).toMatchObject({ code: 'replay-differs', errors: [{ field: 'Idempotency-Key' }] });
  expect(await entriesOf(rig, prop.id)).toHaveLength(1);
  const seen = { at: SWAP.at, seen: 'bright' };
  await rig.ask.post(`/api/props/${prop.id}/sightings`).set('idempotency-key', 'k').send(seen).expect(201);
  const { tag: _, id: __, ...rest } = prop;
  const other = await rig.ask
    .post('/api/props')
    .send({ ...rest, siteId: site.id, tag: 'C-03' })
    .expect(201);
  await swapWith(rig, other.body.id, 'k').expect(201);
});

test('a refused try leaves its key free', async () => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  await swapWith(rig, prop.id, 'k', { ...SWAP, cells: 40 }).expect(400);
  await swapWith(rig, prop.id, 'k').expect(201);
});

test.each(['x'.repeat(256), 'caf\u00e9', '\t'])('the key %j is refused', async (key) => {
  const rig = await aRig();
  const { prop } = await aSiteWithProp(rig);
  const answer = await swapWith(rig, prop.id, Buffer.from(key, 'latin1').toString('latin1'));
  expect(answer.status).toBe(400);
  expect(await entriesOf(rig, prop.id)).toHaveLength(0);
});

test('a replay after a restart still gets the first answer', async () => {
  const folder = mkdtempSync(join(tmpdir(), 'replay-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  const file = join(folder, 'x.db');
  const first = await aRig({ store: openStore(file) });
  const { prop } = await aSiteWithProp(first);
  const answer = await swapWith(first, prop.id, 'late phone').expect(201);
  await first.app.close();
  first.store.close();
  const second = await aRig({ store: openStore(file), at: Date.UTC(2026, 10, 20) });
  const again = await swapWith(second, prop.id, 'late phone').expect(201);
  expect(again.text).toBe(answer.text);
  expect(again.headers['idempotency-replayed']).toBe('true');
  expect(await entriesOf(second, prop.id)).toHaveLength(1);
});
