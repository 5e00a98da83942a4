import { describe, expect, it } from 'vitest';
import { addressOf, readPlace } from '../../../web/state/route.ts';

describe('addresses', () => {
  it.each([
    ['/', { page: 'tonight' }],
    ['/props', { page: 'props' }],
    ['/props/new', { page: 'new-prop' }],
    ['/props/7f', { page: 'prop', propId: '7f' }],
    ['/props/7f/change', { page: 'change-prop', propId: '7f' }],
    ['/site', { page: 'site' }],
    ['/site/new', { page: 'new-site' }],
    ['/props/7f/other', { page: 'nowhere' }],
    ['/props/7f/change/more', { page: 'nowhere' }],
    ['/elsewhere', { page: 'nowhere' }],
  ])('%s', (path, route) => {
    expect(readPlace(path).route).toEqual(route);
  });

  it('carries site and moment along, and brings them back', () => {
    const place = readPlace('/props?site=one&asOf=2026-10-22T08:00:00Z');
    const address = addressOf('/site', place);
    expect(address).toBe('/site?site=one&asOf=2026-10-22T08:00:00Z');
    expect(readPlace(address)).toEqual({
      route: { page: 'site' },
      siteId: 'one',
      asOf: '2026-10-22T08:00:00Z',
    });
  });

  it('keeps the plus of an offset a plus', () => {
    const asOf = '2026-10-22T09:00:00+01:00';
    expect(readPlace(addressOf('/', readPlace('/'), { asOf })).asOf).toBe(asOf);
  });

  it('lets a change take either away', () => {
    const place = readPlace('/?site=one&asOf=2026-10-22T08:00:00Z');
    expect(addressOf('/', place, { asOf: null })).toBe('/?site=one');
    expect(addressOf('/', place, { siteId: null, asOf: null })).toBe('/');
  });
});
