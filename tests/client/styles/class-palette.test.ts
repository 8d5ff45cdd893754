import { describe, expect, it } from 'vitest';
import { CLASS_PALETTE, CLASS_PATTERNS, classPaletteStep } from '../../../shared/constants/class-palette.ts';
import { type Lab, DICHROMACY, applyMatrix, ciede2000, linearToLab, parseHex, toLinear } from './colour-science.ts';

/** Two patches of a map under 10 apart in CIEDE2000 are easily taken for one another (common practice, no source). */
const APART = 10;

function smallestDistance(labs: Lab[]): { distance: number; pair: string } {
  let smallest = { distance: Infinity, pair: '' };
  labs.forEach((first, i) =>
    labs.slice(i + 1).forEach((second, j) => {
      const distance = ciede2000(first, second);
      if (distance < smallest.distance) {
        smallest = { distance, pair: `${CLASS_PALETTE[i].name} / ${CLASS_PALETTE[i + 1 + j].name}` };
      }
    }),
  );
  return smallest;
}

describe('the colour difference the palette is judged by', () => {
  // Sharma, Wu and Dalal (2005), table 1, pairs 1, 19, 20, 25 (values from memory).
  it.each<[Lab, Lab, number]>([
    [[50, 2.6772, -79.7751], [50, 0, -82.7485], 2.0425],
    [[50, 2.5, 0], [73, 25, -18], 27.1492],
    [[50, 2.5, 0], [61, -5, 29], 22.8977],
    [[60.2574, -34.0099, 36.2677], [60.4626, -34.1751, 39.4387], 1.2644],
  ])('agrees with the published test pair %j %j', (first, second, expected) => {
    expect(ciede2000(first, second)).toBeCloseTo(expected, 4);
  });

  it('keeps greys grey for every kind of colour vision', () => {
    for (const matrix of Object.values(DICHROMACY)) {
      for (const channel of applyMatrix(matrix, [0.5, 0.5, 0.5])) expect(channel).toBeCloseTo(0.5, 3);
    }
  });
});

describe('the ten class colours', () => {
  const linear = CLASS_PALETTE.map((step) => toLinear(parseHex(step.colour)));

  it('are far apart for people who see all colours', () => {
    const { distance, pair } = smallestDistance(linear.map(linearToLab));
    expect(distance, pair).toBeGreaterThan(1.5 * APART);
  });

  it.each(Object.entries(DICHROMACY))('stay apart under %s', (_name, matrix) => {
    const { distance, pair } = smallestDistance(linear.map((rgb) => linearToLab(applyMatrix(matrix, rgb))));
    expect(distance, pair).toBeGreaterThan(APART);
  });

  it('each have a pattern of their own', () => {
    expect(new Set(CLASS_PALETTE.map((step) => step.pattern)).size).toBe(10);
    expect(CLASS_PALETTE.map((step) => step.pattern).sort()).toEqual([...CLASS_PATTERNS].sort());
  });

  it('come round again from the eleventh class on', () => {
    expect(classPaletteStep(10)).toBe(CLASS_PALETTE[0]);
    expect(classPaletteStep(-1)).toBe(CLASS_PALETTE[9]);
  });
});
