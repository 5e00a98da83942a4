import { readdirSync } from 'node:fs';
import path from 'node:path';
import type { VNode } from 'preact';
import { describe, expect, it } from 'vitest';
import { nightBand } from '../../../web/drawing/night-band.ts';
import { seasonWick } from '../../../web/drawing/season-wick.ts';
import { sign } from '../../../web/drawing/sign.ts';
import { wick } from '../../../web/drawing/wick.ts';
import { GROUPS } from '../../../web/words/names.ts';
import { BANDS, SEASONS, WICKS } from './made-up.ts';
import { svgText } from './svg-text.ts';

// Each file was looked at before it was kept; `npx vitest run test/web/drawing -u` draws them anew.
const GOLDEN = path.join(import.meta.dirname, 'golden');

const drawings: [string, VNode][] = [
  ...Object.entries(WICKS).map(([name, values]): [string, VNode] => [
    name,
    wick(values, { width: 180, label: name }),
  ]),
  ...Object.entries(SEASONS).map(([name, values]): [string, VNode] => [
    name,
    seasonWick(values, { width: 640, label: name }),
  ]),
  ['season-fading-narrow', seasonWick(SEASONS['season-fading']!, { width: 300, label: 'narrow' })],
  ...Object.entries(BANDS).map(([name, nights]): [string, VNode] => [
    name,
    nightBand(nights, { width: 640, label: name, tonight: nights[2]?.evening ?? null }),
  ]),
  ...GROUPS.map((group): [string, VNode] => [`sign-${group}`, sign(group)]),
];

describe('drawings look as they did when somebody looked at them', () => {
  it.each(drawings)('%s', async (name, drawing) => {
    const text = svgText(drawing);
    expect(text).not.toMatch(/NaN|Infinity|undefined/);
    await expect(text).toMatchFileSnapshot(path.join(GOLDEN, `${name}.svg`));
  });

  it('keeps one file for each, and no other', () => {
    expect(readdirSync(GOLDEN).sort()).toEqual(drawings.map(([name]) => `${name}.svg`).sort());
  });
});
