import type { CellType, Prop } from '../api/types.ts';

/** Said once at set-up and under every caution. */
export const REMINDER =
  'Reminders, not assurance: the rules of your place, your insurer and your venue come first.';

export const SITE_CAUTIONS = [
  'Nobody should have to find the way by a decoration. Light steps, edges, exits and crossings by something that burns whatever this plan says.',
  'Leave mains work to an electrician. Chargers near wet ground need the proper outdoor protection.',
  'A round at night: a second person for ladders, water and roadside stops, and somebody who notices if you are not back.',
];

const MIXING =
  'Change all cells of a set together, one kind and one maker. A weak cell among strong ones is driven backwards and may leak or heat.';
const LITHIUM_ION = [
  'Charge between 0 and 40 °C only. Let a cold pack reach room temperature first: cold charging does harm that shows later as fire.',
  'Never charge unattended, or across the way out; charge on something that cannot burn.',
  'A pack that has swollen, fallen or got wet is never charged again. Carry spare cells in a box, away from metal.',
];

/** After public safety advice; own words. */
const BY_KIND: Record<CellType['kind'], string[]> = {
  alkaline: [
    MIXING,
    'A leak is caustic: gloves on, hands away from eyes, wipe up and bag it.',
    'Take the cells out before storing the prop.',
  ],
  'zinc-carbon': [
    'Zinc-carbon holds about a third of what alkaline does and leaks sooner. Do not leave flat cells in.',
    MIXING,
  ],
  'lithium-aa': [MIXING, 'Single-use: never put them on a charger. Tape the ends before disposal.'],
  nickel: [
    'Nickel gives almost no warning: bright one hour, out the next.',
    'Keep a set together, charge it as a set, and never mix charged with flat.',
  ],
  'nickel-standard': [
    'Nickel gives almost no warning, and this sort loses charge on the shelf: charge it the day before.',
    'Keep a set together, charge it as a set, and never mix charged with flat.',
  ],
  'lithium-ion': LITHIUM_ION,
  'lithium-iron': LITHIUM_ION,
  coin: [
    'Swallowed, a coin cell injures within two hours, and nothing may show it at first: emergency care at once, however well all seems.',
    'Adults only. Count the cells out and count them in; search for a dropped one before you walk on.',
    'The lid should open only with a tool, or by two movements at the same time. Tape used cells before disposal.',
  ],
  lead: [
    'Keep it upright, and cover the poles: a short circuit burns.',
    'Charge it where air moves. A cracked case goes to recycling, with gloves.',
  ],
};

/**
 * What to mind when this prop is opened, strongest first.
 * @param kind chemistry of the cells that go in
 * @param prop how many cells; one alone cannot be mixed
 */
export function cautionsFor(kind: CellType['kind'], prop: Pick<Prop, 'series' | 'parallel'>): string[] {
  const cautions = BY_KIND[kind];
  return prop.series * prop.parallel === 1 ? cautions.filter((caution) => caution !== MIXING) : cautions;
}
