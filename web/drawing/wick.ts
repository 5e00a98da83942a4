import { type Drawing, draw, hatching, path, picture, round } from './svg.ts';

/**
 * A set as a wick. Its whole length is the time a full set would stay bright here; what is lit of it is the share
 * left. The strands end at different places over the 80 % range, so the end is frayed and never a hard date.
 * Then comes the hatched part, where it looks dim, and the open end, where it is dark.
 */
export type WickValues = {
  /** Share of tonight's usable charge still there, 0..1; null = nobody knows. */
  leftShare: number | null;
  /** Nights from tonight, 80 % range; null = not within the season. */
  dim: { earlyNights: number | null; likelyNights: number | null; lateNights: number | null };
  darkLikelyNights: number | null;
  /** Nights from tonight to the next round, drawn as a knot; null = none planned. */
  roundNights: number | null;
  /** Out of light for the cold, with charge still in it. */
  coldOut: boolean;
};

export const STRANDS = 5;
const STRAND_HEIGHT = 2;
const STRAND_GAP = 1.4;
/** Room for a full set and the dim tail behind it. */
const WHOLE = 1.2;
const PAD = 4;

export type WickGeometry = {
  /** Ends of the strands, as shares of a full set's bright life; the outer ones first. */
  strandShares: number[];
  hatchedFrom: number;
  hatchedThrough: number;
  roundShare: number | null;
};

/** Places on the wick, as shares of a full set's bright life; null when nothing is known. */
export function wickGeometry(values: WickValues): WickGeometry | null {
  const { leftShare, dim, darkLikelyNights, roundNights } = values;
  if (leftShare === null) return null;
  const left = clamp(leftShare, 0, 1);
  const likely = dim.likelyNights;
  // The pace: how much of a full set goes in one night, as far as the answer in nights tells.
  const pace = likely !== null && likely > 0 && left > 0 ? left / likely : null;
  const shareAt = (nights: number | null, otherwise: number) =>
    nights === null || pace === null ? otherwise : clamp(nights * pace, 0, WHOLE);
  const early = likely !== null && likely <= 0 ? 0 : shareAt(dim.earlyNights, left);
  const late = likely !== null && likely <= 0 ? 0 : shareAt(dim.lateNights, likely === null ? left : WHOLE);
  const lit = likely !== null && likely <= 0 ? 0 : left;
  const strandShares = Array.from({ length: STRANDS }, (_, index) => {
    const quantile = (index + 0.5) / STRANDS;
    return quantile <= 0.5
      ? mix(Math.min(early, lit), lit, quantile * 2)
      : mix(lit, Math.max(late, lit), quantile * 2 - 1);
  });
  const isDark = darkLikelyNights !== null && darkLikelyNights <= 0;
  const tail = isDark ? lit : shareAt(darkLikelyNights, likely === null ? lit : lit + 0.2);
  return {
    strandShares,
    hatchedFrom: lit,
    hatchedThrough: clamp(Math.max(tail, lit), 0, WHOLE),
    roundShare: roundNights !== null && pace !== null && roundNights >= 0 ? roundNights * pace : null,
  };
}

const clamp = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);
const mix = (from: number, through: number, share: number) => from + (through - from) * share;

/** Outer strands burn first, so the frayed end narrows to the middle: which row each rank takes, top down. */
const ROW_OF_RANK = [0, 4, 1, 3, 2];

/**
 * @param values what is known of the set
 * @param options width in pixels; the label says the same in words
 */
export function wick(values: WickValues, options: { width: number; label: string }): Drawing {
  const body = STRANDS * (STRAND_HEIGHT + STRAND_GAP) - STRAND_GAP;
  const height = body + 2 * PAD;
  const x = (share: number) => PAD + (share / WHOLE) * (options.width - 2 * PAD);
  const box = (from: number, through: number) => ({
    x: x(from),
    y: PAD,
    width: x(through) - x(from),
    height: body,
  });
  const geometry = wickGeometry(values);
  const frame = { width: options.width, height, className: 'wick', label: options.label };
  if (!geometry) {
    const middle = PAD + body / 2;
    return picture(frame, [path('wick-unknown', `M${x(0)} ${round(middle)}H${round(x(WHOLE))}`)]);
  }
  const { hatchedFrom, hatchedThrough, roundShare } = geometry;
  const edge = PAD + body;
  const strands = geometry.strandShares.map((share, rank) => {
    const y = PAD + ROW_OF_RANK[rank]! * (STRAND_HEIGHT + STRAND_GAP) + STRAND_HEIGHT / 2;
    return share > 0 ? path('wick-strand', `M${round(x(0))} ${round(y)}H${round(x(share))}`) : null;
  });
  return picture(frame, [
    path(
      'wick-open',
      `M${round(x(hatchedThrough))} ${PAD}H${round(x(WHOLE))}M${round(x(hatchedThrough))} ${edge}H${round(x(WHOLE))}`,
    ),
    hatchedThrough > hatchedFrom ? path('wick-dim', hatching(box(hatchedFrom, hatchedThrough))) : null,
    draw('g', { class: values.coldOut ? 'wick-cold' : 'wick-lit' }, strands),
    path('wick-root', `M${round(x(0))} ${PAD - 2}V${edge + 2}`),
    roundShare !== null && roundShare <= WHOLE ? path('wick-knot', knotAt(x(roundShare), height)) : null,
  ]);
}

const knotAt = (x: number, height: number) =>
  `M${round(x)} 0V${round(height)}M${round(x - 3.5)} 0H${round(x + 3.5)}M${round(x - 3.5)} ${round(height)}H${round(x + 3.5)}`;
