import { expect, test } from 'vitest';
import { keptBodies } from '../../server/http/kept-bodies.ts';
import { aSiteWithProp } from '../rig/a-site.ts';
import { aRig } from '../rig/build-app.ts';

test('bodies are kept up to a length in all, and the longest unused goes first', () => {
  const kept = keptBodies(10);
  const written: string[] = [];
  const ask = (mark: string, length: number) =>
    kept.bodyOf(mark, () => {
      written.push(mark);
      return mark.repeat(length);
    });
  for (const mark of ['a', 'b', 'a']) expect(ask(mark, 5)).toBe(mark.repeat(5));
  expect(written).toEqual(['a', 'b']);
  // Only one of the two has room beside c; a was asked for last.
  ask('c', 5);
  ask('a', 5);
  ask('b', 5);
  expect(written).toEqual(['a', 'b', 'c', 'b']);
  // Longer than everything kept: it is given all the same, and nothing else stays.
  expect(ask('d', 20)).toBe('d'.repeat(20));
  ask('a', 5);
  expect(written).toEqual(['a', 'b', 'c', 'b', 'd', 'a']);
});

test('a forecast is of the moment its mark is of, though a quarter of an hour ends while it is made', async () => {
  const rig = await aRig();
  const { site } = await aSiteWithProp(rig);
  const shown = Date.UTC(2026, 9, 22, 9, 14, 59);
  let asked = 0;
  // From the second time it is asked on, the clock is past the quarter.
  rig.clock.now = () => shown + (asked++ === 0 ? 0 : 2000);
  const first = await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
  expect(first.body.asOf).toBe('2026-10-22T09:00:00Z');
  rig.clock.now = () => shown;
  const again = await rig.ask.get(`/api/sites/${site.id}/forecast`).expect(200);
  expect([again.headers.etag, again.text]).toEqual([first.headers.etag, first.text]);
});
