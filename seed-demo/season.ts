import { addCellType } from '../server/actions/add-cell-type.ts';
import { addProp } from '../server/actions/add-prop.ts';
import { changeProp } from '../server/actions/change-prop.ts';
import { createSite } from '../server/actions/create-site.ts';
import type { Deps } from '../server/actions/deps.ts';
import { forecastSite } from '../server/actions/forecast-site.ts';
import { recordSighting } from '../server/actions/record-sighting.ts';
import { recordSwap } from '../server/actions/record-swap.ts';
import { setShowNights } from '../server/actions/set-show-nights.ts';
import { typeNight } from '../server/actions/type-night.ts';
import { addEvenings, type Evening, type Instant, instantInEvening } from '../server/model/evening.ts';
import type { Seen } from '../server/model/log-entry.ts';
import type { Prop } from '../server/model/prop.ts';
import type { Switching } from '../server/model/switching.ts';
import { DEMO_PROPS, type DemoProp, ZONES } from './props.ts';

const ZONE = 'Europe/London';
const INSTALL: Evening = '2026-10-10';
const MINUTE_MS = 60_000;

/** The demo is shown as of this morning: mid-season, with a gale, a clock change and a hard frost still to come. */
export const DEMO_AS_OF = '2026-10-22T08:00:00Z';

/** Overnight means from the install night on, °C; a hard frost on the 28th and 29th. */
const OVERNIGHT_C = [9, 8, 8, 7, 9, 10, 8, 7, 9, 8, 6, 5, 6, 9, 11, 6, 3, 0, -3, -4, -1, 3, 5, 6];

const FIRST_NIGHTS = ['16', '17', '18', '22', '23', '24', '25', '28', '29', '30', '31'];

/** What a demo is built with: a clock that can be set, so that every deed is dated when it happened. */
export type DemoDeps = Deps & { clock: { set(at: Instant): void } };

const at = (evening: Evening, wallTime: string): Instant => instantInEvening(evening, wallTime, ZONE);
const october = (day: number | string): Evening => `2026-10-${day}`;

type Demo = { deps: DemoDeps; siteId: string; byTag: Map<string, Prop> };

/** Fills an empty store with a season of the invented Pellmoss Lantern Lane, deed by deed. @returns the site's id */
export function playSeason(deps: DemoDeps): string {
  deps.clock.set(at('2026-10-09', '19:00'));
  const demo = { deps, ...install(deps) };
  firstWeek(demo);
  secondWeek(demo);
  thirdWeek(demo);
  return demo.siteId;
}

function install(deps: DemoDeps): Pick<Demo, 'siteId' | 'byTag'> {
  const site = createSite(deps, {
    name: 'Pellmoss Lantern Lane',
    latitudeDeg: 54.4,
    longitudeDeg: -2.4,
    timeZone: ZONE,
    seasonFrom: INSTALL,
    seasonThrough: '2026-11-01',
    monthlyMinC: [0.2, 0.2, 1.4, 2.9, 5.4, 8.3, 10.3, 10.1, 8.1, 5.6, 2.8, 0.6],
    monthlyMaxC: [5.9, 6.5, 8.6, 11.6, 15, 17.4, 19.2, 18.8, 16.4, 12.6, 8.9, 6.4],
    confidence: 0.9,
    marginNights: 1,
    rounds: {
      weekdays: [3, 6],
      startsAt: '14:00',
      minutesFree: 90,
      minutesPerStop: 3,
      walkMinutes: 25,
      cost: 12,
    },
    zoneOffsetsC: { [ZONES.mill]: -3 },
  });
  OVERNIGHT_C.forEach((meanC, night) => {
    const evening = addEvenings(INSTALL, night);
    typeNight(deps, { siteId: site.id, evening, night: { minC: meanC - 2, maxC: meanC + 2 } });
  });
  const nights = FIRST_NIGHTS.map((day) => gateHours(october(day)));
  setShowNights(deps, { siteId: site.id, nights });
  // Two of the four lithium-ion cells came with a label no such cell can keep.
  addCellType(deps, {
    id: '18650-9900',
    name: '18650, label says 9900 mAh',
    kind: 'lithium-ion',
    capacityMah: 9900,
    nominalVolts: 3.7,
    massG: 42,
    rechargeable: true,
  });
  const byTag = new Map<string, Prop>();
  DEMO_PROPS.forEach((card, i) => {
    const { fit, setId, ...fields } = card;
    const prop = addProp(deps, { ...fields, siteId: site.id });
    byTag.set(prop.tag, prop);
    if (fit) fitFirst(deps, prop, { card, minutesIn: i * 4 });
  });
  return { siteId: site.id, byTag };
}

