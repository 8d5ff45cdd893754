import { describe, expect, it } from 'vitest';
import { CountedSplitSearch, isCountable } from '../../../server/analysis/classifiers/counted-split-search.ts';
import {
  SplitSearch,
  type NodeRows,
  type NodeSums,
  type Split,
} from '../../../server/analysis/classifiers/split-search.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

/** Best score over all cuts between ranks, from the class weights on both sides. */
function searchByBruteForce(
  ranks: Int32Array,
  labels: Uint8Array,
  rows: number[],
  weights: Float64Array,
  minLeaf: number,
) {
  let best = { score: -1, rank: -1, nextRank: -1 };
  const present = [...new Set(rows.map((row) => ranks[row]))].sort((a, b) => a - b);
  present.slice(0, -1).forEach((rank, i) => {
    const sides = [true, false].map((isLeft) => rows.filter((row) => ranks[row] <= rank === isLeft));
    if (sides.some((side) => side.length < minLeaf)) return;
    const score = sides.reduce((sum, side) => {
      const sums = new Array<number>(weights.length).fill(0);
      for (const row of side) sums[labels[row]] += weights[labels[row]];
      const total = sums.reduce((a, b) => a + b, 0);
      return sum + sums.reduce((squares, value) => squares + value * value, 0) / total;
    }, 0);
    if (score > best.score) best = { score, rank, nextRank: present[i + 1] };
  });
  return best;
}

/** The node of all the rows named, each as often as it is named. */
function makeNode(rows: number[], labels: Uint8Array, weights: Float64Array): { drawn: NodeRows; sums: NodeSums } {
  const distinct = [...new Set(rows)];
  const tags = distinct.map((row) => (rows.filter((other) => other === row).length << 8) | labels[row]);
  const classWeights = new Float64Array(weights.length);
  for (const row of rows) classWeights[labels[row]] += weights[labels[row]];
  return {
    drawn: { rows: Int32Array.from(distinct), tags: Int32Array.from(tags) },
    sums: {
      nRows: rows.length,
      weight: classWeights.reduce((a, b) => a + b, 0),
      classWeights,
      squares: classWeights.reduce((sum, value) => sum + value * value, 0),
    },
  };
}

const nothing = (): Split => ({ feature: -1, rank: -1, nextRank: -1, score: -1 });

describe('the best split on one feature', () => {
  // Few levels are counted, many are sorted into buckets; crowded levels leave most of the sorting within buckets.
  it.each([
    ['few levels', 6, 60, 1],
    ['many levels in a very short node', 5000, 11, 1],
    ['many levels in a short node', 5000, 40, 1],
    ['many levels in a long node', 5000, 300, 1],
    ['about as many levels as the two ways are chosen by', 60, 60, 1],
    ['many levels, most rows in few of them', 60_000, 200, 6],
  ])('equals trying every cut: %s', (_, nLevels, nRows, crowding) => {
    const rng = createRng(nLevels + nRows);
    const searches = [[1, 1, 1, 1], [3, 0.5, 1.25, 2]].map((w) => Float64Array.from(w)); // prettier-ignore
    for (let round = 0; round < 60; round++) {
      const minLeaf = 1 + (round % 3) * 4;
      const ranks = Int32Array.from({ length: nRows }, () => Math.floor(nLevels * rng.nextFloat() ** crowding));
      const labels = Uint8Array.from(ranks, (rank) =>
        rng.nextBelow(3) ? Math.floor((rank * 4) / nLevels) : rng.nextBelow(4),
      );
      // A bootstrap: rows repeat.
      const rows = Array.from({ length: nRows }, () => rng.nextBelow(nRows));
      for (const weights of searches) {
        const { drawn, sums } = makeNode(rows, labels, weights);
        const search = new SplitSearch(weights, minLeaf, drawn.rows.length);
        // Twice, since scratch memory is used again.
        for (let again = 0; again < 2; again++) {
          const best = nothing();
          expect(search.improve(best, 3, ranks, nLevels, drawn, 0, drawn.rows.length, sums)).toBe(true);
          const wanted = searchByBruteForce(ranks, labels, rows, weights, minLeaf);
          expect(best.score).toBeCloseTo(wanted.score, 9);
          const isPlain = isCountable(weights, [new Float32Array(nLevels)], drawn);
          expect(isPlain).toBe(weights === searches[0] && nLevels <= 32_768);
          if (isPlain) {
            const counted = new CountedSplitSearch(weights.length, minLeaf, drawn.rows.length);
            counted.openNode(sums);
            const same = nothing();
            expect(counted.improve(same, 3, ranks, nLevels, drawn, 0, drawn.rows.length, sums)).toBe(true);
            // Not about the same but the same: the forest must not depend on which search was taken.
            expect(same).toEqual(best);
          }
          if (wanted.rank >= 0) expect([best.feature, best.rank, best.nextRank]).toEqual([3, wanted.rank, wanted.nextRank]); // prettier-ignore
        }
      }
    }
  });

  it('says when a feature is constant and keeps a better split found before', () => {
    const labels = Uint8Array.of(0, 1, 0, 1);
    const weights = Float64Array.of(1, 1);
    const { drawn, sums } = makeNode([0, 1, 2, 3], labels, weights);
    const search = new SplitSearch(weights, 1, 4);
    const best: Split = { feature: 8, rank: 1, nextRank: 2, score: 4 };
    for (const nLevels of [6, 1000]) {
      expect(search.improve(best, 0, Int32Array.of(5, 5, 5, 5), nLevels, drawn, 0, 4, sums)).toBe(false);
      expect(search.improve(best, 1, Int32Array.of(0, 1, 2, 3), nLevels, drawn, 0, 4, sums)).toBe(true);
    }
    expect(best.feature).toBe(8);
  });

  it('counts only what 32 bits can count', () => {
    const weights = Float64Array.of(1, 1);
    const levels = [new Float32Array(10)];
    const drawn = (times: number, n: number): NodeRows => ({
      rows: new Int32Array(n),
      tags: new Int32Array(n).fill(times << 8),
    });
    expect(isCountable(weights, levels, drawn(1, 46_340))).toBe(true);
    expect(isCountable(weights, levels, drawn(1, 46_341))).toBe(false);
    expect(isCountable(weights, levels, drawn(255, 10))).toBe(true);
    expect(isCountable(weights, levels, drawn(256, 10))).toBe(false);
    expect(isCountable(Float64Array.of(1, 2), levels, drawn(1, 10))).toBe(false);
    expect(isCountable(weights, [new Float32Array(32_769)], drawn(1, 10))).toBe(false);
  });

  it('looks at a stretch of the rows only', () => {
    const labels = Uint8Array.of(0, 0, 1, 1, 0, 0);
    const weights = Float64Array.of(1, 1);
    const all = makeNode([0, 1, 2, 3, 4, 5], labels, weights).drawn;
    const { sums } = makeNode([1, 2, 3], labels, weights);
    for (const nLevels of [6, 1000]) {
      const best = nothing();
      new SplitSearch(weights, 1, 6).improve(best, 0, Int32Array.of(5, 2, 3, 4, 0, 1), nLevels, all, 1, 4, sums);
      expect(best).toEqual({ feature: 0, rank: 2, nextRank: 3, score: 3 });
    }
  });
});
