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
 * The evenings that get a label: every one where there is room, else Mondays, else the first of each month.
 * @param widthEach pixels a label needs
 */
export function labelledEvenings(evenings: string[], columnWidth: number, widthEach = 30): string[] {
  if (columnWidth >= widthEach) return evenings;
  const mondays = evenings.filter((evening) => new Date(`${evening}T00:00:00Z`).getUTCDay() === 1);
  if (evenings.length < 8 || mondays.length === 0) return evenings.slice(0, 1);
  if (columnWidth * 7 >= widthEach) return mondays;
  return mondays.filter((_, index) => index % 2 === 0);
}
