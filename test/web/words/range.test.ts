import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dimWords, movedWords, rangeWords, swapByWords } from '../../../web/words/range.ts';
import { addDays } from '../../../web/words/time.ts';

const TONIGHT = '2026-10-20';
const range = (early: string | null, late: string | null) => ({ early, likely: early, late });

describe('ranges of evenings', () => {
  // The wording is ours; the first row is the pattern the people asked for: a range, never one bare date.
  it.each([
    [range('2026-10-22', '2026-10-24'), 'Thu 22 – Sat 24 Oct'],
    [range('2026-10-30', '2026-11-02'), 'Fri 30 Oct – Mon 2 Nov'],
    [range('2026-11-02', null), 'Mon 2 Nov or later'],
    [range(null, null), 'not this season'],
    [range('2026-10-18', '2026-10-22'), 'tonight – Thu 22 Oct'],
    [range('2026-10-18', '2026-10-20'), 'tonight, if not already'],
    [range('2026-10-15', '2026-10-18'), 'already'],
    [range('2026-10-15', null), 'any night from tonight'],
    [range('2026-10-22', '2026-10-22'), 'Thu 22 Oct, give or take a night'],
  ])('%j reads “%s”', (given, words) => {
    expect(rangeWords(given, TONIGHT)).toBe(words);
  });

  it('is never one bare date', () => {
    const days = fc.option(fc.integer({ min: -30, max: 60 }), { nil: null });
    fc.assert(
      fc.property(days, days, (one, other) => {
        const [early, late] =
          one === null ? [null, null] : [one, other === null ? null : Math.max(one, other)];
        const evening = (day: number | null) => (day === null ? null : addDays(TONIGHT, day));
        expect(rangeWords(range(evening(early), evening(late)), TONIGHT)).not.toMatch(/^\w{3} \d+ \w{3}$/);
      }),
    );
  });

  it('says what a deed changed', () => {
    const before = range('2026-10-22', '2026-10-24');
    const after = range('2026-11-02', null);
    expect(movedWords({ before, after, tonight: TONIGHT })).toBe(
      'Dim: was Thu 22 – Sat 24 Oct, now Mon 2 Nov or later.',
    );
    expect(movedWords({ before, after: before, tonight: TONIGHT })).toBe('Dim: still Thu 22 – Sat 24 Oct.');
    expect(movedWords({ before: null, after: before, tonight: TONIGHT })).toContain('was not known');
  });

  it('says by when', () => {
    expect(swapByWords(null, TONIGHT)).toBe('no swap needed');
    expect(swapByWords(TONIGHT, TONIGHT)).toBe('swap by tonight');
    expect(swapByWords('2026-10-18', TONIGHT)).toBe('swap was due by Sun 18 Oct');
    expect(swapByWords('2026-10-24', TONIGHT)).toBe('swap by Sat 24 Oct');
    expect(dimWords(range(null, null), TONIGHT)).toBe('bright to the end of the season');
  });
});