function gateHours(evening: Evening) {
  // The gate opens an hour earlier once the clocks have gone back.
  const summer = evening < '2026-10-25';
  return { evening, opensAt: summer ? '18:30' : '17:30', closesAt: summer ? '21:30' : '20:30' };
}

/** Most go in on the install afternoon; the interval timers wait for dusk, when they are meant to start. */
function fitFirst(deps: DemoDeps, prop: Prop, of: { card: DemoProp; minutesIn: number }): void {
  const timer = prop.switching.kind === 'interval-timer';
  const when = at(INSTALL, timer ? '19:00' : '14:00') + (timer ? 0 : of.minutesIn * MINUTE_MS);
  deps.clock.set(when);
  recordSwap(deps, {
    propId: prop.id,
    at: when,
    state: of.card.fit!,
    ...(of.card.setId ? { setId: of.card.setId } : {}),
    ...(prop.tag === 'C-10' ? { cellTypeId: '18650-9900' } : {}),
  });
}

function propAt(demo: Demo, tag: string): Prop {
  const prop = demo.byTag.get(tag);
  if (!prop) throw new Error(`The demo has no ${tag}.`);
  return prop;
}

function see(
  demo: Demo,
  tag: string,
  of: { when: Instant; seen: Seen; volts?: number; taken?: 'lit' | 'resting'; note?: string },
) {
  const { when, ...rest } = of;
  demo.deps.clock.set(when);
  recordSighting(demo.deps, { propId: propAt(demo, tag).id, at: when, ...rest });
}

function swap(
  demo: Demo,
  tag: string,
  of: { when: Instant; cells?: number; cellTypeId?: string; note?: string },
) {
  const { when, ...rest } = of;
  const prop = propAt(demo, tag);
  demo.deps.clock.set(when);
  const rechargeable = (of.cellTypeId ?? prop.cellTypeId).match(/^(HR|ICR)/) !== null;
  recordSwap(demo.deps, { propId: prop.id, at: when, state: rechargeable ? 'charged' : 'new', ...rest });
}

/** A round swaps what its own forecast, made as it starts, says will not last past the next one. */
function makeRound(demo: Demo, start: Instant, except: readonly string[] = []): void {
  demo.deps.clock.set(start);
  const due = forecastSite(demo.deps, { siteId: demo.siteId, asOf: start }).props.filter(
    (prop) => prop.group === 'at-risk' && !except.includes(prop.tag),
  );
  due.forEach((prop, stop) => {
    swap(demo, prop.tag, { when: start + stop * 3 * MINUTE_MS });
  });
}

/** The watch walks on show nights and taps what it passes. */
function watch(demo: Demo, evening: Evening, bright: readonly string[]): void {
  bright.forEach((tag, i) => {
    see(demo, tag, { when: at(evening, '20:15') + i * MINUTE_MS, seen: 'bright' });
  });
}

/** Somebody goes round at dusk and switches the interval timers off and on, so that they count from then. */
function resetTimers(demo: Demo, when: Instant, tags: readonly string[]): void {
  demo.deps.clock.set(when);
  for (const tag of tags) {
    const prop = propAt(demo, tag);
    if (prop.switching.kind !== 'interval-timer') continue;
    const switching: Switching = { ...prop.switching, setAt: when };
    changeProp(demo.deps, { propId: prop.id, changes: { switching } });
  }
}

