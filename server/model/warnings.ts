import { litVoltsAt } from './cell.ts';
import { CELL_KINDS } from './cell-kinds.ts';
import type { CellType } from './cell-type.ts';
import type { Warning } from './forecast.ts';
import type { Prop } from './prop.ts';
import type { NotProjected, PropProjection } from './prop-forecast.ts';

const round = (value: number, digits: number) => Number(value.toFixed(digits));

/** Things about a prop that a careful friend would say before it costs a show. Each one sentence or two. */
export function warningsOf(prop: Prop, projection: PropProjection): Warning[] {
  const type = projection.cellSet.type;
  return [
    ...drawWarnings(prop, projection),
    ...voltWarnings(prop, projection),
    ...setWarnings(projection),
    ...labelWarnings(type),
    ...coldWarnings(projection),
  ];
}

/** What keeps a prop from being projected, and the way out. */
export function notProjectedWarning(prop: Prop, { reason }: NotProjected): Warning {
  const text = {
    'no-set': `No cells are recorded in ${prop.tag}. Record the swap that put them in, and its dates appear.`,
    'no-draw': `Nothing says what ${prop.tag} draws. Give its mean mA, or low and peak with the wave.`,
    'set-too-old': `The set in ${prop.tag} went in over a year ago. Record a swap, or retire the prop.`,
  }[reason];
  return { code: reason, text };
}

function drawWarnings(prop: Prop, { load, cellSet }: PropProjection): Warning[] {
  const warnings: Warning[] = [];
  const meanMa = load.meanMa ?? 0;
  if (meanMa > 0 && meanMa < 0.05) {
    warnings.push({
      code: 'draw-very-small',
      text: `${meanMa} mA would run for years. Did the meter say ${meanMa} A? That is ${round(meanMa * 1000, 1)} mA.`,
    });
  }
  if (meanMa > 2000) {
    warnings.push({
      code: 'draw-very-large',
      text: `${round(meanMa / 1000, 1)} A would cook small cells. If the meter said ${round(meanMa / 1000, 3)} mA, enter that.`,
    });
  }
  const peakPerCellMa = Math.max(load.peakMa, prop.trips?.runMa ?? 0) / cellSet.parallel;
  if (cellSet.type.kind === 'coin' && peakPerCellMa > 3) {
    warnings.push({
      code: 'coin-over-rating',
      text: `${round(peakPerCellMa, 1)} mA at its peak is more than the 3 mA a coin cell gives steadily. Count on hours rather than nights, and look often.`,
    });
  }
  if (load.spread >= 0.2 && load.meanMa !== null) {
    warnings.push({
      code: 'draw-uncertain',
      text: "The draw is partly a guess, so the range is wide. A meter's average over three full fades, with the volts it was taken at, narrows it.",
    });
  }
  return warnings;
}

function voltWarnings(prop: Prop, { cellSet }: PropProjection): Warning[] {
  const freshVolts = litVoltsAt(cellSet, 0.02);
  const emptyVolts = litVoltsAt(cellSet, 1);
  if (prop.dimVolts >= freshVolts) {
    return [
      {
        code: 'dim-above-fresh',
        text: `A fresh set here shows about ${round(freshVolts, 2)} V lit, so at ${prop.dimVolts} V this is dim from the start. Other cells, or a lower dim point?`,
      },
    ];
  }
  if (cellSet.series > 1 && prop.dimVolts < emptyVolts / 2) {
    return [
      {
        code: 'dim-volts-per-cell',
        text: `Is ${prop.dimVolts} V for each cell? For the ${cellSet.series} together that is ${round(prop.dimVolts * cellSet.series, 2)} V.`,
      },
    ];
  }
  return [];
}

function setWarnings({ set }: PropProjection): Warning[] {
  const warnings: Warning[] = [];
  if (set.partBatch) {
    const { newCells, ofCells } = set.partBatch;
    warnings.push({
      code: 'part-batch',
      text: `Only ${newCells} of ${ofCells} cells were new: the oldest decide, and a driven-down cell may leak. Plan a whole set.`,
    });
  }
  if (set.mixedKinds) {
    warnings.push({
      code: 'mixed-kinds',
      text: 'Two kinds of cell share this holder. The weaker is driven backwards and may leak or heat: put in one kind, all new.',
    });
  }
  return warnings;
}

/** Largest capacities that are made, mAh, for a cell of at most this mass, g. Common practice, no source. */
const LARGEST_MADE: Partial<
  Record<CellType['kind'], { massG: number; mah: number; words: string; instead: number }>
> = {
  'lithium-ion': { massG: 52, mah: 3600, words: '18650', instead: 1000 },
  nickel: { massG: 33, mah: 2800, words: 'nickel AA', instead: 2000 },
  'nickel-standard': { massG: 33, mah: 2800, words: 'nickel AA', instead: 2000 },
  coin: { massG: 3.6, mah: 260, words: 'CR2032', instead: 220 },
};

function labelWarnings(type: CellType): Warning[] {
  const largest = LARGEST_MADE[type.kind];
  if (!largest || type.massG > largest.massG || type.capacityMah <= largest.mah) return [];
  return [
    {
      code: 'label-unreal',
      text: `No ${largest.words} made holds ${type.capacityMah} mAh; cells with such labels gave far less when tested. Use ${largest.instead} until you have measured one.`,
    },
  ];
}

function coldWarnings({ cellSet, depletion }: PropProjection): Warning[] {
  const coldestC = depletion.decidingC.reduce((least, tempC) => Math.min(least, tempC), Infinity);
  const { ratedFromC, words } = CELL_KINDS[cellSet.type.kind];
  if (coldestC < ratedFromC) {
    return [
      {
        code: 'below-rating',
        text: `${words} cells are rated down to ${ratedFromC} °C and the coldest night here is ${round(coldestC, 0)} °C: the sum is a guess there.`,
      },
    ];
  }
  const weak = ['alkaline', 'zinc-carbon', 'nickel', 'nickel-standard', 'coin'].includes(cellSet.type.kind);
  if (weak && coldestC < 0) {
    return [
      {
        code: 'cold-figures-weak',
        text: `Below 0 °C nobody publishes what ${words.toLowerCase()} cells give at a small draw: the figures are estimates and the range is wide.`,
      },
    ];
  }
  return [];
}
