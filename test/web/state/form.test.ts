import { describe, expect, it } from 'vitest';
import { sortFaults } from '../../../web/state/form.ts';

const problem = (errors: { field: string; message: string }[]) => ({
  title: 'Some fields need another look',
  status: 400,
  detail: 'Two fields were refused.',
  code: 'invalid',
  errors,
});

describe('sentences of the server find their field', () => {
  it.each(['load.peakMa', '/load/peakMa'])('by path %s', (field) => {
    const { faults } = sortFaults(problem([{ field, message: 'too much' }]), ['load.peakMa']);
    expect(faults).toEqual({ 'load.peakMa': 'too much' });
  });

  it.each(['monthlyMinC[3]', 'monthlyMinC.3', '/monthlyMinC/3'])('within a row of twelve: %s', (field) => {
    const { faults } = sortFaults(problem([{ field, message: 'too warm' }]), ['monthlyMinC.3']);
    expect(faults).toEqual({ 'monthlyMinC.3': 'too warm' });
  });

  it('and go to the top when their field is not on the form: nothing is refused in silence', () => {
    const { faults, trouble } = sortFaults(problem([{ field: 'siteId', message: 'gone' }]), ['tag']);
    expect(faults).toEqual({});
    expect(trouble).toBe('siteId: gone');
    expect(sortFaults(problem([]), []).trouble).toBe('Two fields were refused.');
  });
});
