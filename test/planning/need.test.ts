import { describe, expect, it } from 'vitest';
import {
  type ChanceCourse,
  chanceThrough,
  groupOf,
  nextRounds,
  swapByOf,
  type Wanted,
} from '../../server/planning/need.ts';

// Thursday 22 October 2026 and the evenings after it.
const course = (chanceBright: number[], shows: number[]): ChanceCourse => ({
  from: '2026-10-22',
  evenings: chanceBright.length,
  chanceBright,
  showNight: (n) => shows.includes(n),
});
const wanted: Wanted = { everyEvening: false, confidence: 0.9, today: '2026-10-22' };

describe('swap by', () => {
  it('is the evening before the first show night that falls short', () => {
    expect(swapByOf(course([1, 0.95, 0.8, 0.5, 0.1], [0, 3, 4]), wanted)).toBe('2026-10-24');
  });
  it('takes no notice of nights off', () => {
    expect(swapByOf(course([1, 0.5, 0.5, 0.5], [0]), wanted)).toBeNull();
  });
  it('is today when tonight already falls short', () => {
    expect(swapByOf(course([0.4, 0.1], [0, 1]), wanted)).toBe('2026-10-22');
  });
  it('is null when the set lasts', () => {
    expect(swapByOf(course([1, 0.99, 0.9], [0, 1, 2]), wanted)).toBeNull();
  });
  it('counts every evening where the site has no show nights', () => {
    expect(swapByOf(course([1, 1, 0.89], []), { ...wanted, everyEvening: true })).toBe('2026-10-23');
  });
  it('goes on with the last chance where the course ends before the season', () => {
    const spent = { ...course([1, 0.3], [0, 1, 5]), evenings: 8 };
    expect(swapByOf(spent, { ...wanted, today: '2026-10-25' })).toBe('2026-10-26');
    expect(chanceThrough(spent, { ...wanted, today: '2026-10-25' }, '2026-10-27')).toBe(0.3);
    expect(swapByOf(spent, { ...wanted, today: '2026-10-28' })).toBeNull();
  });
  it('looks no further back than today', () => {
    const late = { ...wanted, today: '2026-10-24' };
    expect(swapByOf(course([0.2, 0.2, 0.2, 0.2], [0, 1, 3]), late)).toBe('2026-10-24');
  });
});

describe('chance through an evening', () => {
  it('is that of the last evening that counts', () => {
    expect(chanceThrough(course([1, 0.9, 0.7, 0.4], [1, 3]), wanted, '2026-10-24')).toBe(0.9);
    expect(chanceThrough(course([1, 0.9, 0.7, 0.4], [1, 3]), wanted, '2026-10-25')).toBe(0.4);
  });
  it('is 1 when no evening counts', () => {
    expect(chanceThrough(course([1, 0.1], []), wanted, '2026-10-23')).toBe(1);
  });
});

describe('next rounds', () => {
  it('are the next allowed weekdays', () => {
    expect(nextRounds('2026-10-22', { weekdays: [3, 6], tooLateToday: false })).toEqual([
      '2026-10-24',
      '2026-10-28',
    ]);
  });
  it('include today unless its hour has passed', () => {
    expect(nextRounds('2026-10-24', { weekdays: [3, 6], tooLateToday: false })[0]).toBe('2026-10-24');
    expect(nextRounds('2026-10-24', { weekdays: [3, 6], tooLateToday: true })[0]).toBe('2026-10-28');
    expect(nextRounds('2026-10-24', { weekdays: [6], tooLateToday: true })).toEqual([
      '2026-10-31',
      '2026-11-07',
    ]);
  });
  it('are none where nobody has said when', () => {
    expect(nextRounds('2026-10-24', { weekdays: [], tooLateToday: false })).toEqual([]);
  });
});

describe('groups', () => {
  const reach = { rounds: ['2026-10-24', '2026-10-28'], marginNights: 1, lastSeen: null };
  const every = { ...wanted, everyEvening: true };
  const falling = (n: number) =>
    course(
      Array.from({ length: 12 }, (_, i) => (i < n ? 1 : 0.5)),
      [],
    );
  it('at risk: falls short before somebody can get there, the margin counted', () => {
    expect(groupOf(falling(2), every, reach).group).toBe('at-risk');
    // It falls short on the evening of the round itself: that is the one night of margin.
    expect(groupOf(falling(2), every, { ...reach, marginNights: 0 }).group).toBe('next-round');
  });
  it('next round: gets there, but not to the one after', () => {
    expect(groupOf(falling(3), every, reach)).toEqual({ group: 'next-round', chanceBrightToNextRound: 1 });
    expect(groupOf(falling(6), every, reach).group).toBe('next-round');
  });
  it('fine: reaches the round after', () => {
    expect(groupOf(falling(7), every, reach).group).toBe('fine');
  });
  it('a report of dim or dark beats the sum, bright and odd do not', () => {
    expect(groupOf(falling(12), every, { ...reach, lastSeen: 'dim' }).group).toBe('at-risk');
    expect(groupOf(falling(12), every, { ...reach, lastSeen: 'dark' }).group).toBe('at-risk');
    expect(groupOf(falling(12), every, { ...reach, lastSeen: 'odd' }).group).toBe('fine');
    expect(groupOf(falling(2), every, { ...reach, lastSeen: 'bright' }).group).toBe('at-risk');
  });
  it('thinks a week ahead where nobody makes rounds', () => {
    const alone = { ...reach, rounds: [], marginNights: 0 };
    expect(groupOf(falling(6), every, alone).group).toBe('at-risk');
    expect(groupOf(falling(8), every, alone).group).toBe('next-round');
  });
});
