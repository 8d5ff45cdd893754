import type { Rng } from '../sampling/rng.ts';
import type { TrainingSet } from './classifier.ts';
import { atMostThreshold } from './float32-threshold.ts';
import { rankFeatures } from './rank-features.ts';
import { SplitSearch, sumOfSquares, type Split } from './split-search.ts';
import type { FlatTree } from './tree-part.ts';

export interface GrowOptions {
  /** Features tried at each node. */
  featuresPerSplit: number;
  /** Rows each side of a split must keep. */
  minLeaf: number;
  /** Splits above a leaf at most; the root has depth 0. */
  maxDepth: number;
}

/**
 * Grows a classification tree on rows of a training set (a row may come several times).
 *
 * At each node features are drawn at random without replacement until `featuresPerSplit` that vary in the node have
 * been tried; the split with the greatest decrease of Gini impurity wins, the first met on a tie. The threshold lies
 * midway between the neighbouring values; values equal to it go left. A leaf takes its most frequent class, the lowest
 * index on a tie.
 * Source: Breiman 2001, Machine Learning 45:5–32.
 * @returns the tree and the decrease of impurity by each feature, weighted with the share of rows.
 */
export function growTree(
  set: TrainingSet,
  rows: Int32Array,
  options: GrowOptions,
  rng: Rng,
): { tree: FlatTree; impurityDecrease: Float64Array } {
  const { nFeatures, nClasses, labels } = set;
  const { ranks, levels } = rankFeatures(set);
  const search = new SplitSearch(labels, nClasses, options.minLeaf, rows.length);
  const impurityDecrease = new Float64Array(nFeatures);
  const order = Int32Array.from({ length: nFeatures }, (_, f) => f);
  const counts = new Int32Array(nClasses);

  // Nodes in breadth-first order; node i holds rows[from[i]..to[i]). Children are appended side by side.
  const from = [0];
  const to = [rows.length];
  const depth = [0];
  const feature: number[] = [];
  const threshold: number[] = [];
  const left: number[] = [];
  const leafClass: number[] = [];

  for (let node = 0; node < from.length; node++) {
    const lo = from[node];
    const hi = to[node];
    counts.fill(0);
    for (let i = lo; i < hi; i++) counts[labels[rows[i]]]++;
    const major = indexOfMost(counts);
    const maySplit = counts[major] < hi - lo && depth[node] < options.maxDepth && hi - lo >= 2 * options.minLeaf;
    const split = maySplit ? findSplit(lo, hi) : null;
    if (!split) {
      feature.push(-1);
      threshold.push(0);
      left.push(node);
      leafClass.push(major);
      continue;
    }
    const values = levels[split.feature];
    feature.push(split.feature);
    threshold.push(atMostThreshold((values[split.rank] + values[split.nextRank]) / 2));
    left.push(from.length);
    leafClass.push(0);
    impurityDecrease[split.feature] += (split.score - sumOfSquares(counts) / (hi - lo)) / rows.length;
    const middle = partition(rows, lo, hi, ranks[split.feature], split.rank);
    from.push(lo, middle);
    to.push(middle, hi);
    depth.push(depth[node] + 1, depth[node] + 1);
  }
  return {
    tree: {
      feature: Int16Array.from(feature),
      threshold: Float32Array.from(threshold),
      left: Int32Array.from(left),
      leafClass: Uint8Array.from(leafClass),
    },
    impurityDecrease,
  };

  function findSplit(lo: number, hi: number): Split | null {
    const best: Split = { feature: -1, rank: -1, nextRank: -1, score: -1 };
    let tried = 0;
    for (let j = 0; j < nFeatures && tried < options.featuresPerSplit; j++) {
      const k = j + rng.nextBelow(nFeatures - j);
      const drawn = order[k];
      order[k] = order[j];
      order[j] = drawn;
      if (search.improve(best, drawn, ranks[drawn], rows, lo, hi, counts)) tried++;
    }
    return best.feature >= 0 ? best : null;
  }
}

/** Moves rows with a rank at or below the split's to the front. @returns where the others begin. */
function partition(rows: Int32Array, lo: number, hi: number, ranks: Int32Array, splitRank: number): number {
  let i = lo;
  let j = hi - 1;
  while (i <= j) {
    const row = rows[i];
    if (ranks[row] <= splitRank) {
      i++;
    } else {
      rows[i] = rows[j];
      rows[j] = row;
      j--;
    }
  }
  return i;
}

function indexOfMost(counts: Int32Array): number {
  let most = 0;
  for (let c = 1; c < counts.length; c++) if (counts[c] > counts[most]) most = c;
  return most;
}
