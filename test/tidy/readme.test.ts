import { readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, it } from 'vitest';
import { demoDeps } from '../../seed-demo/deps.ts';
import { DEMO_AS_OF, playSeason } from '../../seed-demo/season.ts';
import { BUILT_IN_CELL_TYPES } from '../../server/model/cell-types-built-in.ts';
import { parseInstant } from '../../server/model/evening.ts';
import { aRig } from '../rig/build-app.ts';
import { ROOT } from './source-files.ts';

const readme = readFileSync(path.join(ROOT, 'README.md'), 'utf8');

it('shows the answer the demo really gives', async () => {
  const [, address] = readme.match(/curl http:\/\/127\.0\.0\.1:4680(\S+)/)!;
  const [, shown] = readme.match(/```json\n([\s\S]+?)```/)!;
  const rig = await aRig({ at: parseInstant(DEMO_AS_OF)! });
  playSeason({ ...demoDeps(rig.store) });
  rig.clock.set(parseInstant(DEMO_AS_OF)!);
  const { body } = await rig.ask.get(address!).expect(200);
  expect(body).toMatchObject(JSON.parse(shown!));
});

it('counts the cell types it has', () => {
  const kinds = new Set(BUILT_IN_CELL_TYPES.map(({ kind }) => kind));
  expect(readme).toContain(`${BUILT_IN_CELL_TYPES.length} types of nine chemistries`);
  expect(kinds.size).toBe(9);
});
