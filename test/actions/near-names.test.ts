import { describe, expect, test } from 'vitest';
import { didYouMean, nearNames } from '../../server/actions/near-names.ts';
import { tidyText } from '../../server/actions/tidy-text.ts';

describe('near names', () => {
  const fields = ['meanMa', 'lowMa', 'peakMa', 'standbyMa', 'wave'];

  test.each([
    ['peakma', 'peakMa'],
    ['peakmA', 'peakMa'],
    ['paekMa', 'peakMa'],
    ['standbyMah', 'standbyMa'],
    ['mean', 'meanMa'],
    ['waves', 'wave'],
  ])('%s is %s', (typed, meant) => {
    expect(nearNames(typed, fields, 1)).toEqual([meant]);
  });

  test('what is far from all of them is no guess', () => {
    expect(nearNames('colour', fields)).toEqual([]);
    expect(nearNames('', fields)).toEqual([]);
  });

  test('become a question', () => {
    expect(didYouMean([])).toBe('');
    expect(didYouMean(['a'])).toBe(' Did you mean "a"?');
    expect(didYouMean(['a', 'b', 'c'])).toBe(' Did you mean "a", "b" or "c"?');
  });

  test('are found in time for any text', () => {
    const startedAt = performance.now();
    nearNames('x'.repeat(100_000), Intl.supportedValuesOf('timeZone'));
    expect(performance.now() - startedAt).toBeLessThan(1000);
  });
});

test('text is kept without blanks around it and with accents composed, never longer than typed', () => {
  expect(tidyText('  a  b\n')).toBe('a  b');
  expect(tidyText('e\u0301')).toBe('\u00e9');
  // Source: Unicode composition exclusions: U+0958 would become two letters.
  expect(tidyText('\u0958')).toBe('\u0958');
});
