/** Numbers and evenings to places on the paper. */
export type Scale = (value: number) => number;

/** A straight scale; a domain without width puts everything in the middle. */
export function straight(domain: [number, number], range: [number, number]): Scale {
  const [from, through] = domain;
  const [start, end] = range;
  if (from === through) return () => (start + end) / 2;
  return (value) => start + ((value - from) / (through - from)) * (end - start);
}

const DAY_MS = 86_400_000;
const dayOf = (evening: string) => Math.round(Date.parse(`${evening}T00:00:00Z`) / DAY_MS);

export type EveningScale = {
  /** Left edge of an evening's column. */
  left: (evening: string) => number;
  middle: (evening: string) => number;
  columnWidth: number;
  has: (evening: string) => boolean;
};

/** One column per evening, first to last, both included. */
export function eveningScale(span: { from: string; through: string }, range: [number, number]): EveningScale {
  const first = dayOf(span.from);
  const count = Math.max(1, dayOf(span.through) - first + 1);
  const columnWidth = (range[1] - range[0]) / count;
  const left = (evening: string) => range[0] + (dayOf(evening) - first) * columnWidth;
  return {
    left,
    middle: (evening) => left(evening) + columnWidth / 2,
    columnWidth,
    has: (evening) => dayOf(evening) >= first && dayOf(evening) < first + count,
  };
}

/**
 * The evenings that get a label: as many as there is room for, evenly apart; over a longer season whole weeks apart, on
 * Mondays.
 * @param widthEach pixels a label needs
 */
export function labelledEvenings(evenings: string[], columnWidth: number, widthEach = 30): string[] {
  const step = Math.max(1, Math.ceil(widthEach / columnWidth));
  if (step <= 4 || evenings.length < 14) return evenings.filter((_, index) => index % step === 0);
  const weeks = Math.ceil(step / 7);
  const mondays = evenings.filter((evening) => new Date(`${evening}T00:00:00Z`).getUTCDay() === 1);
  return mondays.filter((_, index) => index % weeks === 0);
}
