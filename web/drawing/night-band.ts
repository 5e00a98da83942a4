import { degrees } from '../words/quantity.ts';
import { dateWords, minutesPastNoon } from '../words/time.ts';
import { dateAxis } from './date-axis.ts';
import { type EveningScale, eveningScale, type Scale, straight } from './scale.ts';
import { markShape } from './sign.ts';
import { type Drawing, draw, group, path, picture, rect, round } from './svg.ts';

/** One evening of the band; wall times of the site, 'HH:MM'. */
export type BandNight = {
  evening: string;
  dusk: string | null;
  dawn: string | null;
  sun: 'never-dark' | 'never-light' | null;
  gate: { opensAt: string; closesAt: string; calledOff: boolean } | null;
  minC: number;
};

/** Below this the night is marked as cold, °C, its lowest hour. Ours: frost on the grass. */
export const FROST_C = 2;

const GUTTER = 46;
const RIGHT = 10;
const TOP = 8;
const BAND = 150;
const COLD_Y = TOP + BAND + 14;
const AXIS_Y = COLD_Y + 14;
const HEIGHT = AXIS_Y + 30;

/**
 * Each night's dusk and dawn by the wall clock: time runs down from early evening to the morning, one
 * column a night. Gate hours stand inside, crossed out when called off; cold nights are marked below.
 */
export function nightBand(
  nights: BandNight[],
  options: { width: number; label: string; tonight: string | null },
): Drawing {
  const frame = { width: options.width, height: HEIGHT, className: 'band', label: options.label };
  const first = nights[0];
  const last = nights.at(-1);
  if (!first || !last)
    return picture({ ...frame, height: 30 }, [
      draw('text', { class: 'axis-word', x: GUTTER, y: 20 }, ['no nights']),
    ]);
  const x = eveningScale({ from: first.evening, through: last.evening }, [GUTTER, options.width - RIGHT]);
  const [fromMinutes, throughMinutes] = clockSpan(nights);
  const y = straight([fromMinutes, throughMinutes], [TOP, TOP + BAND]);
  return picture(frame, [
    rect('band-day', { x: GUTTER, y: TOP, width: options.width - GUTTER - RIGHT, height: BAND }),
    ...nights.map((night) => darkColumn(night, { x, y, span: [fromMinutes, throughMinutes] })),
    hourLines([fromMinutes, throughMinutes], y, options.width - RIGHT),
    ...nights.map((night) => gateColumn(night, x, y)),
    ...nights.map((night) => coldMark(night, x)),
    dateAxis(
      nights.map(({ evening }) => evening),
      x,
      AXIS_Y,
    ),
    options.tonight !== null && x.has(options.tonight)
      ? rect(
          'band-tonight',
          { x: x.left(options.tonight), y: TOP - 4, width: x.columnWidth, height: AXIS_Y - TOP + 2 },
          { rx: 2 },
        )
      : null,
  ]);
}

/** Whole hours past noon that hold every dusk, dawn and gate; the whole day where it never gets light. */
export function clockSpan(nights: BandNight[]): [number, number] {
  if (nights.some(({ sun }) => sun === 'never-light')) return [0, 1440];
  const minutes = nights.flatMap(({ dusk, dawn, gate }) => {
    const walls = [dusk, dawn, gate?.opensAt ?? null, gate?.closesAt ?? null];
    return walls.filter((wall) => wall !== null).map(minutesPastNoon);
  });
  if (minutes.length === 0) return [0, 1440];
  return [
    Math.max(0, Math.floor(Math.min(...minutes) / 60) * 60),
    Math.min(1440, Math.ceil(Math.max(...minutes) / 60) * 60),
  ];
}

function darkColumn(
  night: BandNight,
  scales: { x: EveningScale; y: Scale; span: [number, number] },
): Drawing | null {
  const { x, y, span } = scales;
  if (night.sun === 'never-dark') return null;
  const dusk = night.dusk === null ? span[0] : minutesPastNoon(night.dusk);
  const dawn = night.dawn === null ? span[1] : minutesPastNoon(night.dawn);
  if (dawn <= dusk) return null;
  // A hair wider than the column, or the paper shines through between two of them.
  return rect('band-dark', {
    x: x.left(night.evening),
    y: y(dusk),
    width: x.columnWidth + 0.4,
    height: y(dawn) - y(dusk),
  });
}

function gateColumn(night: BandNight, x: EveningScale, y: Scale): Drawing | null {
  if (!night.gate) return null;
  const opens = minutesPastNoon(night.gate.opensAt);
  const closes = minutesPastNoon(night.gate.closesAt);
  const gap = x.columnWidth > 8 ? 2 : 0.5;
  const box = {
    x: x.left(night.evening) + gap,
    y: y(opens),
    width: x.columnWidth - 2 * gap,
    height: Math.max(2, y(closes) - y(opens)),
  };
  const right = round(box.x + box.width);
  const cross = `M${round(box.x)} ${round(box.y)}L${right} ${round(box.y + box.height)}M${round(box.x)} ${round(box.y + box.height)}L${right} ${round(box.y)}`;
  const words = `${dateWords(night.evening)}: gate ${night.gate.opensAt} to ${night.gate.closesAt}${night.gate.calledOff ? ', called off' : ''}`;
  return draw('g', { class: night.gate.calledOff ? 'gate gate-off' : 'gate' }, [
    draw('title', {}, [words]),
    rect('gate-box', box),
    night.gate.calledOff ? path('gate-cross', cross) : null,
  ]);
}

function coldMark(night: BandNight, x: EveningScale): Drawing | null {
  if (night.minC >= FROST_C) return null;
  return draw(
    'g',
    { class: 'mark mark-cold', transform: `translate(${round(x.middle(night.evening))} ${COLD_Y})` },
    [
      draw('title', {}, [`${dateWords(night.evening)}: down to ${degrees(night.minC)}`]),
      ...(x.columnWidth >= 5 ? markShape('cold') : [path('mark-cold', 'M0 -4V4')]),
    ],
  );
}

function hourLines(span: [number, number], y: Scale, right: number): Drawing {
  const step = span[1] - span[0] > 960 ? 240 : 120;
  const lines: Drawing[] = [];
  for (let minutes = Math.ceil(span[0] / step) * step; minutes <= span[1]; minutes += step) {
    const hour = String((12 + minutes / 60) % 24).padStart(2, '0');
    lines.push(path('band-hour', `M${GUTTER} ${round(y(minutes))}H${round(right)}`));
    lines.push(draw('text', { class: 'row-name', x: GUTTER - 6, y: y(minutes) + 4 }, [`${hour}:00`]));
  }
  return group('band-hours', lines);
}
