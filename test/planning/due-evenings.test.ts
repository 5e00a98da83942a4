import fc from 'fast-check';
import { expect, test } from 'vitest';
import type { DueEvent } from '../../server/model/due-event.ts';
import { addEvenings, type Evening } from '../../server/model/evening.ts';
import type { SiteForecast, SiteForecastProp } from '../../server/model/forecast.ts';
import {
  contentOf,
  type DueEvening,
  dueContent,
  dueEvenings,
  MOST_STOPS_TOLD,
  reconcile,
} from '../../server/planning/due-evenings.ts';
import { sampleSite } from '../store/samples.ts';

// What identities must do when a plan moves. Source: RFC 5545 3.8.4.7 (UID), 3.8.7.3 (LAST-MODIFIED); RFC 5546 2.1.4 (SEQUENCE).
// How long past and cancelled evenings stay is ours.

const TODAY = '2026-10-22';
const site = { ...sampleSite, name: 'Mill Walk', timeZone: 'Europe/London' };
const at = (n: number) => Date.UTC(2026, 9, 22, 9, n);

const due = (evening: Evening, ...propIds: string[]): DueEvening => ({
  evening,
  stops: propIds.map((propId) => ({
    propId,
    tag: propId.toUpperCase(),
    name: `Prop ${propId}`,
    zone: 'Yard',
    cellName: 'AA',
    cells: 3,
  })),
});

function tell(
  stored: DueEvent[],
  dues: DueEvening[],
  rest: { today?: Evening; minute?: number; site?: typeof site } = {},
) {
  let count = stored.length * 100;
  return reconcile({
    stored,
    due: dues,
    site: rest.site ?? site,
    today: rest.today ?? TODAY,
    at: at(rest.minute ?? 1),
    newId: () => `uid-${rest.minute ?? 1}-${++count}`,
  });
}

const first = (...dues: DueEvening[]) => tell([], dues, { minute: 0 });

test('due evenings stand in order, their stops by zone and then as tags are counted', () => {
  const prop = (propId: string, zone: string, swapBy: Evening | null) =>
    ({ propId, tag: propId, name: propId, zone, swapBy }) as SiteForecastProp;
  const forecast = {
    evening: TODAY,
    props: [
      prop('A-2', 'Yard', '2026-10-30'),
      prop('A-10', 'Bank', '2026-10-30'),
      prop('B-2', 'Bank', '2026-10-30'),
      prop('B-10', 'Bank', '2026-10-30'),
      prop('C-1', 'Bank', '2026-10-25'),
      prop('C-2', 'Bank', null),
    ],
  } as SiteForecast;
  const evenings = dueEvenings(forecast, () => ({ cellName: 'AA', cells: 4 }));
  expect(evenings.map(({ evening, stops }) => [evening, stops.map(({ tag }) => tag)])).toEqual([
    ['2026-10-25', ['C-1']],
    ['2026-10-30', ['A-10', 'B-2', 'B-10', 'A-2']],
  ]);
  expect(evenings[0]!.stops[0]).toEqual({
    propId: 'C-1',
    tag: 'C-1',
    name: 'C-1',
    zone: 'Bank',
    cellName: 'AA',
    cells: 4,
  });
});

test('what is beyond 18 months is not told', () => {
  const forecast = (swapBy: Evening) =>
    ({ evening: TODAY, props: [{ propId: 'a', zone: 'Yard', swapBy }] }) as SiteForecast;
  const told = (swapBy: Evening) =>
    dueEvenings(forecast(swapBy), () => ({ cellName: 'AA', cells: 1 })).length;
  expect(told('2028-04-22')).toBe(1);
  expect(told('2028-05-22')).toBe(0);
});

test('the round starts at its wall time on both sides of the clock change', () => {
  // Clocks in the United Kingdom go back on the last Sunday in October. Source: Summer Time Act 1972, as amended 2002.
  const evening = (date: Evening) =>
    dueContent(due(date, 'a'), { ...site, rounds: { ...site.rounds, startsAt: '18:30' } });
  expect(evening('2026-10-24').startsAt).toBe(Date.parse('2026-10-24T17:30:00Z'));
  expect(evening('2026-10-25').startsAt).toBe(Date.parse('2026-10-25T18:30:00Z'));
  expect(evening('2026-10-24').when).toBe('Sat 24 Oct, 18:30 (Europe/London)');
  expect(evening('2026-10-25').when).toBe('Sun 25 Oct, 18:30 (Europe/London)');
});

