import { dateWords, dayNumber, monthWord, weekdayWord } from './time.ts';

type Range = { early: string | null; likely: string | null; late: string | null };

/**
 * A range of evenings in words, never a single bare date: 'Thu 22 – Sat 24 Oct'.
 * @param range 80 % range; null = not within the season
 * @param tonight the evening it is looked at from; what lies before it has happened, as likely as not
 */
export function rangeWords(range: Range, tonight: string): string {
  const { early, late } = range;
  if (early === null) return 'not this season';
  if (late !== null && late < tonight) return 'already';
  if (late === tonight) return 'tonight, if not already';
  if (early <= tonight) return late === null ? 'any night from tonight' : `tonight – ${dateWords(late)}`;
  if (late === null) return `${dateWords(early)} or later`;
  if (early === late) return `${dateWords(early)}, give or take a night`;
  const start =
    monthWord(early) === monthWord(late) ? `${weekdayWord(early)} ${dayNumber(early)}` : dateWords(early);
  return `${start} – ${dateWords(late)}`;
}

/** 'looks dim tonight – Sat 24 Oct', 'looks dim already', 'stays bright this season'. */
export function dimWords(range: Range, tonight: string): string {
  return range.early === null ? 'bright to the end of the season' : `dim ${rangeWords(range, tonight)}`;
}

/** The evening by which somebody has to be there. */
export function swapByWords(swapBy: string | null, tonight: string): string {
  if (swapBy === null) return 'no swap needed';
  if (swapBy < tonight) return `swap was due by ${dateWords(swapBy)}`;
  if (swapBy === tonight) return 'swap by tonight';
  return `swap by ${dateWords(swapBy)}`;
}

/**
 * How a deed moved the date: 'Dim: was Thu 22 – Sat 24 Oct, now Mon 2 Nov or later.'
 * @param moved the ranges before and after; null = there was nothing to reckon with
 */
export function movedWords(moved: { before: Range | null; after: Range | null; tonight: string }): string {
  const { before, after, tonight } = moved;
  const now = after ? rangeWords(after, tonight) : 'not known';
  const was = before ? rangeWords(before, tonight) : 'not known';
  return was === now ? `Dim: still ${now}.` : `Dim: was ${was}, now ${now}.`;
}
