import type { SiteForecastProp } from '../api/types.ts';
import { percent } from '../words/quantity.ts';
import { dimWords } from '../words/range.ts';
import { nightsBetween } from '../words/time.ts';
import type { WickValues } from './wick.ts';

type Prospect = Pick<SiteForecastProp, 'leftShare' | 'dim' | 'dark' | 'cause' | 'lastSeen'>;

/** From evenings to nights from tonight, which is what a wick is drawn from. */
export function wickOfProp(
  prop: Prospect,
  moment: { tonight: string; nextRound: string | null },
): WickValues {
  const nights = (evening: string | null) =>
    evening === null ? null : nightsBetween(moment.tonight, evening);
  const reckoned = nights(prop.dark.likely);
  // Somebody who saw it dim saw it lit: that beats a sum that has it dark already.
  const darkLikelyNights = prop.lastSeen === 'dim' && reckoned !== null && reckoned <= 0 ? null : reckoned;
  return {
    leftShare: prop.leftShare,
    dim: {
      earlyNights: nights(prop.dim.early),
      likelyNights: nights(prop.dim.likely),
      lateNights: nights(prop.dim.late),
    },
    darkLikelyNights,
    roundNights: nights(moment.nextRound),
    coldOut: prop.cause === 'cold' && darkLikelyNights !== null && darkLikelyNights <= 0,
  };
}

/** The same in words: '62 % left, dim Thu 22 – Sat 24 Oct'. */
export function wickWords(prop: Prospect, tonight: string): string {
  if (prop.leftShare === null) return 'Not known how much is left';
  return `${percent(prop.leftShare)} left, ${dimWords(prop.dim, tonight)}`;
}
