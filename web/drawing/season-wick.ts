import { dateAxis } from './date-axis.ts';
import { type EveningScale, eveningScale, straight } from './scale.ts';
import { type Mark, markShape } from './sign.ts';
import {
  type Box,
  type Drawing,
  draw,
  group,
  hatching,
  path,
  picture,
  rect,
  round,
  throughPoints,
  words,
} from './svg.ts';

/** One evening of a prop's season. */
export type SeasonNight = {
  evening: string;
  litHours: number;
  /** Share of that night's usable charge still there, 0..1; null = no set. */
  leftShare: number | null;
  /** Chance of bright light on this and every earlier evening, 0..1. */
  chanceBright: number;
  /** Chance that it is lit at all, 0..1; comes back after a cold night. */
  chanceLit: number;
  likely: 'bright' | 'dim' | 'dark-cold' | 'dark-used-up' | 'not-lit';
  meanC: number;
  showNight: boolean;
};

export type SeasonValues = {
  nights: SeasonNight[];
  marks: { evening: string; mark: Mark; text: string }[];
  tonight: string | null;
  nextRound: string | null;
  swapBy: string | null;
};

/** Nights whose mean is below this are marked: alkaline gives clearly less there. Ours: near freezing. */
export const COLD_C = 2;

const STRANDS = 9;
const GUTTER = 46;
const RIGHT = 10;
const ROWS = {
  marks: { y: 16, height: 18 },
  wick: { y: 42, height: 36 },
  share: { y: 94, height: 56 },
  hours: { y: 166, height: 36 },
  cold: { y: 210, height: 16 },
  axis: { y: 228, height: 28 },
};
const HEIGHT = 258;

/**
 * A prop's wick through the season. Each of nine strands lasts as long as the chance of bright light allows, so its
 * thickness on a night is that chance and its end is frayed. Below stand the share of charge left, the hours lit
 * and the cold nights, which can put a light out and give it back.
 */
export function seasonWick(values: SeasonValues, options: { width: number; label: string }): Drawing {
  const frame = { width: options.width, height: HEIGHT, className: 'season', label: options.label };
  const first = values.nights[0];
  const last = values.nights.at(-1);
  if (!first || !last) {
    const middle = ROWS.wick.y + ROWS.wick.height / 2;
    const line = path('wick-unknown', `M${GUTTER} ${middle}H${round(options.width - RIGHT)}`);
    return picture({ ...frame, height: ROWS.share.y }, [
      line,
      words('axis-word', { x: GUTTER, y: middle + 22 }, 'no set on record'),
    ]);
  }
  const x = eveningScale({ from: first.evening, through: last.evening }, [GUTTER, options.width - RIGHT]);
  return picture(frame, [
    showNightTicks(values.nights, x),
    axis(values.nights, x),
    rowNames(values.nights),
    guides(values, x),
    wickRow(values.nights, x),
    shareRow(values.nights, x),
    hoursRow(values.nights, x),
    coldRow(values.nights, x),
    marksRow(values.marks, x),
  ]);
}

/** How much of the wick is there on a night. Once the cold has given a light back, being lit is what counts. */
export function strengths(nights: SeasonNight[]): number[] {
  let coldBefore = false;
  return nights.map((night) => {
    if (night.likely === 'dark-cold') coldBefore = true;
    const isBack = coldBefore && night.likely === 'bright';
    return isBack ? Math.max(night.chanceBright, night.chanceLit) : night.chanceBright;
  });
}

