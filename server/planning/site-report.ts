import { type Evening, eveningOf } from '../model/evening.ts';
import type { SiteForecastProp } from '../model/forecast.ts';
import { type NotProjected, type PropProjection, rangeOf } from '../model/prop-forecast.ts';
import { notProjectedWarning } from '../model/warnings.ts';
import { eveningWords } from './evening-words.ts';
import { type Asked, causeOf, courseOf, isProjected, leftShareAt, swapByFor } from './forecast-report.ts';
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
    lastSeen: lastSeen?.seen ?? null,
  });
  const dim = rangeOf(outcome.from, outcome.chanceBright);
  return {
    ...who,
    group,
    dim,
    dark: rangeOf(outcome.from, outcome.chanceLit),
    swapBy: swapByFor(outcome, wanted),
    cause: causeOf(outcome, dim),
    chanceBrightToNextRound,
    leftShare: leftShareAt(outcome, asked),
    lastSeen: lastSeen?.seen ?? null,
    note: noteOf({ group, chance: chanceBrightToNextRound, asked, reach, lastSeen }),
  };
}

function noteOf(of: {
  group: Group;
  chance: number;
  asked: Asked;
  reach: { rounds: readonly Evening[] };
  lastSeen: { seen: string; at: number } | null;
}): string | null {
  const { lastSeen, asked } = of;
  if (lastSeen?.seen === 'dim' || lastSeen?.seen === 'dark') {
    return `Seen ${lastSeen.seen} on ${eveningWords(eveningOf(lastSeen.at, asked.season.place.timeZone))}: it wants a swap now.`;
  }
  const next = of.reach.rounds[0];
  const until = next ? `the round on ${eveningWords(next)}` : 'a week from now';
  if (of.group === 'at-risk') {
    return `${Math.round(of.chance * 100)} % sure to stay bright past ${until}; ${Math.round(asked.wanted.confidence * 100)} % is wanted.`;
  }
  if (of.group === 'next-round') return `Lasts past ${until}, not to the round after it.`;
  return null;
}
