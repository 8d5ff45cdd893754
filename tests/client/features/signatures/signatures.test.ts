import { describe, expect, it } from 'vitest';
import { brushedSamples } from '../../../../client/src/features/signatures/brushed-samples.ts';
import { ellipsePoints } from '../../../../client/src/features/signatures/ellipse-path.ts';

describe('samples under the brush', () => {
  const set = {
    sampleIds: ['a', 'b', 'c'],
    points: {
      classIndex: [0, 0, 0, 1, 1],
      sampleIndex: [0, 1, 1, 2, 2],
      values: [
        [1, 2, 3, 2, null],
        [1, 2, 3, 2, 2],
      ],
    },
  };
  const brush = { x: [1.5, 3.5], y: [1.5, 3.5] } as const;

  it('are those with a pixel in the box, most pixels first, of the classes shown', () => {
    const inBox = { x: [...brush.x] as [number, number], y: [...brush.y] as [number, number] };
    expect(brushedSamples(set, { x: 0, y: 1 }, new Set([0, 1]), inBox)).toEqual(['b', 'c']);
    expect(brushedSamples(set, { x: 0, y: 1 }, new Set([1]), inBox)).toEqual(['c']);
  });
});

describe('the ellipse of a class', () => {
  it('has every point at the same Mahalanobis distance, the root of chi-square 0.9 with two degrees', () => {
    const covariance = { xx: 4, xy: 1.5, yy: 2 };
    const determinant = 4 * 2 - 1.5 ** 2;
    for (const [x, y] of ellipsePoints([1, -1], covariance)) {
      const [dx, dy] = [x - 1, y + 1];
      const squared = (2 * dx * dx - 2 * 1.5 * dx * dy + 4 * dy * dy) / determinant;
      // Quantile of chi-square with 2 degrees at 0.9: −2 ln 0.1 = 4.60517.
      expect(squared).toBeCloseTo(4.60517, 4);
    }
  });

  it('is left out where a covariance is none', () => {
    expect(ellipsePoints([0, 0], { xx: 1, xy: 1, yy: 1 })).toEqual([]);
    expect(ellipsePoints([0, 0], { xx: Number.NaN, xy: 0, yy: 1 })).toEqual([]);
  });
});