function wickRow(nights: SeasonNight[], x: EveningScale): Drawing {
  const { y, height } = ROWS.wick;
  const strong = strengths(nights);
  const strandPaths = Array.from({ length: STRANDS }, (_, rank) => {
    // The middle strand lasts longest: ranks go to the rows from the outside in.
    const row = rank % 2 === 0 ? rank / 2 : STRANDS - 1 - (rank - 1) / 2;
    const strandY = round(y + ((row + 0.5) * height) / STRANDS);
    const isThere = (index: number) => {
      const night = nights[index]!;
      return strong[index]! >= 1 - (rank + 0.5) / STRANDS && night.likely !== 'dark-cold';
    };
    return runsOf(nights, (_, index) => isThere(index))
      .map(
        ({ from, through }) =>
          `M${round(x.left(nights[from]!.evening))} ${strandY}H${round(rightOf(nights[through]!, x))}`,
      )
      .join('');
  });
  const boxesOf = (likely: SeasonNight['likely']) =>
    runsOf(nights, (night) => night.likely === likely).map(({ from, through }): Box => {
      const left = x.left(nights[from]!.evening);
      return { x: left, y, width: rightOf(nights[through]!, x) - left, height };
    });
  const dark = [...boxesOf('dark-used-up'), ...boxesOf('dark-cold')];
  return group('season-wick', [
    ...boxesOf('dim').map((box) => path('wick-dim', hatching(box, 6))),
    path(
      'wick-open',
      dark
        .map(
          (box) =>
            `M${round(box.x)} ${y}h${round(box.width)}m${round(-box.width)} ${height}h${round(box.width)}`,
        )
        .join(''),
    ),
    path('wick-strand season-strand', strandPaths.join('')),
    ...boxesOf('dark-cold').map((box) =>
      shapeAt('cold', { x: box.x + box.width / 2, y: y + height / 2 }, null),
    ),
  ]);
}

const rightOf = (night: SeasonNight, x: EveningScale) => x.left(night.evening) + x.columnWidth;

/** Runs of neighbouring nights that pass, by index. */
function runsOf(nights: SeasonNight[], passes: (night: SeasonNight, index: number) => boolean) {
  const runs: { from: number; through: number }[] = [];
  nights.forEach((night, index) => {
    if (!passes(night, index)) return;
    const run = runs.at(-1);
    if (run && run.through === index - 1) run.through = index;
    else runs.push({ from: index, through: index });
  });
  return runs;
}

function shareRow(nights: SeasonNight[], x: EveningScale): Drawing {
  const { y, height } = ROWS.share;
  const up = straight([0, 1], [y + height, y]);
  const line = throughPoints(
    nights.map((night) =>
      night.leftShare === null ? null : { x: x.middle(night.evening), y: up(night.leftShare) },
    ),
  );
  const dots =
    nights.length === 1 && nights[0]!.leftShare !== null
      ? [point(x.middle(nights[0]!.evening), up(nights[0]!.leftShare))]
      : [];
  return group('season-share', [
    path(
      'row-line',
      `M${GUTTER} ${y}H${round(endOf(nights, x))}M${GUTTER} ${y + height}H${round(endOf(nights, x))}`,
    ),
    path('share-line', line),
    ...dots,
  ]);
}

const point = (x: number, y: number) => draw('circle', { class: 'share-point', cx: x, cy: y, r: 3 });
const endOf = (nights: SeasonNight[], x: EveningScale) => rightOf(nights.at(-1)!, x);

function hoursRow(nights: SeasonNight[], x: EveningScale): Drawing {
  const { y, height } = ROWS.hours;
  const most = Math.max(1, ...nights.map((night) => night.litHours));
  const gap = x.columnWidth > 6 ? 1.5 : 0;
  const bars = nights.map((night) => {
    const barHeight = (night.litHours / most) * height;
    const box = {
      x: x.left(night.evening) + gap / 2,
      y: y + height - barHeight,
      width: x.columnWidth - gap,
      height: barHeight,
    };
    return barHeight > 0 ? rect('hours-bar', box) : null;
  });
  return group('season-hours', [
    path('row-line', `M${GUTTER} ${y + height}H${round(endOf(nights, x))}`),
    ...bars,
  ]);
}

