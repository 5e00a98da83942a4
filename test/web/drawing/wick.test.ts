import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { STRANDS, type WickValues, wickGeometry } from '../../../web/drawing/wick.ts';
import { wickOfProp } from '../../../web/drawing/wick-of-prop.ts';
import { WICK } from './made-up.ts';

// Checked against what a wick means: lit length = share left, hatched = where it looks dim, a frayed end for the range.
const nights = fc.option(fc.integer({ min: -20, max: 200 }), { nil: null });
const someValues: fc.Arbitrary<WickValues> = fc.record({
  leftShare: fc.option(fc.double({ min: 0, max: 1, noNaN: true }), { nil: null }),
  dim: fc.record({ earlyNights: nights, likelyNights: nights, lateNights: nights }),
  darkLikelyNights: nights,
  roundNights: nights,
  coldOut: fc.boolean(),
});

describe('a wick', () => {
  it('ends in the middle of its strands at the share left', () => {
    const geometry = wickGeometry(WICK)!;
    expect(geometry.strandShares[(STRANDS - 1) / 2]).toBeCloseTo(0.6, 10);
    expect(geometry.hatchedFrom).toBeCloseTo(0.6, 10);
  });

  it('turns nights into lengths at the pace of the set: 0.6 left in 6 nights is 0.1 a night', () => {
    const geometry = wickGeometry(WICK)!;
    expect(geometry.hatchedThrough).toBeCloseTo(0.8, 10);
    expect(geometry.roundShare).toBeCloseTo(0.2, 10);
    // Fifths of the range, middles: 10 % lies a fifth of the way from early (0.4) to likely (0.6).
    expect(geometry.strandShares[0]).toBeCloseTo(0.44, 10);
    expect(geometry.strandShares[STRANDS - 1]).toBeCloseTo(0.84, 10);
  });

  it('is nothing to draw when nobody knows what is left', () => {
    expect(wickGeometry({ ...WICK, leftShare: null })).toBeNull();
  });

  it('frays in order, hatches behind the lit part, and stays on its paper, whatever it is given', () => {
    fc.assert(
      fc.property(someValues, (values) => {
        const geometry = wickGeometry(values);
        expect(geometry === null).toBe(values.leftShare === null);
        if (!geometry) return;
        const { strandShares, hatchedFrom, hatchedThrough } = geometry;
        strandShares.slice(1).forEach((share, rank) => {
          expect(share).toBeGreaterThanOrEqual(strandShares[rank]! - 1e-9);
        });
        expect(hatchedThrough).toBeGreaterThanOrEqual(hatchedFrom);
        for (const share of [...strandShares, hatchedFrom, hatchedThrough]) {
          expect(share).toBeGreaterThanOrEqual(0);
          expect(share).toBeLessThanOrEqual(1.2);
        }
      }),
    );
  });
});

describe('a wick of a prop', () => {
  const none = { early: null, likely: null, late: null };
  const prop = {
    leftShare: 0,
    dim: { early: '2026-10-18', likely: '2026-10-19', late: '2026-10-19' },
    dark: { early: '2026-10-19', likely: '2026-10-20', late: '2026-10-21' },
    cause: 'used-up' as const,
    lastSeen: null,
  };
  const moment = { tonight: '2026-10-22', nextRound: '2026-10-24' };

  it('counts nights from tonight', () => {
    const values = wickOfProp({ ...prop, dark: none }, moment);
    expect(values.dim).toEqual({ earlyNights: -4, likelyNights: -3, lateNights: -3 });
    expect(values.roundNights).toBe(2);
    expect(values.darkLikelyNights).toBeNull();
  });

  it('believes whoever saw it dim over a sum that has it dark', () => {
    expect(wickOfProp(prop, moment).darkLikelyNights).toBe(-2);
    expect(wickOfProp({ ...prop, lastSeen: 'dim' }, moment).darkLikelyNights).toBeNull();
  });

  it('knows a light the cold put out', () => {
    expect(wickOfProp({ ...prop, cause: 'cold' }, moment).coldOut).toBe(true);
    expect(wickOfProp({ ...prop, cause: 'cold', dark: none }, moment).coldOut).toBe(false);
  });
});