test('a round in the morning still belongs to the evening, and carries the next date', () => {
  const content = dueContent(due('2026-10-24', 'a'), {
    ...site,
    rounds: { ...site.rounds, startsAt: '09:00' },
  });
  expect(content.startsAt).toBe(Date.parse('2026-10-25T09:00:00Z'));
  expect(content.when).toBe('Sun 25 Oct, 09:00 (Europe/London)');
});

test('it lasts as long as walk and stops take, a quarter of an hour at least', () => {
  const minutes = (walkMinutes: number, minutesPerStop: number) =>
    dueContent(due('2026-10-30', 'a', 'b', 'c'), {
      ...site,
      rounds: { ...site.rounds, walkMinutes, minutesPerStop, minutesFree: 30 },
    }).minutes;
  expect(minutes(35, 4)).toBe(47);
  expect(minutes(0, 0)).toBe(15);
});

test('a huge evening is told in part, and counted whole', () => {
  const ids = Array.from({ length: MOST_STOPS_TOLD + 5 }, (_, n) => `p${n}`);
  const content = dueContent(due('2026-10-30', ...ids), site);
  expect(content.stops).toHaveLength(MOST_STOPS_TOLD);
  expect(content.stopCount).toBe(MOST_STOPS_TOLD + 5);
  expect(content.cells).toEqual([{ cellName: 'AA', cells: 3 * (MOST_STOPS_TOLD + 5) }]);
});

test('nothing changed: the very same events, whatever the clock', () => {
  const dues = [due('2026-10-25', 'a', 'b'), due('2026-10-30', 'c')];
  const told = first(...dues);
  const again = tell(told, dues, { minute: 50 });
  expect(again).toStrictEqual(told);
  expect(again.every((event, n) => event === told[n])).toBe(true);
});

test('a name alone changes the text and its stamp; another stop changes the end and is counted', () => {
  const told = first(due('2026-10-25', 'a', 'b'));
  const renamed = due('2026-10-25', 'a', 'b');
  renamed.stops[0]!.name = 'Heron';
  const [named] = tell(told, [renamed]);
  expect(named).toMatchObject({ uid: told[0]!.uid, sequence: 0, createdAt: at(0), modifiedAt: at(1) });
  expect(contentOf(named!).stops[0]!.name).toBe('Heron');
  const [grown] = tell([named!], [due('2026-10-25', 'a', 'b', 'c')], { minute: 2 });
  expect(grown).toMatchObject({ uid: told[0]!.uid, sequence: 1, createdAt: at(0), modifiedAt: at(2) });
});

test('a site renamed or moved to another starting time changes every coming event', () => {
  const told = first(due('2026-10-25', 'a'), due('2026-10-30', 'b'));
  const renamed = tell(told, [due('2026-10-25', 'a'), due('2026-10-30', 'b')], {
    site: { ...site, name: 'Mill Lane' },
  });
  expect(renamed.map(({ modifiedAt, sequence }) => [modifiedAt, sequence])).toEqual([
    [at(1), 0],
    [at(1), 0],
  ]);
  const later = { ...site, rounds: { ...site.rounds, startsAt: '17:45' } };
  const moved = tell(told, [due('2026-10-25', 'a'), due('2026-10-30', 'b')], { site: later });
  expect(moved.map(({ sequence }) => sequence)).toEqual([1, 1]);
});

test('when the forecast moves, the same event moves', () => {
  const told = first(due('2026-10-30', 'a', 'b', 'c'));
  const moved = tell(told, [due('2026-10-28', 'a', 'b', 'd')]);
  expect(moved).toHaveLength(1);
  expect(moved[0]).toMatchObject({
    uid: told[0]!.uid,
    evening: '2026-10-28',
    sequence: 1,
    createdAt: at(0),
    modifiedAt: at(1),
    propIds: ['a', 'b', 'd'],
  });
});

test('of two new evenings the nearest takes the event; half of the props is not most', () => {
  const told = first(due('2026-10-30', 'a', 'b', 'c'));
  const [near, far] = tell(told, [due('2026-10-29', 'a', 'b'), due('2026-11-03', 'a', 'b', 'c')]);
  expect([near!.uid, far!.uid]).toEqual([told[0]!.uid, expect.not.stringMatching(told[0]!.uid)]);
  const split = tell(first(due('2026-10-30', 'a', 'b')), [due('2026-10-29', 'a'), due('2026-11-03', 'b')]);
  expect(split.map(({ evening, state }) => [evening, state])).toEqual([
    ['2026-10-29', 'due'],
    ['2026-10-30', 'cancelled'],
    ['2026-11-03', 'due'],
  ]);
});

