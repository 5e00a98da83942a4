import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clockSpan, nightBand } from '../../../web/drawing/night-band.ts';
import { eveningScale, labelledEvenings } from '../../../web/drawing/scale.ts';
import { seasonWick, strengths } from '../../../web/drawing/season-wick.ts';
import { hatching, throughPoints } from '../../../web/drawing/svg.ts';
import { addDays } from '../../../web/words/time.ts';
import { BANDS, SEASONS } from './made-up.ts';
import { elementsOf } from './svg-text.ts';

const byClass = (drawing: Parameters<typeof elementsOf>[0], name: string) =>
  elementsOf(drawing).filter(({ props }) => String(props.class).split(' ').includes(name));

describe('places on the paper', () => {
  it('gives every evening a column of the same width, side by side', () => {
    const count = fc.integer({ min: 1, max: 400 });
    fc.assert(
      fc.property(count, fc.integer({ min: 100, max: 2000 }), (nights, width) => {
        const from = '2026-03-01';
        const scale = eveningScale({ from, through: addDays(from, nights - 1) }, [40, width]);
        expect(scale.left(from)).toBe(40);
        expect(scale.left(addDays(from, nights - 1)) + scale.columnWidth).toBeCloseTo(width, 6);
        expect(scale.has(addDays(from, nights))).toBe(false);
        expect(scale.has(addDays(from, -1))).toBe(false);
      }),
    );
  });

  it('labels no more evenings than there is room for', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 200 }),
        fc.double({ min: 3, max: 60, noNaN: true }),
        (nights, columnWidth) => {
          const evenings = Array.from({ length: nights }, (_, day) => addDays('2026-10-10', day));
          const labelled = labelledEvenings(evenings, columnWidth);
          expect(labelled.length).toBeGreaterThan(0);
          for (const [place, evening] of labelled.entries()) {
            const next = labelled[place + 1];
            if (next)
              expect(
                (evenings.indexOf(next) - evenings.indexOf(evening)) * columnWidth,
              ).toBeGreaterThanOrEqual(30);
          }
        },
      ),
    );
  });

  it('hatches up to the edges of a box and not over them', () => {
    const size = fc.double({ min: 0.5, max: 300, noNaN: true });
    fc.assert(
      fc.property(size, size, (width, height) => {
        const numbers = [...hatching({ x: 10, y: 20, width, height }).matchAll(/[ML](-?[\d.]+) (-?[\d.]+)/g)];
        for (const [, x, y] of numbers) {
          expect(Number(x)).toBeGreaterThanOrEqual(9.99);
          expect(Number(x)).toBeLessThanOrEqual(10 + width + 0.01);
          expect(Number(y)).toBeGreaterThanOrEqual(19.99);
          expect(Number(y)).toBeLessThanOrEqual(20 + height + 0.01);
        }
      }),
    );
  });

  it('breaks a line where a value is missing', () => {
    expect(throughPoints([{ x: 0, y: 1 }, { x: 1, y: 1 }, null, { x: 3, y: 0 }])).toBe('M0 1L1 1M3 0');
  });
});

describe('the night band', () => {
  it('shows whole hours around every dusk, dawn and gate', () => {
    // 17:25 is 325 minutes past noon, 07:10 is 1150: whole hours 300 (17:00) and 1200 (08:00).
    expect(clockSpan(BANDS['band-clock-change']!)).toEqual([300, 1200]);
  });

  it('shows the whole day where it never gets light or never dark', () => {
    expect(clockSpan(BANDS['band-polar-night']!)).toEqual([0, 1440]);
    expect(clockSpan(BANDS['band-midnight-sun']!)).toEqual([0, 1440]);
  });

  it('has a dark column for each night with darkness, and none under the midnight sun', () => {
    const draw = (name: string) => nightBand(BANDS[name]!, { width: 640, label: name, tonight: null });
    expect(byClass(draw('band-clock-change'), 'band-dark')).toHaveLength(10);
    expect(byClass(draw('band-polar-night'), 'band-dark')).toHaveLength(8);
    expect(byClass(draw('band-midnight-sun'), 'band-dark')).toHaveLength(0);
  });

  it('crosses a gate out only when it is called off, and marks each cold night', () => {
    const drawing = nightBand(BANDS['band-clock-change']!, { width: 640, label: 'x', tonight: null });
    expect(byClass(drawing, 'gate-box')).toHaveLength(4);
    expect(byClass(drawing, 'gate-cross')).toHaveLength(1);
    expect(byClass(drawing, 'mark-cold').filter(({ type }) => type === 'g')).toHaveLength(3);
  });
});

describe('the wick through the season', () => {
  it('gives a light back after the cold: being lit counts then, not having been bright all along', () => {
    const strong = strengths(SEASONS['season-cold-and-back']!.nights);
    expect(strong[16]).toBe(1);
    expect(strong[18]).toBe(0.1);
    expect(strong[20]).toBe(0.95);
  });

  it('leaves out what happened outside of the season', () => {
    const drawing = seasonWick(SEASONS['season-fading']!, { width: 640, label: 'x' });
    expect(byClass(drawing, 'season-marks').flatMap(({ props }) => props.children)).toHaveLength(2);
  });

  it('says so when there is no set', () => {
    const drawing = seasonWick(SEASONS['season-no-set']!, { width: 640, label: 'x' });
    expect(byClass(drawing, 'axis-word').map(({ props }) => props.children)).toEqual(['no set on record']);
  });
});
