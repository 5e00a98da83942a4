import { builtInCellType } from '../../server/model/cell-types-built-in.ts';
import { type Evening, eveningOf, type Instant } from '../../server/model/evening.ts';
import type { Prop } from '../../server/model/prop.ts';
import type { PropProjection } from '../../server/model/prop-forecast.ts';
import type { Season } from '../../server/model/schedule.ts';
import { litEvening } from '../../server/model/switching.ts';
import type { PlainQuestion } from '../bench/hour-by-hour.ts';
import { airC, PLACE } from './many-props.ts';

/** The question of a projection, put to the plain hour-by-hour reference. */
export function plainQuestion(
  of: { prop: Prop; season: Season; fittedAt: Instant; projection: PropProjection },
  factor: number,
): PlainQuestion {
  const { prop, season, fittedAt, projection } = of;
  const firstEvening = eveningOf(fittedAt, PLACE.timeZone);
  const circumstances = (evening: Evening) => ({
    evening,
    place: PLACE,
    showNight: season.showNights.get(evening) ?? null,
    poweredSinceAt: fittedAt,
  });
  return {
    prop,
    type: builtInCellType(prop.cellTypeId)!,
    fittedAt,
    firstEvening,
    through: season.through,
    timeZone: PLACE.timeZone,
    litSpells: (evening) => litEvening(prop.switching, circumstances(evening)).spells,
    airC,
    trips: (evening) =>
      season.showNights.has(evening) ? (prop.trips?.perShowNight ?? 0) : (prop.trips?.perNightOff ?? 0),
    meanMa: projection.load.meanMa ?? 0,
    peakMa: Math.max(projection.load.peakMa, prop.trips?.runMa ?? 0),
    rateMa: projection.rateMa,
    standbyMa: projection.load.standbyMa,
    stopVolts: projection.stopVolts,
    factor,
  };
}
