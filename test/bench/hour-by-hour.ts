import { CELL_KINDS, COLD_GRID_C } from '../../server/model/cell-kinds.ts';
import type { CellType } from '../../server/model/cell-type.ts';
import { rateTableOf } from '../../server/model/cell-types-built-in.ts';
import {
  type Evening,
  eveningSpan,
  eveningsFrom,
  HOUR_MS,
  type Instant,
} from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';

/**
 * The plain way to the same answer, written without any of the product's short cuts: every prop is stepped through
 * every hour of every evening, in steps that end where its light comes on or goes off, once for each drain factor
 * asked for. Each step looks up the air, the usable charge and the current afresh.
 */
export type PlainQuestion = {
  prop: Prop;
  type: CellType;
  fittedAt: Instant;
  firstEvening: Evening;
  through: Evening;
  timeZone: string;
  /** Lit spells of an evening, and the air at an instant: asked again for every step. */
  litSpells(evening: Evening): { fromAt: Instant; untilAt: Instant }[];
  airC(at: Instant): number;
  trips(evening: Evening): number;
  meanMa: number;
  peakMa: number;
  rateMa: number;
  standbyMa: number;
  stopVolts: number;
  factor: number;
};

export type PlainAnswer = {
  /** Evenings from the first, with the share of that evening's lit time bright before it went dim. null = never. */
  dimAfterNights: number | null;
  darkAfterNights: number | null;
  usedMah: number;
  litShareByEvening: number[];
};

function table(xs: readonly number[], ys: readonly number[], x: number): number {
  if (x <= xs[0]!) return ys[0]!;
  for (let i = 1; i < xs.length; i += 1) {
    if (x <= xs[i]!) return ys[i - 1]! + ((ys[i]! - ys[i - 1]!) * (x - xs[i - 1]!)) / (xs[i]! - xs[i - 1]!);
  }
  return ys[ys.length - 1]!;
}

function usedAt(volts: number, type: CellType): number {
  const { curve } = CELL_KINDS[type.kind];
  const rising = [...curve.volts].reverse();
  return table(rising, [...curve.used].reverse(), volts);
}

const WEAKEST = [0, 0.564, 0.846, 1.029, 1.163, 1.267, 1.352, 1.424];

export function usableMahPlainly(
  q: Pick<PlainQuestion, 'prop' | 'type' | 'rateMa' | 'peakMa'>,
  volts: number,
  tempC: number,
): number {
  const { prop, type } = q;
  const facts = CELL_KINDS[type.kind];
  const capacityMah = type.capacityMah * prop.parallel;
  const logHours = Math.log(q.rateMa > 0 ? capacityMah / q.rateMa : 1e9);
  const rows = facts.cold;
  const cold = table(
    rows.map((row) => Math.log(row.hoursRate)),
    rows.map((row) => table(COLD_GRID_C, row.share, tempC)),
    logHours,
  );
  const rate = rateTableOf(type);
  const rateShare = table(
    rate.ma.map((ma) => Math.log(ma)),
    rate.share,
    Math.log(Math.max(q.rateMa / prop.parallel, 1e-6)),
  );
  const { ohmAh, doublingK } = facts.polarisation;
  const sag = tempC < 20 ? (q.peakMa / capacityMah) * ohmAh * (2 ** ((20 - tempC) / doublingK) - 1) : 0;
  const cell = volts / (prop.series * type.cellsInside);
  const cut = usedAt(cell + sag, type) / usedAt(facts.cutOffVolts + sag, type);
  const weakest = 1 - WEAKEST[prop.series - 1]! * facts.unitSd;
  return capacityMah * cold * rateShare * cut * weakest;
}

function currentMa(q: PlainQuestion, usedMah: number, wholeMah: number): number {
  const { prop, type } = q;
  const { curve } = CELL_KINDS[type.kind];
  const volts = table(curve.used, curve.volts, usedMah / wholeMah) * prop.series * type.cellsInside;
  const { behaviour, measuredVolts = 0, ledVolts = 0 } = prop.load;
  if (behaviour === 'fades')
    return q.meanMa * Math.max(0.02, (volts - ledVolts) / (measuredVolts - ledVolts));
  if (behaviour === 'holds') return (q.meanMa * measuredVolts) / volts;
  return q.meanMa;
}

