import { h, type VNode } from 'preact';

/** A drawing is a value: a tree of SVG elements made from numbers. No clock, no fetch, no measuring. */
export type Drawing = VNode;

type Attributes = Record<string, string | number | boolean | undefined>;
type Child = Drawing | string | null;

/** Hundredths of a pixel are finer than any screen; more digits only make two equal drawings differ. */
export const round = (value: number): number => Math.round(value * 100) / 100 || 0;

/** One element; numbers are rounded, absent attributes left out. */
export function draw(tag: string, attributes: Attributes, children: Child[] = []): Drawing {
  const tidy: Attributes = {};
  for (const [name, value] of Object.entries(attributes)) {
    if (value !== undefined) tidy[name] = typeof value === 'number' ? round(value) : value;
  }
  return h(tag, tidy, ...children.filter((child) => child !== null));
}

export const group = (className: string, children: Child[]): Drawing =>
  draw('g', { class: className }, children);

export type Box = { x: number; y: number; width: number; height: number };

export const rect = (className: string, box: Box, more: Attributes = {}): Drawing =>
  draw('rect', { class: className, ...box, ...more });

export type Point = { x: number; y: number };

/** A path through points, broken where a point is null. */
export function throughPoints(points: (Point | null)[]): string {
  let text = '';
  let broken = true;
  for (const point of points) {
    if (point) text += `${broken ? 'M' : 'L'}${round(point.x)} ${round(point.y)}`;
    broken = point === null;
  }
  return text;
}

export const path = (className: string, d: string, more: Attributes = {}): Drawing =>
  draw('path', { class: className, d, ...more });

export const words = (className: string, at: Point, text: string): Drawing =>
  draw('text', { class: className, ...at }, [text]);

/** Slanted strokes that fill a box and stop at its edges: hatching that needs no pattern and no id. */
export function hatching(box: Box, gap = 4): string {
  const { x, y, width, height } = box;
  let d = '';
  for (let start = gap / 2 - height; start < width; start += gap) {
    const from = Math.max(start, 0);
    const until = Math.min(start + height, width);
    if (until > from) {
      d += `M${round(x + from)} ${round(y + height - (from - start))}L${round(x + until)} ${round(y + height - (until - start))}`;
    }
  }
  return d;
}

/**
 * The picture around a drawing.
 * @param label what it shows, in a sentence: its data stand as text or table beside it
 */
export function picture(
  options: { width: number; height: number; className: string; label: string },
  children: Child[],
): Drawing {
  const { width, height, className, label } = options;
  return draw(
    'svg',
    {
      class: className,
      viewBox: `0 0 ${round(width)} ${round(height)}`,
      width,
      height,
      role: 'img',
      'aria-label': label,
    },
    children,
  );
}