test('two events never become one', () => {
  const told = first(due('2026-10-27', 'a'), due('2026-10-29', 'b'));
  const merged = tell(told, [due('2026-10-28', 'a', 'b')]);
  expect(merged.map(({ uid, evening, state }) => [uid, evening, state])).toEqual([
    [told[0]!.uid, '2026-10-28', 'due'],
    [told[1]!.uid, '2026-10-29', 'cancelled'],
  ]);
});

test('due no more: cancelled and counted once, kept a week past its evening, then gone', () => {
  const told = first(due('2026-10-25', 'a'));
  const gone = tell(told, []);
  expect(gone).toStrictEqual([{ ...told[0], state: 'cancelled', sequence: 1, modifiedAt: at(1) }]);
  expect(tell(gone, [], { minute: 30 })).toStrictEqual(gone);
  expect(tell(gone, [], { minute: 31, today: '2026-11-01' })).toStrictEqual(gone);
  expect(tell(gone, [], { minute: 32, today: '2026-11-02' })).toEqual([]);
});

test('due again: the same event comes back, counted on', () => {
  const gone = tell(first(due('2026-10-25', 'a')), []);
  const [back] = tell(gone, [due('2026-10-25', 'a')], { minute: 5 });
  expect(back).toMatchObject({ uid: gone[0]!.uid, state: 'due', sequence: 2, modifiedAt: at(5) });
});

test('the past stays as it was told for 60 days', () => {
  const told = first(due('2026-10-22', 'a'));
  const next = tell(told, [due('2026-10-23', 'a')], { today: '2026-10-23', minute: 10 });
  expect(next[0]).toBe(told[0]);
  expect(next[1]).toMatchObject({ evening: '2026-10-23', sequence: 0, createdAt: at(10) });
  expect(next[1]!.uid).not.toBe(told[0]!.uid);
  expect(tell(told, [], { today: '2026-12-21' })).toStrictEqual(told);
  expect(tell(told, [], { today: '2026-12-22' })).toEqual([]);
});

test('each change is stamped later than the one before, by a second at least, even by a clock set back', () => {
  const told = tell([], [due('2026-10-25', 'a')], { minute: 30 });
  const [changed] = tell(told, [due('2026-10-25', 'a', 'b')], { minute: 3 });
  expect(changed!.modifiedAt).toBe(at(30) + 1000);
});

const propIds = ['a', 'b', 'c', 'd', 'e'];
const anyDues = fc
  .array(fc.tuple(fc.integer({ min: 0, max: 12 }), fc.subarray(propIds, { minLength: 1 })), { maxLength: 4 })
  .map((pairs) => [...new Map(pairs).entries()].sort(([a], [b]) => a - b));

test('however a forecast wanders, evenings and identities stay single, counts and stamps never fall', () => {
  fc.assert(
    fc.property(fc.array(anyDues, { minLength: 1, maxLength: 8 }), (courses) => {
      let stored: DueEvent[] = [];
      for (const [step, course] of courses.entries()) {
        const today = addEvenings(TODAY, step);
        const dues = course.map(([ahead, ids]) => due(addEvenings(today, ahead), ...ids));
        const told = tell(stored, dues, { today, minute: step });
        const coming = told.filter(({ evening }) => evening >= today);
        expect(new Set(coming.map(({ evening }) => evening)).size).toBe(coming.length);
        expect(new Set(told.map(({ uid }) => uid)).size).toBe(told.length);
        expect(coming.filter(({ state }) => state === 'due').map(({ evening }) => evening)).toEqual(
          dues.map(({ evening }) => evening),
        );
        for (const before of stored) {
          const after = told.find(({ uid }) => uid === before.uid);
          if (before.evening >= today) expect(after, 'a coming event is never dropped').toBeDefined();
          if (!after || after === before) continue;
          expect(after.createdAt).toBe(before.createdAt);
          expect(after.sequence).toBeGreaterThanOrEqual(before.sequence);
          if (after.fingerprint !== before.fingerprint || after.state !== before.state)
            expect(after.modifiedAt).toBeGreaterThan(before.modifiedAt);
        }
        stored = told;
      }
    }),
  );
});
