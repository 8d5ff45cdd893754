import type { Rng } from '../sampling/rng.ts';
import type { TrainingSet } from './classifier.ts';
import { atMostThreshold } from './float32-threshold.ts';
import { CountedSplitSearch, isCountable } from './counted-split-search.ts';
import { rankFeatures } from './rank-features.ts';
import { SplitSearch, type NodeRows, type NodeSums, type Split } from './split-search.ts';
import type { FlatTree } from './tree-part.ts';

export interface GrowOptions {
  /** Features tried at each node. */
  featuresPerSplit: number;
  /** Rows each side of a split must keep. */
  minLeaf: number;
  /** Splits above a leaf at most; the root has depth 0. */
  maxDepth: number;
  /** Weight of a row of each class. */
  classWeights: Float64Array;
}

/**
 * Grows a classification tree on rows of a training set, each as often as `timesDrawn` says.
 *
 * At each node features are drawn at random without replacement until `featuresPerSplit` that vary in the node have
 * been tried; the split with the greatest decrease of Gini impurity wins, the first met on a tie. The threshold lies
 * midway between the neighbouring values; values equal to it go left. A leaf takes the class with the greatest weight,
 * the lowest index on a tie.
 * Source: Breiman 2001, Machine Learning 45:5–32.
 * @returns the tree and the decrease of impurity by each feature, weighted with the share of rows.
 */
export function growTree(
  set: TrainingSet,
  timesDrawn: Uint32Array,
  options: GrowOptions,
  rng: Rng,
): { tree: FlatTree; impurityDecrease: Float64Array } {
  const { nFeatures, nClasses } = set;
  const { ranks, levels } = rankFeatures(set);
  const drawn = listDrawnRows(set, timesDrawn);
  const nDrawn = drawn.rows.length;
  const search = isCountable(options.classWeights, levels, drawn)
    ? new CountedSplitSearch(nClasses, options.minLeaf, nDrawn)
    : new SplitSearch(options.classWeights, options.minLeaf, nDrawn);
  const impurityDecrease = new Float64Array(nFeatures);
  const order = Int32Array.from({ length: nFeatures }, (_, f) => f);
  const sums: NodeSums = { nRows: 0, weight: 0, classWeights: new Float64Array(nClasses), squares: 0 };
  const spare: NodeRows = { rows: new Int32Array(nDrawn), tags: new Int32Array(nDrawn) };
  let totalWeight = 0;

  // Nodes in breadth-first order; node i holds drawn rows from[i]..to[i]. Children are appended side by side.
  const from = [0];
  const to = [nDrawn];
  const depth = [0];
  const feature: number[] = [];
  const threshold: number[] = [];
  const left: number[] = [];
  const leafClass: number[] = [];

  for (let node = 0; node < from.length; node++) {
    const lo = from[node];
    const hi = to[node];
    const major = sumNode(sums, drawn.tags, lo, hi, options.classWeights);
    if (node === 0) totalWeight = sums.weight;
    const isPure = sums.classWeights[major] === sums.weight;
    const maySplit = !isPure && depth[node] < options.maxDepth && sums.nRows >= 2 * options.minLeaf;
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
    impurityDecrease[split.feature] += (split.score - sums.squares / sums.weight) / totalWeight;
    const middle = partition(drawn, spare, lo, hi, ranks[split.feature], split.rank);
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
    if (search instanceof CountedSplitSearch) search.openNode(sums);
    for (let j = 0; j < nFeatures && tried < options.featuresPerSplit; j++) {
      const k = j + rng.nextBelow(nFeatures - j);
      const candidate = order[k];
      order[k] = order[j];
      order[j] = candidate;
      if (search.improve(best, candidate, ranks[candidate], levels[candidate].length, drawn, lo, hi, sums)) tried++;
    }
    return best.feature >= 0 ? best : null;
  }
}

/** The rows drawn at least once, ascending. */
function listDrawnRows({ labels }: TrainingSet, timesDrawn: Uint32Array): NodeRows {
  let nDrawn = 0;
  for (const times of timesDrawn) if (times > 0) nDrawn++;
  const rows = new Int32Array(nDrawn);
  const tags = new Int32Array(nDrawn);
  let next = 0;
  for (let row = 0; row < timesDrawn.length; row++) {
    if (timesDrawn[row] === 0) continue;
    rows[next] = row;
    tags[next++] = (timesDrawn[row] << 8) | labels[row];
  }
  return { rows, tags };
}

/** Sums up the rows lo..hi. @returns the class with the greatest weight. */
function sumNode(sums: NodeSums, tags: Int32Array, lo: number, hi: number, weights: Float64Array): number {
  const { classWeights } = sums;
  let nRows = 0;
  classWeights.fill(0);
  for (let i = lo; i < hi; i++) {
    classWeights[tags[i] & 255] += tags[i] >> 8;
    nRows += tags[i] >> 8;
  }
  let weight = 0;
  let squares = 0;
  let major = 0;
  for (let c = 0; c < classWeights.length; c++) {
    classWeights[c] *= weights[c];
    weight += classWeights[c];
    squares += classWeights[c] * classWeights[c];
    if (classWeights[c] > classWeights[major]) major = c;
  }
  sums.nRows = nRows;
  sums.weight = weight;
  sums.squares = squares;
  return major;
}

/**
 * Moves rows with a rank at or below the split's to the front; the order within each side stays, so that memory is read
 * in order. @returns where the others begin.
 */
function partition(
  { rows, tags }: NodeRows,
  spare: NodeRows,
  lo: number,
  hi: number,
  ranks: Uint16Array | Int32Array,
  splitRank: number,
): number {
  let nLeft = lo;
  let nRight = 0;
  for (let i = lo; i < hi; i++) {
    const row = rows[i];
    const tag = tags[i];
    if (ranks[row] <= splitRank) {
      rows[nLeft] = row;
      tags[nLeft++] = tag;
    } else {
      spare.rows[nRight] = row;
      spare.tags[nRight++] = tag;
    }
  }
  for (let i = 0; i < nRight; i++) {
    rows[nLeft + i] = spare.rows[i];
    tags[nLeft + i] = spare.tags[i];
  }
  return nLeft;
}
