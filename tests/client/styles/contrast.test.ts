import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { LINE_COLOUR_PERCENT } from '../../../client/src/components/charts/spectral-series.ts';
import { matrixShade } from '../../../client/src/components/charts/matrix-shading.ts';
import { strokeOn } from '../../../client/src/components/ui/class-pattern.tsx';
import { CLASS_PALETTE } from '../../../shared/constants/class-palette.ts';
import { type Rgb, contrastRatio, mixSrgb, parseHex } from './colour-science.ts';

/** WCAG 2.2, success criteria 1.4.3 (text) and 1.4.11 (controls and graphics). */
const TEXT = 4.5;
const GRAPHIC = 3;

const css = readFileSync('client/src/styles/tokens.css', 'utf8');
const pairs = [...css.matchAll(/--([a-z-]+): light-dark\((#[0-9a-f]{6}), (#[0-9a-f]{6})\)/g)];
const tokens = {
  light: Object.fromEntries(pairs.map(([, name, light]) => [name, parseHex(light)])) as Record<string, Rgb>,
  dark: Object.fromEntries(pairs.map(([, name, , dark]) => [name, parseHex(dark)])) as Record<string, Rgb>,
};

const GROUNDS = ['paper', 'card', 'sunken', 'haze', 'groundsel-wash', 'spruce-wash', 'rust-wash'];
const TEXT_PAIRS: [string, string][] = [
  ...GROUNDS.flatMap((ground): [string, string][] => [
    ['ink', ground],
    ['ink-soft', ground],
  ]),
  ...['paper', 'card', 'sunken', 'spruce-wash'].map((ground): [string, string] => ['spruce', ground]),
  ...['paper', 'card', 'sunken', 'rust-wash'].map((ground): [string, string] => ['rust', ground]),
  ['paper', 'ink'],
  ['on-groundsel', 'groundsel'],
  ['on-spruce', 'spruce'],
  ['on-rust', 'rust'],
  ['ink', 'mark'],
];
const GRAPHIC_PAIRS: [string, string][] = [
  ...['paper', 'card', 'sunken', 'groundsel-wash'].map((ground): [string, string] => ['edge', ground]),
  ...['paper', 'card', 'line'].map((ground): [string, string] => ['ink', ground]),
  ['groundsel-deep', 'paper'],
  ['groundsel-deep', 'card'],
  ['spruce', 'line'],
  ['rust', 'line'],
  ['groundsel', 'ink'],
];

describe.each(['light', 'dark'] as const)('the %s theme', (theme) => {
  const colour = (name: string) => {
    const found = tokens[theme][name];
    if (!found) throw new Error(`tokens.css has no --${name} as light-dark(#…, #…)`);
    return found;
  };

  it.each(TEXT_PAIRS)('prints %s on %s at 4.5:1 or better', (text, ground) => {
    expect(contrastRatio(colour(text), colour(ground))).toBeGreaterThanOrEqual(TEXT);
  });

  // On the dark theme the focus ring is pale and its halo gold: ring and ground carry it there, not ring and halo.
  it.each(GRAPHIC_PAIRS.filter(([a, b]) => theme === 'light' || !(a === 'groundsel' && b === 'ink')))(
    'draws %s on %s at 3:1 or better',
    (mark, ground) => {
      expect(contrastRatio(colour(mark), colour(ground))).toBeGreaterThanOrEqual(GRAPHIC);
    },
  );

  it.each([true, false])('prints every count of the matrix readably (diagonal: %s)', (isDiagonal) => {
    for (let percent = 0; percent <= 100; percent++) {
      const shade = matrixShade(percent / 100, isDiagonal);
      const name = (reference: string) => reference.slice('var(--'.length, -1);
      const ground = mixSrgb(colour(name(shade.hue)), shade.alphaPercent, colour('paper'));
      expect(contrastRatio(colour(name(shade.text)), ground), `${percent} % of the row`).toBeGreaterThanOrEqual(TEXT);
    }
  });

  it.each(CLASS_PALETTE.map((step) => [step.name, step.colour]))(
    'draws a line of %s at 3:1 in charts',
    (_name, hex) => {
      const line = mixSrgb(parseHex(hex), LINE_COLOUR_PERCENT, colour('ink'));
      for (const ground of ['card', 'sunken'])
        expect(contrastRatio(line, colour(ground))).toBeGreaterThanOrEqual(GRAPHIC);
    },
  );
});

describe('class patterns', () => {
  it.each(CLASS_PALETTE.map((step) => [step.name, step.colour]))('stand out from %s', (_name, hex) => {
    expect(contrastRatio(parseHex(strokeOn(hex)), parseHex(hex))).toBeGreaterThanOrEqual(GRAPHIC);
  });
});

describe('matrix shading', () => {
  it('is darker the larger the share', () => {
    for (let percent = 1; percent <= 100; percent++) {
      const [before, now] = [matrixShade((percent - 1) / 100, false), matrixShade(percent / 100, false)];
      expect(now.alphaPercent).toBeGreaterThanOrEqual(before.alphaPercent);
    }
  });
});
