import { describe, expect, it } from 'vitest';
import type { LogEntry, Sighting, Swap } from '../../server/model/log-entry.ts';
import { setInUse } from '../../server/model/set-in-use.ts';
import { manyProps } from '../rig/many-props.ts';

const prop = { ...manyProps(1)[0]!, units: 1, series: 3, parallel: 1, cellTypeId: 'LR6' };
const swap = (at: number, more: Partial<Swap> = {}): LogEntry => ({
  kind: 'swap',
  id: `s${at}`,
  propId: prop.id,
  at,
  recordedAt: at,
  state: 'new',
  ...more,
});
const seen = (at: number, what: Sighting['seen']): LogEntry => ({
  kind: 'sighting',
  id: `v${at}`,
  propId: prop.id,
  at,
  recordedAt: at,
  seen: what,
});

describe('the set in use', () => {
  it('is none before anything went in', () => {
    expect(setInUse(prop, [], 10)).toBeNull();
    expect(setInUse(prop, [seen(3, 'dark')], 10)).toBeNull();
    expect(setInUse(prop, [swap(11)], 10)).toBeNull();
  });
  it('is the last whole swap by that moment', () => {
    const set = setInUse(prop, [swap(1), swap(5, { cellTypeId: 'FR6' }), swap(20)], 10)!;
    expect(set).toMatchObject({
      fittedAt: 5,
      poweredAt: 5,
      cellTypeId: 'FR6',
      leftShare: 1,
      healthShare: 1,
      partBatch: null,
    });
  });
  it('keeps what a part-used set had left, and says when nobody knows', () => {
    expect(setInUse(prop, [swap(1, { state: 'part-used', leftShare: 0.6 })], 10)!.leftShare).toBe(0.6);
    expect(setInUse(prop, [swap(1, { state: 'part-used' })], 10)!.leftShare).toBeNull();
  });
  it('follows the oldest cells when only some are changed, and a timer from when they were out', () => {
    const set = setInUse(prop, [swap(1), swap(5, { cells: 2 })], 10)!;
    expect(set).toMatchObject({
      fittedAt: 1,
      poweredAt: 5,
      partBatch: { newCells: 2, ofCells: 3 },
      mixedKinds: false,
    });
    expect(setInUse(prop, [swap(1), swap(5, { cells: 2, cellTypeId: 'R6' })], 10)!.mixedKinds).toBe(true);
    expect(setInUse(prop, [swap(1), swap(5, { cells: 2 }), swap(7)], 10)).toMatchObject({
      fittedAt: 7,
      partBatch: null,
    });
  });
  it('says of a first swap too that it was not whole', () => {
    expect(setInUse(prop, [swap(5, { cells: 2 })], 10)).toMatchObject({
      fittedAt: 5,
      partBatch: { newCells: 2, ofCells: 3 },
    });
  });
  it('takes a set for failing until it is swapped or seen bright; an odd look takes nothing back', () => {
    const failing = (...log: LogEntry[]) => setInUse(prop, log, 10)!.failing?.seen ?? null;
    expect(failing(swap(1), seen(3, 'dark'))).toBe('dark');
    expect(failing(swap(1), seen(3, 'dark'), seen(4, 'odd'))).toBe('dark');
    expect(failing(swap(1), seen(3, 'dark'), seen(4, 'bright'))).toBeNull();
    expect(failing(swap(1), seen(3, 'dark'), swap(5))).toBeNull();
  });
  it('remembers the last thing seen of this set, not of the one before', () => {
    expect(setInUse(prop, [swap(1), seen(3, 'dim')], 10)!.lastSeen).toEqual({ seen: 'dim', at: 3 });
    expect(setInUse(prop, [swap(1), seen(3, 'dim'), swap(5)], 10)!.lastSeen).toBeNull();
    expect(setInUse(prop, [swap(1), seen(3, 'dim'), seen(4, 'bright')], 10)!.lastSeen!.seen).toBe('bright');
  });
});
