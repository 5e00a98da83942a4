import type { CellType, ForecastNight, LogEntry, Prop, SiteForecastProp, Switching } from '../api/types.ts';
import { counted, ma } from './quantity.ts';

/** One word per thing: every code of the contract has its words here and nowhere else. */
export type Group = SiteForecastProp['group'];

export const GROUPS: Group[] = ['at-risk', 'next-round', 'fine', 'unknown'];

export const GROUP_WORDS: Record<Group, { title: string; short: string; about: string }> = {
  'at-risk': {
    title: 'At risk before the next round',
    short: 'at risk',
    about: 'May look dim before anybody can get there.',
  },
  'next-round': {
    title: 'Swap on the next round',
    short: 'next round',
    about: 'Good until then, not until the one after.',
  },
  fine: { title: 'Fine', short: 'fine', about: 'Bright past the next round, with nights to spare.' },
  unknown: {
    title: 'Not enough known',
    short: 'not known',
    about: 'No swap on record, or the sum has no draw to work with.',
  },
};

export const IMPORTANCE_WORDS: Record<Prop['importance'], string> = {
  'must-not-fail': 'must not fail',
  feature: 'feature',
  background: 'background',
};

export const KIND_WORDS: Record<CellType['kind'], string> = {
  alkaline: 'alkaline',
  'zinc-carbon': 'zinc-carbon',
  'lithium-aa': 'lithium AA, single-use',
  nickel: 'nickel rechargeable',
  'nickel-standard': 'nickel rechargeable, not low self-discharge',
  'lithium-ion': 'lithium-ion',
  'lithium-iron': 'lithium-iron',
  coin: 'lithium coin',
  lead: 'lead-acid',
};

export type Seen = 'bright' | 'dim' | 'dark' | 'odd';
export const SEEN: Seen[] = ['bright', 'dim', 'dark', 'odd'];

export const NIGHT_WORDS: Record<ForecastNight['likely'], string> = {
  bright: 'bright',
  dim: 'dim',
  'dark-cold': 'dark (cold)',
  'dark-used-up': 'dark (used up)',
  'not-lit': 'not lit',
};

export const WEATHER_WORDS: Record<ForecastNight['weather'], string> = {
  observed: 'observed',
  forecast: 'forecast',
  climate: 'usual for the month',
};

const STATE_WORDS = { new: 'a new set', charged: 'a charged set', 'part-used': 'a part-used set' };

/** 'Swapped: a new set, 3 cells'; 'Seen dim, 3.1 V lit'. */
export function entryWords(entry: LogEntry): string {
  if (entry.kind === 'sighting') {
    const volts = entry.volts === undefined ? '' : `, ${entry.volts} V ${entry.taken ?? ''}`;
    return `Seen ${entry.seen}${volts}`;
  }
  const parts = [`Swapped: ${STATE_WORDS[entry.state]}`];
  if (entry.leftShare !== undefined) parts.push(`${Math.round(entry.leftShare * 100)} % left`);
  if (entry.cells !== undefined) parts.push(counted(entry.cells, 'cell'));
  if (entry.cellTypeId) parts.push(entry.cellTypeId);
  if (entry.setId) parts.push(`set ${entry.setId}`);
  if (entry.oldSet) parts.push(`the old set was ${entry.oldSet}`);
  return parts.join(', ');
}

/** How a prop comes on, in a few words. */
export function switchingWords(switching: Switching): string {
  switch (switching.kind) {
    case 'light-sensor':
      return switching.cutOffHours
        ? `light sensor, off after ${switching.cutOffHours} h`
        : 'light sensor, dusk to dawn';
    case 'clock':
      return `clock, ${switching.onAt} to ${switching.offAt}`;
    case 'interval-timer':
      return `interval timer, ${switching.onHours} h on, ${24 - switching.onHours} h off`;
    case 'by-hand':
      return 'by hand, on show nights';
    case 'always':
      return 'always on, no switch';
  }
}

/** What it takes while lit. */
export function drawWords(prop: Prop): string {
  const { load } = prop;
  const parts: string[] = [];
  if (load.lowMa !== undefined && load.peakMa !== undefined)
    parts.push(`${load.lowMa} to ${ma(load.peakMa)}`);
  if (load.meanMa !== undefined) parts.push(`${ma(load.meanMa)} on average`);
  if (load.measuredVolts !== undefined) parts.push(`at ${load.measuredVolts} V`);
  parts.push(`standby ${ma(load.standbyMa)}`);
  return parts.join(', ');
}

const DEFAULT_WORDS: Record<string, string> = {
  'load.standbyMa': 'standby draw',
  'load.measuredVolts': 'volts the draw was measured at',
  'load.ledVolts': 'volts at which the LEDs stop',
  'load.meanMa': 'mean draw',
  'load.wave': 'shape of the fade',
  stopVolts: 'volts at which it goes out',
  'switching.onAltitudeDeg': 'when the sensor switches',
  'switching.skyShare': 'share of sky the sensor sees',
};
/** A field of `why.defaults` in words; a field without words shows its own name. */
export const defaultWords = (field: string) => DEFAULT_WORDS[field] ?? field;