function coldRow(nights: SeasonNight[], x: EveningScale): Drawing {
  const { y, height } = ROWS.cold;
  const marks = runsOf(nights, (night) => night.meanC < COLD_C).flatMap(({ from, through }) => {
    const left = x.left(nights[from]!.evening);
    const right = rightOf(nights[through]!, x);
    return [
      path('cold-run', `M${round(left)} ${y + 3}V${y + height / 2}H${round(right)}V${y + 3}`),
      shapeAt('cold', { x: (left + right) / 2, y: y + height / 2 }, null),
    ];
  });
  return group('season-cold', marks);
}

function marksRow(marks: SeasonValues['marks'], x: EveningScale): Drawing {
  const y = ROWS.marks.y + ROWS.marks.height / 2;
  const shown = marks.filter(({ evening }) => x.has(evening));
  return group(
    'season-marks',
    shown.map(({ evening, mark, text }) => shapeAt(mark, { x: x.middle(evening), y }, text)),
  );
}

function shapeAt(mark: Mark, at: { x: number; y: number }, text: string | null): Drawing {
  return draw('g', { class: `mark mark-${mark}`, transform: `translate(${round(at.x)} ${round(at.y)})` }, [
    text ? draw('title', {}, [text]) : null,
    ...markShape(mark),
  ]);
}

/** Room two words need beside each other above their lines. */
const GUIDE_WORDS_WIDTH = 46;

function guides(values: SeasonValues, x: EveningScale): Drawing {
  const { tonight, nextRound } = values;
  const isSame = tonight === nextRound;
  const at = (evening: string | null) => (evening !== null && x.has(evening) ? x.middle(evening) : null);
  const tonightAt = at(tonight);
  const roundAt = isSame ? null : at(nextRound);
  const isTight = tonightAt !== null && roundAt !== null && Math.abs(roundAt - tonightAt) < GUIDE_WORDS_WIDTH;
  const guide = (place: number, of: { name: string; text: string; side: 'middle' | 'start' | 'end' }) => [
    path(`guide-${of.name}`, `M${round(place)} ${ROWS.marks.y}V${ROWS.axis.y}`),
    draw('text', { class: `guide-word side-${of.side}`, x: place, y: 11 }, [of.text]),
  ];
  return group('season-guides', [
    ...(tonightAt === null
      ? []
      : guide(tonightAt, {
          name: 'tonight',
          text: isSame ? 'tonight: round' : 'tonight',
          side: isTight ? 'end' : 'middle',
        })),
    ...(roundAt === null
      ? []
      : guide(roundAt, { name: 'round', text: 'round', side: isTight ? 'start' : 'middle' })),
  ]);
}

function rowNames(nights: SeasonNight[]): Drawing {
  const most = Math.max(1, ...nights.map((night) => night.litHours));
  const name = (y: number, text: string) => draw('text', { class: 'row-name', x: GUTTER - 6, y }, [text]);
  return group('season-names', [
    name(ROWS.wick.y + ROWS.wick.height / 2 + 4, 'wick'),
    name(ROWS.share.y + 8, '100 %'),
    name(ROWS.share.y + ROWS.share.height / 2 + 4, 'left'),
    name(ROWS.share.y + ROWS.share.height, '0'),
    name(ROWS.hours.y + 8, `${Math.round(most)} h`),
    name(ROWS.hours.y + ROWS.hours.height, 'lit'),
    nights.some(({ meanC }) => meanC < COLD_C) ? name(ROWS.cold.y + 13, 'cold') : null,
  ]);
}

function showNightTicks(nights: SeasonNight[], x: EveningScale): Drawing {
  const boxes = runsOf(nights, (night) => night.showNight).map(({ from, through }) => {
    const left = x.left(nights[from]!.evening);
    return rect('show-run', {
      x: left,
      y: ROWS.marks.y,
      width: rightOf(nights[through]!, x) - left,
      height: ROWS.axis.y - ROWS.marks.y,
    });
  });
  return group('season-shows', boxes);
}

function axis(nights: SeasonNight[], x: EveningScale): Drawing {
  return dateAxis(
    nights.map(({ evening }) => evening),
    x,
    ROWS.axis.y,
  );
}
