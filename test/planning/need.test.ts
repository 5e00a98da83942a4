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
const course = (brightOn: number[], shows: number[]): ChanceCourse => ({
  from: '2026-10-22',
  evenings: brightOn.length,
  brightOn,
  showNight: (n) => shows.includes(n),
});
// Rounds start in the evening here, too late for that evening's visitors.
const wanted: Wanted = {
  everyEvening: false,
  confidence: 0.9,
  today: '2026-10-22',
  roundInTime: () => false,
};
const byDay: Wanted = { ...wanted, roundInTime: () => true };

describe('swap by', () => {
  it('is the evening before the first show night that falls short', () => {
    expect(swapByOf(course([1, 0.95, 0.8, 0.5, 0.1], [0, 3, 4]), wanted)).toBe('2026-10-24');
  });
  it('is that night itself where rounds are made before the gate opens', () => {
    expect(swapByOf(course([1, 0.95, 0.8, 0.5, 0.1], [0, 3, 4]), byDay)).toBe('2026-10-25');
  });
  it('takes no notice of nights off, nor of a cold one that the set comes back from', () => {
    expect(swapByOf(course([1, 0.5, 0.5, 0.5], [0]), wanted)).toBeNull();
    expect(swapByOf(course([1, 0.1, 1, 0.95], [0, 2, 3]), wanted)).toBeNull();
    expect(swapByOf(course([0.1, 0.1, 1, 0.95], [2, 3]), { ...wanted, today: '2026-10-23' })).toBeNull();
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
  it('is that of the worst evening that counts', () => {
    expect(chanceThrough(course([1, 0.2, 0.9, 0.95], [0, 2, 3]), wanted, '2026-10-25')).toBe(0.9);
    expect(chanceThrough(course([1, 0.9, 0.7, 0.4], [1, 3]), wanted, '2026-10-24')).toBe(0.9);
    expect(chanceThrough(course([1, 0.9, 0.7, 0.4], [1, 3]), wanted, '2026-10-25')).toBe(0.4);
  });
  it('is 1 when no evening counts', () => {
    expect(chanceThrough(course([1, 0.1], []), wanted, '2026-10-23')).toBe(1);
  });
});

describe('next rounds', () => {
  it('are the next allowed weekdays', () => {
    expect(
      nextRounds('2026-10-22', { weekdays: [3, 6], tooLateToday: false, seasonThrough: '2026-11-30' }),
    ).toEqual(['2026-10-24', '2026-10-28']);
  });
  it('include today unless its hour has passed', () => {
    expect(
      nextRounds('2026-10-24', { weekdays: [3, 6], tooLateToday: false, seasonThrough: '2026-11-30' })[0],
    ).toBe('2026-10-24');
    expect(
      nextRounds('2026-10-24', { weekdays: [3, 6], tooLateToday: true, seasonThrough: '2026-11-30' })[0],
    ).toBe('2026-10-28');
    expect(
      nextRounds('2026-10-24', { weekdays: [6], tooLateToday: true, seasonThrough: '2026-11-30' }),
    ).toEqual(['2026-10-31', '2026-11-07']);
  });
  it('are none after the season', () => {
    const habits = { weekdays: [3, 6], tooLateToday: false };
    expect(nextRounds('2026-10-24', { ...habits, seasonThrough: '2026-10-26' })).toEqual(['2026-10-24']);
    expect(nextRounds('2026-10-24', { ...habits, seasonThrough: '2026-10-20' })).toEqual([]);
  });
  it('are none where nobody has said when', () => {
    expect(
      nextRounds('2026-10-24', { weekdays: [], tooLateToday: false, seasonThrough: '2026-11-30' }),
    ).toEqual([]);
  });
});

describe('groups', () => {
  // Rounds on Saturday the 24th and Wednesday the 28th.
  const reach = { rounds: ['2026-10-24', '2026-10-28'], marginNights: 1, failing: false };
  const every = { ...wanted, everyEvening: true };
  const everyByDay = { ...byDay, everyEvening: true };
  const falling = (n: number) =>
    course(
      Array.from({ length: 12 }, (_, i) => (i < n ? 1 : 0.5)),
      [],
    );
  it('at risk: falls short before somebody can get there', () => {
    expect(groupOf(falling(1), everyByDay, reach).group).toBe('at-risk');
    // It falls short on the evening of the round: in time where rounds are made by day, too late where by night.
    expect(groupOf(falling(2), everyByDay, reach)).toEqual({
      group: 'next-round',
      chanceBrightToNextRound: 1,
    });
    expect(groupOf(falling(2), every, reach)).toEqual({ group: 'at-risk', chanceBrightToNextRound: 0.5 });
  });
  it('next round: gets there, but not to the one after and the margin beyond', () => {
    expect(groupOf(falling(6), everyByDay, reach).group).toBe('next-round');
    expect(groupOf(falling(6), everyByDay, { ...reach, marginNights: 0 }).group).toBe('fine');
    expect(groupOf(falling(7), every, reach).group).toBe('next-round');
  });
  it('fine: reaches the round after and the margin beyond', () => {
    expect(groupOf(falling(7), everyByDay, reach).group).toBe('fine');
    expect(groupOf(falling(8), every, reach).group).toBe('fine');
  });
  it('a report of failing beats the sum while an evening that counts is to come', () => {
    const failed = course([0, 0, 0], [2]);
    expect(groupOf(failed, byDay, { ...reach, failing: true }).group).toBe('at-risk');
    expect(groupOf(course([0, 0, 0], []), byDay, { ...reach, failing: true }).group).toBe('fine');
  });
  it('thinks a week ahead where nobody makes rounds', () => {
    const alone = { ...reach, rounds: [], marginNights: 0 };
    expect(groupOf(falling(6), every, alone).group).toBe('at-risk');
    expect(groupOf(falling(8), every, alone).group).toBe('next-round');
  });
});
