import { describe, expect, it } from 'vitest';
import { assignBlockFolds } from '../../../server/analysis/sampling/block-folds.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

const rng = createRng(2);
const polygons = Array.from({ length: 200 }, (_, i) => ({
  id: `p${i}`,
  x: rng.nextFloat() * 1000 - 200,
  y: rng.nextFloat() * 1000,
}));

describe('folds by blocks of ground', () => {
  it('keep the polygons of a block together', () => {
    const folds = assignBlockFolds(polygons, 100, 5, 1);
    const blockFold = new Map<string, number>();
    for (const { id, x, y } of polygons) {
      const key = `${Math.floor(x / 100)} ${Math.floor(y / 100)}`;
      const fold = folds.get(id)!;
      expect(blockFold.get(key) ?? fold).toBe(fold);
      blockFold.set(key, fold);
    }
    expect(folds.size).toBe(200);
  });

  it('are about equally full', () => {
    const sizes = [0, 0, 0, 0, 0];
    for (const fold of assignBlockFolds(polygons, 50, 5, 1).values()) sizes[fold]!++;
    expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(2);
  });

  it('depend on the seed and not on the order', () => {
    const one = assignBlockFolds(polygons, 100, 4, 9);
    expect(assignBlockFolds(polygons.toReversed(), 100, 4, 9)).toEqual(
      new Map(polygons.toReversed().map(({ id }) => [id, one.get(id)])),
    );
    expect([...assignBlockFolds(polygons, 100, 4, 10)]).not.toEqual([...one]);
  });

  it('are refused where there are fewer blocks than folds', () => {
    expect(() => assignBlockFolds(polygons, 100_000, 3, 1)).toThrow('3 folds need at least 3');
    expect(() => assignBlockFolds(polygons, 100, 1, 1)).toThrow(RangeError);
    expect(() => assignBlockFolds(polygons, 0, 2, 1)).toThrow(RangeError);
  });
});
