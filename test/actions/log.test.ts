import { describe, expect, test } from 'vitest';
import { addProp } from '../../server/actions/add-prop.ts';
import { recordSighting } from '../../server/actions/record-sighting.ts';
import { type NewSwap, recordSwap } from '../../server/actions/record-swap.ts';
import { undoEntry } from '../../server/actions/undo-entry.ts';
import type { Prop } from '../../server/model/prop.ts';
import { siteRevision } from '../../server/store/sites.ts';
import { aProp } from '../rig/a-site.ts';
import { NOW } from '../rig/build-app.ts';
import { aSiteIn, someDeps } from '../rig/deps.ts';

function aPropIn(changes: Partial<Prop> = {}) {
  const deps = someDeps();
  const site = aSiteIn(deps);
  const prop = addProp(deps, { ...(aProp(site.id) as Prop), ...changes });
  const swap = (more: Partial<NewSwap> = {}) =>
    recordSwap(deps, { propId: prop.id, at: NOW, state: 'new', ...more });
  return { deps, site, prop, swap };
}

describe('hints at a swap', () => {
  test('an ordinary swap has none', () => {
    expect(aPropIn().swap().hints).toEqual([]);
    expect(aPropIn({ units: 2 }).swap({ cells: 6 }).hints).toEqual([]);
  });

  test('an interval timer starts with its cells, by the clocks of the site', () => {
    const { swap } = aPropIn({ switching: { kind: 'interval-timer', onHours: 6 } });
    // 13:20 UTC is 14:20 in Britain until 25 October 2026.
    const { hints } = swap({ at: Date.UTC(2026, 9, 21, 13, 20) });
    expect(hints).toEqual([
      'This timer starts now: lit 14:20 to 20:20 each day. Switch it off and on at dusk if it should light then.',
    ]);
  });

  test('a timer set later than the swap says nothing yet', () => {
    const setAt = NOW + 3_600_000;
    expect(aPropIn({ switching: { kind: 'interval-timer', onHours: 6, setAt } }).swap().hints).toEqual([]);
  });

  test('cells left in are pointed out', () => {
    expect(aPropIn().swap({ cells: 2 }).hints).toEqual([
      expect.stringMatching(/^2 of 3 changed: the oldest cells decide/),
    ]);
  });

  test('two swaps within ten minutes may be one', () => {
    const { swap } = aPropIn();
    swap({ at: NOW - 3 * 60_000 });
    expect(swap().hints).toEqual([expect.stringMatching(/^Two swaps of C-02 3 minutes apart: one or two\?/)]);
    expect(swap({ at: NOW - 60 * 60_000 }).hints).toEqual([]);
  });

  test('an undone swap is no double', () => {
    const { deps, prop, swap } = aPropIn();
    undoEntry(deps, { propId: prop.id, entryId: swap().swap.id });
    expect(swap().hints).toEqual([]);
  });
});

test('a resting reading is kept, and said to tell little', () => {
  const { deps, prop } = aPropIn();
  const seen = { propId: prop.id, at: NOW, seen: 'bright' as const, volts: 4.35 };
  expect(recordSighting(deps, { ...seen, taken: 'resting' }).hints).toEqual([
    expect.stringContaining('4.35 V resting'),
  ]);
  expect(recordSighting(deps, { ...seen, taken: 'lit' }).hints).toEqual([]);
});

test('a day ahead passes, since phones run fast; more does not', () => {
  const { swap } = aPropIn();
  expect(swap({ at: NOW + 24 * 3_600_000 }).swap.at).toBe(NOW + 24 * 3_600_000);
  expect(() => swap({ at: NOW + 24 * 3_600_000 + 1 })).toThrow('days ahead');
});

test('each deed raises the revision once, an undo of what is undone does not', () => {
  const { deps, site, prop, swap } = aPropIn();
  const revision = () => siteRevision(deps.store.db, site.id);
  const before = revision();
  const entry = swap().swap;
  expect(revision()).toBe(before + 1);
  undoEntry(deps, { propId: prop.id, entryId: entry.id });
  expect(revision()).toBe(before + 2);
  undoEntry(deps, { propId: prop.id, entryId: entry.id });
  expect(revision()).toBe(before + 2);
  expect(() => swap({ cells: 400 })).toThrow();
  expect(revision()).toBe(before + 2);
});
