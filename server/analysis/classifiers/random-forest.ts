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
}

export const defaultRandomForestParams: RandomForestParams = {
  trees: 100,
  featuresPerSplit: null,
  minLeaf: 1,
  maxDepth: null,
  bootstrap: true,
};

const kind = 'random-forest';
/** Ranks and classes share a 32-bit sort key. */
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
    const { rows, inBag } = params.bootstrap ? drawBootstrap(set.nRows, set.nRows, rng) : takeAllRows(set.nRows);
    const { tree, impurityDecrease } = growTree(set, rows, resolveOptions(params, set), rng);
    return packTreePart(kind, { part, tree, impurityDecrease, outOfBag: classifyOutOfBag(set, tree, inBag) });
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

function takeAllRows(nRows: number): { rows: Int32Array; inBag: Uint8Array } {
  return { rows: Int32Array.from({ length: nRows }, (_, row) => row), inBag: new Uint8Array(nRows).fill(1) };
}

function resolveOptions(params: RandomForestParams, { nFeatures }: TrainingSet): Parameters<typeof growTree>[2] {
  return {
    featuresPerSplit: Math.min(nFeatures, params.featuresPerSplit ?? Math.floor(Math.sqrt(nFeatures))),
    minLeaf: params.minLeaf,
    maxDepth: params.maxDepth ?? Number.POSITIVE_INFINITY,
  };
}

function requireParams({ trees, featuresPerSplit, minLeaf, maxDepth }: RandomForestParams): void {
  requireInteger('Number of trees', trees, 1, 5000);
  requireInteger('Rows a leaf must keep', minLeaf, 1, 1_000_000);
  if (featuresPerSplit !== null) requireInteger('Features tried at each split', featuresPerSplit, 1, 256);
  if (maxDepth !== null) requireInteger('Depth', maxDepth, 1, 1000);
}
