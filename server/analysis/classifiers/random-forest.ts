import { createRng } from '../sampling/rng.ts';
import { classifyOutOfBag, drawBootstrap } from './bootstrap.ts';
import { requireInteger, requireTrainingSet, type Classifier, type TrainingSet } from './classifier.ts';
import { FlatForest } from './flat-forest.ts';
import { growTree } from './grow-tree.ts';
import { countOutOfBagVotes, packTreePart, unpackAllTreeParts, unpackTreePart } from './tree-part.ts';

export interface RandomForestParams {
  /** Number of trees. */
  trees: number;
  /** Features tried at each split; `null` for the root of their number, rounded down. */
  featuresPerSplit: number | null;
  /** Rows each leaf must keep. */
  minLeaf: number;
  /** Splits above a leaf at most; `null` for no limit. */
  maxDepth: number | null;
  /** Whether each tree learns from its own bootstrap sample; without, there is no out-of-bag figure. */
  bootstrap: boolean;
  /**
   * `none`: every row counts the same, so that frequent classes pull harder; `balanced`: rows count so that the classes
   * weigh the same, in splits and in leaves.
   */
  classWeights: 'none' | 'balanced';
}

export const defaultRandomForestParams: RandomForestParams = {
  trees: 100,
  featuresPerSplit: null,
  minLeaf: 1,
  maxDepth: null,
  bootstrap: true,
  classWeights: 'none',
};

const kind = 'random-forest';
/** A row's draws and class share a 32-bit number. */
const MAX_ROWS = 1 << 23;

/**
 * Random forest: bootstrap samples, features drawn at every split, trees grown on the Gini index, one vote a tree.
 * Source: Breiman 2001, Machine Learning 45:5–32.
 */
export const randomForest: Classifier<RandomForestParams> = {
  kind,

  partCount(params) {
    requireParams(params);
    return params.trees;
  },

  trainPart(set, params, seed, part) {
    requireParams(params);
    requireTrainingSet(set);
    if (set.nRows > MAX_ROWS) throw new RangeError(`At most ${MAX_ROWS} training rows, got ${set.nRows}.`);
    const rng = createRng(seed, part);
    const timesDrawn = params.bootstrap
      ? drawBootstrap(set.nRows, set.nRows, rng).timesDrawn
      : new Uint32Array(set.nRows).fill(1);
    const { tree, impurityDecrease } = growTree(set, timesDrawn, resolveOptions(params, set), rng);
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

/** The tree of a serialised part, for reports and tests. @throws ModelBytesError when the bytes are not such a part. */
export function readRandomForestPart(bytes: Uint8Array): ReturnType<typeof unpackTreePart> {
  return unpackTreePart(kind, bytes);
}

function resolveOptions(params: RandomForestParams, set: TrainingSet): Parameters<typeof growTree>[2] {
  return {
    featuresPerSplit: Math.min(set.nFeatures, params.featuresPerSplit ?? Math.floor(Math.sqrt(set.nFeatures))),
    minLeaf: params.minLeaf,
    maxDepth: params.maxDepth ?? Number.POSITIVE_INFINITY,
    classWeights: params.classWeights === 'balanced' ? balanceClasses(set) : new Float64Array(set.nClasses).fill(1),
  };
}

/** Weights that give every class with rows the same sum: nRows / (classes with rows · rows of the class). */
function balanceClasses({ labels, nRows, nClasses }: TrainingSet): Float64Array {
  const counts = new Float64Array(nClasses);
  for (const label of labels) counts[label]++;
  const nPresent = counts.filter((count) => count > 0).length;
  return counts.map((count) => (count > 0 ? nRows / (nPresent * count) : 0));
}

function requireParams({ trees, featuresPerSplit, minLeaf, maxDepth }: RandomForestParams): void {
  requireInteger('Number of trees', trees, 1, 5000);
  requireInteger('Rows a leaf must keep', minLeaf, 1, 1_000_000);
  if (featuresPerSplit !== null) requireInteger('Features tried at each split', featuresPerSplit, 1, 256);
  if (maxDepth !== null) requireInteger('Depth', maxDepth, 1, 1000);
}
