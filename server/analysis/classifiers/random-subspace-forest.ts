import { RandomForestClassifier } from 'ml-random-forest';
import { createRng } from '../sampling/rng.ts';
import { classifyOutOfBag, drawBootstrap } from './bootstrap.ts';
import { requireInteger, requireTrainingSet, type Classifier, type TrainingSet } from './classifier.ts';
import { FlatForest } from './flat-forest.ts';
import { flattenCartTree, type CartNode } from './flatten-cart-tree.ts';
import { countOutOfBagVotes, packTreePart, unpackAllTreeParts } from './tree-part.ts';

export interface RandomSubspaceForestParams {
  /** Number of trees. */
  trees: number;
  /** Features each tree sees, drawn once a tree without replacement; `null` for all. */
  featuresPerTree: number | null;
  /** A node of at most this many rows is not split. */
  stopAtRows: number;
  /** A split must lower the Gini impurity by more than this. */
  minGain: number;
  /** Splits above a leaf at most; `null` for no limit. */
  maxDepth: number | null;
  /** Rows drawn with replacement for each tree; `null` for as many as there are. Time grows with the square. */
  rowsPerTree: number | null;
}

export const defaultRandomSubspaceForestParams: RandomSubspaceForestParams = {
  trees: 50,
  featuresPerTree: null,
  stopAtRows: 3,
  minGain: 0.01,
  maxDepth: null,
  rowsPerTree: 1000,
};

const kind = 'random-subspace-forest';

/**
 * Forest of trees on random subsets of the features, trained by the library ml-random-forest, one tree a part.
 *
 * The bootstrap sample is drawn here, not in the library: its `maxSamples` takes the first rows instead of random
 * ones, and it does not tell which rows a tree has not seen. Its trees then decide in our flat forest exactly as in
 * the library.
 * Source: Ho 1998, IEEE Transactions on Pattern Analysis and Machine Intelligence 20:832–844 (random subspaces).
 */
export const randomSubspaceForest: Classifier<RandomSubspaceForestParams> = {
  kind,

  partCount(params) {
    requireParams(params);
    return params.trees;
  },

  trainPart(set, params, seed, part) {
    requireParams(params);
    requireTrainingSet(set);
    const rng = createRng(seed, part);
    const nDraws = Math.min(set.nRows, params.rowsPerTree ?? set.nRows);
    const { rows, timesDrawn } = drawBootstrap(set.nRows, nDraws, rng);
    const { root, usedFeatures } = trainTree(set, params, rows, rng.nextUint32() | 0);
    const tree = flattenCartTree(root, usedFeatures);
    const impurityDecrease = sumGains(root, usedFeatures, set.nFeatures, nDraws);
    return packTreePart(kind, { part, tree, impurityDecrease, outOfBag: classifyOutOfBag(set, tree, timesDrawn) });
  },

  assemble(shape, params, parts) {
    return FlatForest.fromTrees(kind, shape, unpackAllTreeParts(kind, parts, params.trees));
  },

  load(bytes) {
    return FlatForest.load(kind, bytes);
  },

  countOutOfBag(set, parts) {
    const votes = countOutOfBagVotes(set, unpackAllTreeParts(kind, parts, parts.length));
    return votes.nVoted > 0 ? votes : null;
  },
};

function trainTree(
  set: TrainingSet,
  params: RandomSubspaceForestParams,
  rows: Int32Array,
  seed: number,
): { root: CartNode; usedFeatures: number[] } {
  const { features, labels, nFeatures } = set;
  const forest = new RandomForestClassifier({
    seed,
    nEstimators: 1,
    maxFeatures: Math.min(nFeatures, params.featuresPerTree ?? nFeatures),
    replacement: false,
    useSampleBagging: false,
    noOOB: true,
    isClassifier: true,
    treeOptions: {
      gainFunction: 'gini',
      splitFunction: 'mean',
      minNumSamples: params.stopAtRows,
      gainThreshold: params.minGain,
      maxDepth: params.maxDepth ?? Number.POSITIVE_INFINITY,
    },
  });
  forest.train(
    Array.from(rows, (row) => Array.from(features.subarray(row * nFeatures, (row + 1) * nFeatures))),
    Array.from(rows, (row) => labels[row]),
  );
  // Through text, as the library itself stores a model: matrices become plain arrays.
  const { baseModel } = JSON.parse(JSON.stringify(forest)) as {
    baseModel: { indexes: number[][]; estimators: { root: CartNode }[] };
  };
  return { root: baseModel.estimators[0].root, usedFeatures: baseModel.indexes[0] };
}

/** Decrease of impurity by feature; the library keeps it at each node as `gain`, of the rows that reached the node. */
function sumGains(root: CartNode, usedFeatures: readonly number[], nFeatures: number, nRows: number): Float64Array {
  const sums = new Float64Array(nFeatures);
  const pending = [root];
  for (let node = pending.pop(); node; node = pending.pop()) {
    if (!node.left || !node.right) continue;
    sums[usedFeatures[node.splitColumn!]] += (node.gain! * node.numberSamples!) / nRows;
    pending.push(node.left, node.right);
  }
  return sums;
}

function requireParams(params: RandomSubspaceForestParams): void {
  requireInteger('Number of trees', params.trees, 1, 5000);
  requireInteger('Rows at which a node is not split', params.stopAtRows, 1, 1_000_000);
  if (params.featuresPerTree !== null) requireInteger('Features of each tree', params.featuresPerTree, 1, 256);
  if (params.maxDepth !== null) requireInteger('Depth', params.maxDepth, 1, 1000);
  if (params.rowsPerTree !== null) requireInteger('Rows of each tree', params.rowsPerTree, 2, 1_000_000);
  if (!(params.minGain >= 0 && params.minGain < 1)) {
    throw new RangeError(`The least gain of a split must lie in 0..1, got ${params.minGain}.`);
  }
}
