import type { Group } from '../words/names.ts';
import { type Drawing, draw, path } from './svg.ts';

const SIZE = 20;

/**
 * The sign of a group: told apart by its shape, so that it holds in red light, on paper and without colour.
 * A wick that has burned to its end, one half burned, a whole one, and an empty ring.
 */
export function sign(group: Group): Drawing {
  const shapes: Record<Group, Drawing[]> = {
    'at-risk': [path('sign-line', 'M10 2L18.5 17.5H1.5Z'), path('sign-line', 'M10 8V12.2M10 14.6V14.8')],
    'next-round': [path('sign-line', 'M3 3.5H17V16.5H3Z'), path('sign-fill', 'M3 10H17V16.5H3Z')],
    fine: [draw('circle', { class: 'sign-fill', cx: 10, cy: 10, r: 7.5 })],
    unknown: [
      draw('circle', { class: 'sign-line sign-broken', cx: 10, cy: 10, r: 7.5 }),
      path('sign-line', 'M7.8 8.2C7.8 5.4 12.3 5.5 12.2 8.2C12.1 9.8 10 9.8 10 11.6M10 14V14.2'),
    ],
  };
  return draw(
    'svg',
    {
      class: `sign sign-${group}`,
      viewBox: `0 0 ${SIZE} ${SIZE}`,
      width: SIZE,
      height: SIZE,
      'aria-hidden': 'true',
    },
    shapes[group],
  );
}

export type Mark = 'swap' | 'bright' | 'dim' | 'dark' | 'odd' | 'cold';

/** What stands on a mark of the season: one shape each. Centre at 0, 0, about 10 px wide. */
export function markShape(mark: Mark): Drawing[] {
  const ring = draw('circle', { class: 'mark-line', cx: 0, cy: 0, r: 4.5 });
  switch (mark) {
    case 'swap':
      return [path('mark-fill', 'M0 -6L6 0L0 6L-6 0Z')];
    case 'bright':
      return [draw('circle', { class: 'mark-fill', cx: 0, cy: 0, r: 4.5 })];
    case 'dim':
      return [ring, path('mark-fill', 'M-4.5 0A4.5 4.5 0 0 0 4.5 0Z')];
    case 'dark':
      return [ring];
    case 'odd':
      return [path('mark-line', 'M-4 -4L4 4M-4 4L4 -4')];
    case 'cold':
      return [path('mark-cold', 'M0 -4.5V4.5M-3.9 -2.25L3.9 2.25M-3.9 2.25L3.9 -2.25')];
  }
}