function selfDischargeMah(q: PlainQuestion, at: Instant, hours: number, tempC: number): number {
  const { steps, q10 } = CELL_KINDS[q.type.kind].selfDischarge;
  const days = Math.floor((at - q.fittedAt) / 86_400_000);
  const step = steps.find((candidate) => days < candidate.throughDays)!;
  return (q.type.capacityMah * q.prop.parallel * step.sharePerDay * hours * q10 ** ((tempC - 20) / 10)) / 24;
}

export function stepHourByHour(q: PlainQuestion): PlainAnswer {
  const rate = rateTableOf(q.type);
  const wholeMah =
    q.type.capacityMah *
    q.prop.parallel *
    table(
      rate.ma.map((ma) => Math.log(ma)),
      rate.share,
      Math.log(Math.max(q.rateMa / q.prop.parallel, 1e-6)),
    ) *
    (1 - WEAKEST[q.prop.series - 1]! * CELL_KINDS[q.type.kind].unitSd);
  let usedMah = 0;
  const answer: PlainAnswer = {
    dimAfterNights: null,
    darkAfterNights: null,
    usedMah: 0,
    litShareByEvening: [],
  };
  const offsetC = q.prop.offsetC ?? 0;
  eveningsFrom(q.firstEvening, q.through).forEach((evening, night) => {
    const span = eveningSpan(evening, q.timeZone);
    const spells = q.litSpells(evening);
    const litMs = spells.reduce((sum, spell) => sum + spell.untilAt - spell.fromAt, 0);
    let litDoneMs = 0;
    let brightMs = 0;
    const tripMah = q.prop.trips ? (q.trips(evening) * q.prop.trips.runMa * q.prop.trips.seconds) / 3600 : 0;
    const edges = [Math.max(span.startAt, q.fittedAt)];
    for (let at = span.startAt + HOUR_MS; at < span.endAt; at += HOUR_MS) edges.push(at);
    for (const spell of spells) edges.push(spell.fromAt, spell.untilAt);
    edges.push(span.endAt);
    const marks = [...new Set(edges)].filter((at) => at >= q.fittedAt).sort((a, b) => a - b);
    for (let k = 1; k < marks.length; k += 1) {
      const from = marks[k - 1]!;
      const hours = (marks[k]! - from) / HOUR_MS;
      const tempC = q.airC(from + (hours * HOUR_MS) / 2) + offsetC;
      const lit = spells.some((spell) => from >= spell.fromAt && from < spell.untilAt);
      const dimLimit = usableMahPlainly(q, q.prop.dimVolts, tempC);
      const darkLimit = usableMahPlainly(q, q.stopVolts, tempC);
      const wholeHours = (span.endAt - Math.max(span.startAt, q.fittedAt)) / HOUR_MS;
      let takenMah = (tripMah * hours) / wholeHours + selfDischargeMah(q, from, hours, tempC);
      // The current in the middle of the step: that at its start would be a little high for a fading light.
      const halfwayMah = usedMah + (lit ? currentMa(q, usedMah, wholeMah) * hours * q.factor : 0) / 2;
      takenMah += lit ? currentMa(q, halfwayMah, wholeMah) * hours : q.standbyMa * hours;
      takenMah *= q.factor;
      if (lit) {
        const share = takenMah > 0 ? (dimLimit - usedMah) / takenMah : 1;
        if (share < 1 && answer.dimAfterNights === null) {
          answer.dimAfterNights = night + (litDoneMs + Math.max(0, share) * hours * HOUR_MS) / litMs;
        }
        const darkShare = takenMah > 0 ? (darkLimit - usedMah) / takenMah : 1;
        if (darkShare < 1 && answer.darkAfterNights === null) {
          answer.darkAfterNights = night + (litDoneMs + Math.max(0, darkShare) * hours * HOUR_MS) / litMs;
        }
        brightMs += Math.max(0, Math.min(1, darkShare)) * hours * HOUR_MS;
        litDoneMs += hours * HOUR_MS;
        usedMah = usedMah >= darkLimit ? usedMah : Math.min(usedMah + takenMah, darkLimit);
      } else {
        usedMah += takenMah;
      }
    }
    answer.litShareByEvening.push(litMs > 0 ? brightMs / litMs : 1);
  });
  return { ...answer, usedMah };
}
