import { describe, expect, it } from 'vitest';
import { SplitSearch, type Split } from '../../../server/analysis/classifiers/split-search.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

/** Best score over all cuts between ranks, from the class counts on both sides. */
function searchByBruteForce(
  ranks: Int32Array,
  labels: Uint8Array,
  rows: Int32Array,
  nClasses: number,
  minLeaf: number,
) {
  let best = { score: -1, rank: -1, nextRank: -1 };
  const present = [...new Set(Array.from(rows, (row) => ranks[row]))].sort((a, b) => a - b);
  present.slice(0, -1).forEach((rank, i) => {
    const sides = [true, false].map((isLeft) => rows.filter((row) => ranks[row] <= rank === isLeft));
    if (sides.some((side) => side.length < minLeaf)) return;
    const score = sides.reduce((sum, side) => {
      const counts = new Array<number>(nClasses).fill(0);
      for (const row of side) counts[labels[row]]++;
      return sum + counts.reduce((squares, count) => squares + count * count, 0) / side.length;
    }, 0);
    if (score > best.score) best = { score, rank, nextRank: present[i + 1] };
  });
  return best;
}

describe('the best split on one feature', () => {
  // Few levels take the way over a histogram, many the way over sorting; long nodes sort with the built-in sort.
  it.each([
    ['few levels', 6, 60],
    ['many levels in a short node', 5000, 40],
    ['many levels in a long node', 5000, 300],
    ['about as many levels as the two ways are chosen by', 60, 60],
  ])('equals trying every cut: %s', (_, nLevels, nRows) => {
    const rng = createRng(nLevels + nRows);
    const nClasses = 4;
    for (let round = 0; round < 60; round++) {
      const minLeaf = 1 + (round % 3) * 4;
      const ranks = Int32Array.from({ length: nRows }, () => rng.nextBelow(nLevels));
      const labels = Uint8Array.from(ranks, (rank) =>
        rng.nextBelow(3) ? Math.floor((rank * 4) / nLevels) : rng.nextBelow(4),
      );
      // A bootstrap: rows repeat; the node is a stretch of it.
      const rows = Int32Array.from({ length: nRows + 20 }, () => rng.nextBelow(nRows));
      const [lo, hi] = [7, nRows + 11];
      const counts = new Int32Array(nClasses);
      for (let i = lo; i < hi; i++) counts[labels[rows[i]]]++;
      const best: Split = { feature: -1, rank: -1, nextRank: -1, score: -1 };
      const search = new SplitSearch(labels, nClasses, minLeaf, rows.length);
      expect(search.improve(best, 3, ranks, rows, lo, hi, counts)).toBe(true);
      const wanted = searchByBruteForce(ranks, labels, rows.slice(lo, hi), nClasses, minLeaf);
      expect(best.score).toBeCloseTo(wanted.score, 9);
      expect([best.feature, best.rank, best.nextRank]).toEqual([3, wanted.rank, wanted.nextRank]);
    }
  });

  it('says when a feature is constant and keeps a better split found before', () => {
    const labels = Uint8Array.of(0, 1, 0, 1);
    const search = new SplitSearch(labels, 2, 1, 4);
    const best: Split = { feature: 8, rank: 1, nextRank: 2, score: 4 };
    const rows = Int32Array.of(0, 1, 2, 3);
    const counts = Int32Array.of(2, 2);
    expect(search.improve(best, 0, Int32Array.of(5, 5, 5, 5), rows, 0, 4, counts)).toBe(false);
    expect(search.improve(best, 1, Int32Array.of(0, 1, 2, 3), rows, 0, 4, counts)).toBe(true);
    expect(best.feature).toBe(8);
  });
});
