import { dateWords, dayNumber, monthWord } from '../words/time.ts';
import { type EveningScale, labelledEvenings } from './scale.ts';
import { type Drawing, draw, group, path, round } from './svg.ts';

/** Dates under the columns; the month where it begins or changes. */
export function dateAxis(evenings: string[], x: EveningScale, y: number): Drawing {
  let month = '';
  const labels = labelledEvenings(evenings, x.columnWidth).map((evening) => {
    const isNew = monthWord(evening) !== month;
    month = monthWord(evening);
    return draw('g', { class: 'axis-date' }, [
      draw('title', {}, [dateWords(evening)]),
      draw('text', { class: 'axis-day', x: x.middle(evening), y: y + 11 }, [String(dayNumber(evening))]),
      isNew ? draw('text', { class: 'axis-month', x: x.middle(evening), y: y + 24 }, [month]) : null,
    ]);
  });
  return group('axis', [
    path(
      'row-line',
      `M${round(x.left(evenings[0]!))} ${y}H${round(x.left(evenings.at(-1)!) + x.columnWidth)}`,
    ),
    ...labels,
  ]);
}
