import { type Evening, eveningOf } from '../model/evening.ts';
import type { SiteForecastProp } from '../model/forecast.ts';
import type { NotProjected, PropProjection } from '../model/prop-forecast.ts';
import { notProjectedWarning } from '../model/warnings.ts';
import { eveningWeather } from '../model/weather.ts';
import { eveningWords } from './evening-words.ts';
import {
  type Asked,
  causeOf,
  courseOf,
  isProjected,
  leftShareAt,
  rangesOf,
  swapByFor,
} from './forecast-report.ts';
import { type Group, groupOf } from './need.ts';

/** One prop's line in the site's forecast. @param reach the next two rounds and the site's margin */
export function siteForecastProp(
  asked: Asked,
  outcome: PropProjection | NotProjected,
  reach: { rounds: readonly Evening[]; marginNights: number },
): SiteForecastProp {
  const { id: propId, tag, name, zone, importance } = asked.prop;
  const who = { propId, tag, name, zone, importance };
  const lastSeen = outcome.set?.lastSeen ?? null;
  if (!isProjected(outcome)) {
    return {
      ...who,
      group: 'unknown',
      dim: { early: null, likely: null, late: null },
      dark: { early: null, likely: null, late: null },
      swapBy: null,
      cause: null,
      chanceBrightToNextRound: null,
      leftShare: null,
      lastSeen: lastSeen?.seen ?? null,
      note: notProjectedWarning(asked.prop, outcome).text,
    };
  }
  const { wanted } = asked;
  const { group, chanceBrightToNextRound } = groupOf(courseOf(outcome), wanted, {
    ...reach,
    failing: outcome.set.failing !== null,
  });
  const { dim, dark } = rangesOf(outcome, asked);
  return {
    ...who,
    group,
    dim,
    dark,
    swapBy: swapByFor(outcome, wanted),
    cause: causeOf(outcome, dim),
    chanceBrightToNextRound,
    leftShare: leftShareAt(outcome, asked),
    lastSeen: lastSeen?.seen ?? null,
    note: noteOf({ group, chance: chanceBrightToNextRound, asked, reach, projection: outcome }),
  };
}

/** Cells that fail below this are as likely cold as flat. Common practice, no source. */
const MAYBE_COLD_C = 2;

function noteOf(of: {
  group: Group;
  chance: number;
  asked: Asked;
  reach: { rounds: readonly Evening[] };
  projection: PropProjection;
}): string | null {
  const { asked, projection } = of;
  const { failing } = projection.set;
  if (failing && of.group === 'at-risk') return seenNote(asked, projection, failing);
  const next = of.reach.rounds[0];
  const until = next ? `the round on ${eveningWords(next)}` : 'a week from now';
  if (of.group === 'at-risk') {
    return `${Math.round(of.chance * 100)} % sure to stay bright past ${until}; ${Math.round(asked.wanted.confidence * 100)} % is wanted.`;
  }
  if (of.group === 'next-round') return `Lasts past ${until}, not to the round after it.`;
  return null;
}

function seenNote(
  asked: Asked,
  projection: PropProjection,
  { seen, at }: { seen: string; at: number },
): string {
  const { place, weather } = asked.season;
  const evening = eveningOf(at, place.timeZone);
  const airC = eveningWeather(weather, evening).minC + projection.offsetC;
  const when = `Seen ${seen} on ${eveningWords(evening)}`;
  if (airC > MAYBE_COLD_C || leftShareAt(projection, asked) < 0.2) return `${when}: it wants a swap now.`;
  return `${when}, a night down to ${Math.round(airC)} °C: maybe cold, not flat. Swap it, and warm and test the old set before binning it.`;
}
