import type { NewProp } from '../server/actions/add-prop.ts';
import type { Importance } from '../server/model/prop.ts';
import type { Switching } from '../server/model/switching.ts';

/** A prop of the demo as its builder's card reads, and the cells it is first fitted with. */
export type DemoProp = Omit<NewProp, 'siteId'> & { fit: 'new' | 'charged' | null; setId?: string };

const dusk: Switching = { kind: 'light-sensor', onAltitudeDeg: -6 };
const duskFor = (cutOffHours: number): Switching => ({ ...dusk, cutOffHours });
const hours = (onHours: number): Switching => ({ kind: 'interval-timer', onHours });
const clock: Switching = { kind: 'clock', onAt: '17:30', offAt: '22:00' };
const byHand: Switching = { kind: 'by-hand' };

type Card = {
  cells: [cellTypeId: string, series: number, parallel?: number];
  /** Low, peak, mean mA. */
  draw: [low: number | null, peak: number, mean: number];
  standbyMa?: number;
  dimVolts: number;
  switching: Switching;
  importance?: Importance;
  units?: number;
  fit?: 'new' | 'charged' | null;
  setId?: string;
  more?: Partial<NewProp>;
};

function prop(tag: string, zone: string, name: string, card: Card): DemoProp {
  const [cellTypeId, series, parallel = 1] = card.cells;
  const [lowMa, peakMa, meanMa] = card.draw;
  return {
    tag,
    zone,
    name,
    units: card.units ?? 1,
    importance: card.importance ?? 'feature',
    cellTypeId,
    series,
    parallel,
    dimVolts: card.dimVolts,
    load: {
      behaviour: 'steady',
      meanMa,
      ...(lowMa === null ? {} : { lowMa }),
      peakMa,
      standbyMa: card.standbyMa ?? 0,
      measuredVolts: card.dimVolts,
    },
    switching: card.switching,
    fit: card.fit === undefined ? (cellTypeId.startsWith('HR') ? 'charged' : 'new') : card.fit,
    ...(card.setId ? { setId: card.setId } : {}),
    ...card.more,
  };
}

const [gate, hollow, graveyard, mill, willow, green, shelf] = [
  'Gate',
  'Hollow Way',
  'Graveyard',
  'Mill Race',
  'Willow Tunnel',
  'The Green',
  'Shelf',
] as const;

export const ZONES = { gate, hollow, graveyard, mill, willow, green, shelf };

const gateProps: DemoProp[] = [
  prop('A-01', gate, 'Gate lantern, left', {
    cells: ['LR6', 3],
    draw: [8, 34, 21],
    standbyMa: 0.05,
    dimVolts: 3.3,
    switching: dusk,
    importance: 'must-not-fail',
  }),
  prop('A-02', gate, 'Gate lantern, right', {
    cells: ['HR6', 3],
    draw: [7, 31, 19],
    standbyMa: 0.05,
    dimVolts: 3.3,
    switching: dusk,
    importance: 'must-not-fail',
    setId: 'A',
  }),
  prop('A-03', gate, 'Name-board spots', {
    cells: ['LR20', 4],
    draw: [null, 60, 60],
    standbyMa: 0.02,
    dimVolts: 4.4,
    switching: clock,
  }),
  prop('A-04', gate, 'Pumpkin row', {
    cells: ['CR2032', 1],
    units: 5,
    draw: [0.6, 6, 2.2],
    standbyMa: 0.002,
    dimVolts: 2.4,
    switching: hours(6),
    importance: 'background',
  }),
  prop('A-05', gate, 'Hedge eyes', {
    cells: ['LR6', 2],
    draw: [0.15, 18, 2.1],
    dimVolts: 2,
    switching: { kind: 'always' },
    importance: 'background',
  }),
  prop('A-06', gate, 'Welcome skull', {
    cells: ['LR6', 3],
    draw: [null, 180, 0],
    standbyMa: 0.35,
    dimVolts: 3.3,
    switching: byHand,
    more: { trips: { perShowNight: 250, perNightOff: 0, seconds: 12, runMa: 180 } },
  }),
];

const pathMeans = [13, 14, 14, 15, 15, 16, 17, 19];
const hollowProps: DemoProp[] = [
  ...pathMeans.map((meanMa, i) =>
    prop(`B-0${i + 1}`, hollow, `Path lantern ${i + 1}`, {
      cells: ['LR6', 2],
      draw: [4, 28, meanMa],
      standbyMa: 0.04,
      dimVolts: 2.3,
      switching: duskFor(6),
    }),
  ),
  // The last two came with zinc-carbon cells in the box and were written down as alkaline like their twins.
  ...[9, 10, 11, 12].map((number) =>
    prop(`B-${String(number).padStart(2, '0')}`, hollow, `Path lantern ${number}`, {
      cells: ['LR14', 2],
      draw: [4, 28, 15],
      standbyMa: 0.04,
      dimVolts: 2.3,
      switching: duskFor(6),
    }),
  ),
];