function firstWeek(demo: Demo): void {
  see(demo, 'E-05', { when: at(october(13), '20:40'), seen: 'dim', note: 'Fourth night only.' });
  makeRound(demo, at(october(14), '18:30'));
  watch(demo, october(16), ['A-01', 'A-02', 'B-01', 'B-08', 'C-01', 'D-02']);
  makeRound(demo, at(october(17), '14:00'));
  resetTimers(demo, at(october(17), '18:35'), ['A-04', 'E-01', 'E-02', 'E-03', 'E-04', 'E-05']);
  watch(demo, october(17), ['A-01', 'E-01', 'E-02', 'F-01']);
  see(demo, 'D-05', {
    when: at(october(18), '19:50'),
    seen: 'dim',
    volts: 3.24,
    taken: 'lit',
    note: 'Heavy rain since noon.',
  });
  see(demo, 'D-05', {
    when: at(october(18), '20:05'),
    seen: 'odd',
    volts: 4.38,
    taken: 'resting',
    note: 'Half full at rest: wet joint. Dried and bagged.',
  });
  see(demo, 'D-05', { when: at(october(19), '19:30'), seen: 'bright' });
}

function secondWeek(demo: Demo): void {
  demo.deps.clock.set(at(october(20), '15:00'));
  changeProp(demo.deps, { propId: propAt(demo, 'B-06').id, changes: { zone: ZONES.graveyard } });
  // Five coin cells were left on the shelf: the pumpkins got them, the finale stars went without.
  makeRound(demo, at(october(21), '18:30'), ['F-03']);
  see(demo, 'F-03', { when: at(october(21), '20:30'), seen: 'dim', note: 'Three of the ten are faint.' });
  // Entered as alkaline, so the round passed them by; their twins are fine.
  see(demo, 'B-11', {
    when: at(october(22), '20:10'),
    seen: 'dim',
    note: 'Grey cells: zinc-carbon from the box.',
  });
  see(demo, 'B-12', { when: at(october(22), '20:12'), seen: 'dim' });
  watch(demo, october(22), ['B-09', 'B-10', 'C-01', 'C-02', 'F-02']);
  watch(demo, october(23), ['A-06', 'C-07', 'A-01', 'F-01']);
  demo.deps.clock.set(at(october(24), '14:00'));
  const nights = FIRST_NIGHTS.map((day) => ({ ...gateHours(october(day)), calledOff: day === '24' }));
  setShowNights(demo.deps, { siteId: demo.siteId, nights });
  // Saturday's round was lost to the gale; the standby round on Sunday morning packed its bag short.
  const start = at(october(24), '10:00');
  makeRound(demo, start, ['C-03']);
  swap(demo, 'C-03', {
    when: start + 100 * MINUTE_MS,
    cells: 2,
    note: 'Two new, one left in: the bag was short.',
  });
}

function thirdWeek(demo: Demo): void {
  demo.deps.clock.set(at(october(26), '19:00'));
  const nights = [
    ...FIRST_NIGHTS.map((day) => ({ ...gateHours(october(day)), calledOff: day === '24' })),
    gateHours('2026-11-01'),
  ];
  setShowNights(demo.deps, { siteId: demo.siteId, nights });
  makeRound(demo, at(october(28), '15:30'));
  see(demo, 'A-02', { when: at(october(29), '19:10'), seen: 'dark', note: 'Dark outdoors at -4 °C.' });
  see(demo, 'A-02', {
    when: at(october(29), '20:20'),
    seen: 'odd',
    volts: 3.72,
    taken: 'resting',
    note: 'Warmed up in the kitchen: 1.24 V a cell. It was the frost.',
  });
  see(demo, 'C-04', {
    when: at(october(30), '18:05'),
    seen: 'dark',
    note: 'Dead. Spare headstone put in its place.',
  });
  swap(demo, 'S-02', { when: at(october(30), '18:20') });
  makeRound(demo, at(october(31), '14:00'));
  see(demo, 'A-04', {
    when: at(october(31), '20:30'),
    seen: 'odd',
    note: 'Two tea lights gone: search for the coin cells.',
  });
}