const graveyardProps: DemoProp[] = [
  ...[1, 2, 3, 4].map((number) =>
    prop(`C-0${number}`, graveyard, `Headstone glow ${number}`, {
      cells: ['LR6', 3],
      draw: [6, 40, 22],
      standbyMa: 0.05,
      dimVolts: 3,
      switching: duskFor(5),
    }),
  ),
  prop('C-05', graveyard, 'Crypt candles', {
    cells: ['LR6', 2],
    units: 4,
    draw: [2, 18, 9],
    standbyMa: 0.004,
    dimVolts: 2.2,
    switching: hours(5),
    importance: 'background',
  }),
  prop('C-06', graveyard, 'Grave eyes', {
    cells: ['6LR61', 1],
    draw: [7, 24, 13],
    dimVolts: 6,
    switching: byHand,
    importance: 'background',
  }),
  prop('C-07', graveyard, 'The Lurker', {
    cells: ['HR6', 4],
    draw: [null, 320, 0],
    standbyMa: 0.9,
    dimVolts: 4.4,
    switching: byHand,
    setId: 'J',
    more: { trips: { perShowNight: 180, perNightOff: 0, seconds: 18, runMa: 320 } },
  }),
  prop('C-08', graveyard, 'Raven eyes', {
    cells: ['CR2032', 1],
    draw: [0.3, 3, 1.1],
    standbyMa: 0.01,
    dimVolts: 2,
    switching: dusk,
    importance: 'background',
  }),
  prop('C-09', graveyard, 'Skull pile', {
    cells: ['ICR18650', 1],
    draw: [30, 90, 55],
    standbyMa: 0.08,
    dimVolts: 3.2,
    switching: hours(6),
    fit: 'charged',
  }),
  prop('C-10', graveyard, 'Ground glow', {
    cells: ['ICR18650', 1, 2],
    draw: [80, 220, 140],
    dimVolts: 3.2,
    switching: byHand,
    fit: 'charged',
  }),
];

const millProps: DemoProp[] = [
  prop('D-01', mill, 'Mill-wheel wash', {
    cells: ['LR20', 4],
    draw: [40, 110, 75],
    standbyMa: 0.02,
    dimVolts: 4.4,
    switching: clock,
  }),
  prop('D-02', mill, 'Wisp, upper', {
    cells: ['FR6', 3],
    draw: [4, 36, 18],
    standbyMa: 0.05,
    dimVolts: 3.3,
    switching: dusk,
  }),
  prop('D-03', mill, 'Wisp, lower', {
    cells: ['LR6', 3],
    draw: [4, 36, 18],
    standbyMa: 0.05,
    dimVolts: 3.3,
    switching: dusk,
  }),
  prop('D-04', mill, 'Frog eyes', {
    cells: ['LR03', 2],
    draw: [0.5, 12, 4.5],
    standbyMa: 0.004,
    dimVolts: 2.2,
    switching: hours(6),
    importance: 'background',
  }),
  prop('D-05', mill, 'Sluice lantern (over water: two people, ladder)', {
    cells: ['LR20', 3],
    draw: [12, 48, 30],
    standbyMa: 0.05,
    dimVolts: 3.3,
    switching: dusk,
    importance: 'must-not-fail',
  }),
];

const willowProps: DemoProp[] = [
  ...[1, 2, 3, 4].map((number) =>
    prop(`E-0${number}`, willow, `Willow string ${number}`, {
      cells: ['HR6', 3],
      draw: [20, 45, 32],
      standbyMa: 0.01,
      dimVolts: 3.3,
      switching: hours(6),
      setId: 'BCDE'[number - 1]!,
    }),
  ),
  prop('E-05', willow, 'The fifty string', {
    cells: ['HR6', 3],
    draw: [null, 60, 58],
    standbyMa: 0.01,
    dimVolts: 3.45,
    switching: hours(8),
    setId: 'F',
  }),
  prop('E-06', willow, 'Moon globe', {
    cells: ['ICR18650', 1],
    draw: [40, 140, 85],
    standbyMa: 0.02,
    dimVolts: 3.2,
    switching: clock,
    importance: 'must-not-fail',
    fit: 'charged',
  }),
];

const greenProps: DemoProp[] = [
  prop('F-01', green, 'Great owl', {
    cells: ['HR20', 4],
    draw: [90, 420, 210],
    dimVolts: 4.4,
    switching: byHand,
    importance: 'must-not-fail',
    setId: 'L',
    more: { offsetC: 1.5 },
  }),
  prop('F-02', green, 'Lantern tree', {
    cells: ['LR14', 4, 2],
    draw: [70, 300, 160],
    dimVolts: 4.6,
    switching: byHand,
  }),
  prop('F-03', green, 'Finale stars', {
    cells: ['CR2032', 1],
    units: 10,
    draw: [0.8, 8, 2.5],
    standbyMa: 0.01,
    dimVolts: 2.4,
    switching: dusk,
  }),
];

const spares: DemoProp[] = [
  prop('S-01', shelf, 'Spare path lantern', {
    cells: ['LR6', 2],
    draw: [4, 28, 15],
    standbyMa: 0.04,
    dimVolts: 2.3,
    switching: duskFor(6),
    importance: 'background',
    fit: null,
  }),
  prop('S-02', shelf, 'Spare headstone', {
    cells: ['LR6', 3],
    draw: [6, 40, 22],
    standbyMa: 0.05,
    dimVolts: 3,
    switching: duskFor(5),
    importance: 'background',
    fit: null,
  }),
  prop('S-03', shelf, 'Spare willow string', {
    cells: ['HR6', 3],
    draw: [20, 45, 32],
    standbyMa: 0.01,
    dimVolts: 3.3,
    switching: hours(6),
    importance: 'background',
    fit: null,
  }),
  prop('S-04', shelf, 'Spare tea lights', {
    cells: ['CR2032', 1],
    units: 6,
    draw: [0.6, 6, 2.2],
    standbyMa: 0.002,
    dimVolts: 2.4,
    switching: hours(6),
    importance: 'background',
    fit: null,
  }),
];

export const DEMO_PROPS: readonly DemoProp[] = [
  ...gateProps,
  ...hollowProps,
  ...graveyardProps,
  ...millProps,
  ...willowProps,
  ...greenProps,
  ...spares,
];
