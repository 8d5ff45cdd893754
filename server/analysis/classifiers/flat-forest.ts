import { requireBlock, requireShares, type TrainedModel } from './classifier.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';
import { createThresholdRanks, type ThresholdRanks } from './threshold-ranks.ts';
import type { FlatTree, TreePart } from './tree-part.ts';
import { walkTree, type WalkBlock } from './walk-tree.ts';

const VERSION = 1;
/** Rows walked together: ranks and votes of a block stay in the second-level cache. */
const BLOCK_ROWS = 2048;
const LEAF_RANK = 0x7fffff;

/**
 * A forest laid out for fast mapping; every tree has one vote.
 *
 * The most votes win; a tie goes to the class that reached the winning count first, in the order of the trees, as in
 * ml-array-mode, which ml-random-forest votes with.
 */
export class FlatForest implements TrainedModel {
  readonly kind: string;
  readonly nFeatures: number;
  readonly nClasses: number;
  readonly nTrees: number;
  readonly featureImportance: Float64Array;
  /** All trees behind one another; child numbers count from the start of the forest. */
  readonly #nodes: FlatTree;
  readonly #roots: Int32Array;
  readonly #ranks: ThresholdRanks;
  /** The nodes as `walkTree` wants them. */
  readonly #steps: Int32Array;
  readonly #block: WalkBlock;
  /** Where the class of each row of the block goes. */
  readonly #places = new Int32Array(BLOCK_ROWS);

  constructor(
    kind: string,
    shape: { nFeatures: number; nClasses: number },
    nodes: FlatTree,
    roots: Int32Array,
    importance: Float64Array,
  ) {
    this.kind = kind;
    this.nFeatures = shape.nFeatures;
    this.nClasses = shape.nClasses;
    this.nTrees = roots.length;
    this.featureImportance = importance;
    this.#nodes = nodes;
    this.#roots = roots;
    requireSoundNodes(nodes, roots, shape);
    const thresholds = collectThresholds(nodes, shape.nFeatures);
    this.#ranks = createThresholdRanks(thresholds);
    this.#steps = encodeSteps(nodes, thresholds);
    this.#block = {
      ranks: new Int32Array(BLOCK_ROWS * shape.nFeatures),
      votes: new Uint16Array(BLOCK_ROWS * shape.nClasses),
      best: new Uint16Array(BLOCK_ROWS),
      winner: new Uint8Array(BLOCK_ROWS),
    };
  }

  /** Joins trees, in the order given, into a forest. */
  static fromTrees(
    kind: string,
    shape: { nFeatures: number; nClasses: number },
    trees: readonly TreePart[],
  ): FlatForest {
    const nNodes = trees.reduce((sum, { tree }) => sum + tree.feature.length, 0);
    const nodes: FlatTree = {
      feature: new Int16Array(nNodes),
      threshold: new Float32Array(nNodes),
      left: new Int32Array(nNodes),
      leafClass: new Uint8Array(nNodes),
    };
    const roots = new Int32Array(trees.length);
    const importance = new Float64Array(shape.nFeatures);
    let offset = 0;
    trees.forEach(({ tree, impurityDecrease }, i) => {
      roots[i] = offset;
      nodes.feature.set(tree.feature, offset);
      nodes.threshold.set(tree.threshold, offset);
      nodes.leafClass.set(tree.leafClass, offset);
      for (let n = 0; n < tree.left.length; n++) nodes.left[offset + n] = tree.left[n] + offset;
      for (let f = 0; f < shape.nFeatures; f++) importance[f] += impurityDecrease[f];
      offset += tree.feature.length;
    });
    const total = importance.reduce((sum, value) => sum + value, 0);
    if (total > 0) for (let f = 0; f < shape.nFeatures; f++) importance[f] /= total;
    return new FlatForest(kind, shape, nodes, roots, importance);
  }

  /** @throws ModelBytesError when the bytes are not a forest of that kind or are damaged. */
  static load(kind: string, bytes: Uint8Array): FlatForest {
    const reader = unpackArrays(bytes, kind, VERSION);
    const [nFeatures, nClasses, nTrees] = reader.next(Uint32Array, 3);
    const roots = reader.next(Int32Array, nTrees);
    const feature = reader.next(Int16Array);
    const n = feature.length;
    const nodes = {
      feature,
      threshold: reader.next(Float32Array, n),
      left: reader.next(Int32Array, n),
      leafClass: reader.next(Uint8Array, n),
    };
    return new FlatForest(kind, { nFeatures, nClasses }, nodes, roots, reader.next(Float64Array, nFeatures));
  }

  serialise(): Uint8Array {
    const { feature, threshold, left, leafClass } = this.#nodes;
    const shape = Uint32Array.of(this.nFeatures, this.nClasses, this.nTrees);
    return packArrays(this.kind, VERSION, [
      shape,
      this.#roots,
      feature,
      threshold,
      left,
      leafClass,
      this.featureImportance,
    ]);
  }

  predictBlock(
    features: Float32Array,
    n: number,
    classIndex: Uint8Array,
    share?: Float32Array,
    margin?: Float32Array,
  ): void {
    requireBlock(this.nFeatures, features, n, classIndex, share, margin);
    for (let from = 0; from < n; from += BLOCK_ROWS) {
      const nHere = Math.min(BLOCK_ROWS, n - from);
      this.#ranks.rankRows(features, from, nHere, this.#block.ranks);
      this.#block.votes.fill(0);
      this.#block.best.fill(0);
      if (share || margin) this.#countAllVotes(from, nHere, classIndex, share, margin);
      else this.#settle(from, nHere, classIndex);
    }
  }

  predictShares(features: Float32Array, n: number, shares: Float32Array): void {
    requireShares(this, features, n, shares);
    const { nClasses, nTrees } = this;
    const { votes } = this.#block;
    for (let from = 0; from < n; from += BLOCK_ROWS) {
      const nHere = Math.min(BLOCK_ROWS, n - from);
      this.#ranks.rankRows(features, from, nHere, this.#block.ranks);
      votes.fill(0);
      this.#block.best.fill(0);
      for (const root of this.#roots) this.#walk(root, nHere);
      for (let i = 0; i < nHere * nClasses; i++) shares[from * nClasses + i] = votes[i] / nTrees;
    }
  }

  #countAllVotes(
    from: number,
    nRows: number,
    classIndex: Uint8Array,
    share: Float32Array | undefined,
    margin: Float32Array | undefined,
  ): void {
    const { best, winner } = this.#block;
    for (const root of this.#roots) this.#walk(root, nRows);
    classIndex.set(winner.subarray(0, nRows), from);
    if (share) for (let i = 0; i < nRows; i++) share[from + i] = best[i] / this.nTrees;
    if (margin) for (let i = 0; i < nRows; i++) margin[from + i] = (best[i] - this.#countSecond(i)) / this.nTrees;
  }

  /** Votes of the runner-up of a row. */
  #countSecond(row: number): number {
    const { votes, winner } = this.#block;
    const { nClasses } = this;
    let second = 0;
    for (let c = 0; c < nClasses; c++) {
      const count = votes[row * nClasses + c];
      if (count > second && c !== winner[row]) second = count;
    }
    return second;
  }

  /**
   * Asks the trees until no class can still overtake: from half of the trees on, rows whose lead is not smaller than the
   * number of trees left are done and the others move together. The classes are those of all the votes.
   */
  #settle(from: number, nRows: number, classIndex: Uint8Array): void {
    const { ranks, votes, best, winner } = this.#block;
    const { nFeatures, nClasses, nTrees } = this;
    const places = this.#places;
    const stride = Math.max(1, nTrees >> 5);
    let nOpen = nRows;
    for (let i = 0; i < nRows; i++) places[i] = from + i;
    for (let tree = 0; tree < nTrees && nOpen > 0; tree++) {
      this.#walk(this.#roots[tree], nOpen);
      const nLeft = nTrees - 1 - tree;
      if (nLeft > 0 && (2 * nLeft > nTrees || nLeft % stride > 0)) continue;
      let kept = 0;
      for (let i = 0; i < nOpen; i++) {
        if (best[i] - this.#countSecond(i) >= nLeft) {
          classIndex[places[i]] = winner[i];
          continue;
        }
        if (kept < i) {
          places[kept] = places[i];
          best[kept] = best[i];
          winner[kept] = winner[i];
          for (let f = 0; f < nFeatures; f++) ranks[kept * nFeatures + f] = ranks[i * nFeatures + f];
          for (let c = 0; c < nClasses; c++) votes[kept * nClasses + c] = votes[i * nClasses + c];
        }
        kept++;
      }
      nOpen = kept;
    }
  }

  #walk(root: number, nRows: number): void {
    walkTree(this.#steps, this.#nodes.leafClass, root, this.#block, nRows, this.nFeatures, this.nClasses);
  }
}

/** Bytes can carry a right checksum and still no forest; a wrong child number would walk for ever. */
function requireSoundNodes(nodes: FlatTree, roots: Int32Array, shape: { nFeatures: number; nClasses: number }): void {
  const { feature, left, leafClass } = nodes;
  const n = feature.length;
  if (roots.length < 1 || roots.length > 65535) throw new ModelBytesError(`A forest of ${roots.length} trees.`);
  for (let i = 0; i < n; i++) {
    const isLeaf = feature[i] === -1;
    const sound = isLeaf
      ? left[i] === i && leafClass[i] < shape.nClasses
      : feature[i] >= 0 && feature[i] < shape.nFeatures && left[i] > i && left[i] + 1 < n;
    if (!sound) throw new ModelBytesError(`Node ${i} of the forest makes no sense.`);
  }
  if (roots.some((root) => root < 0 || root >= n)) throw new ModelBytesError('A root lies outside the forest.');
}

function collectThresholds({ feature, threshold }: FlatTree, nFeatures: number): Float32Array[] {
  const byFeature: Set<number>[] = Array.from({ length: nFeatures }, () => new Set());
  for (let i = 0; i < feature.length; i++) if (feature[i] >= 0) byFeature[feature[i]].add(threshold[i]);
  return byFeature.map((values) => {
    if (values.size >= LEAF_RANK) throw new ModelBytesError(`${values.size} thresholds on one feature are too many.`);
    return Float32Array.from(values).sort();
  });
}

function encodeSteps({ feature, threshold, left }: FlatTree, thresholds: readonly Float32Array[]): Int32Array {
  const rankOf = thresholds.map((sorted) => new Map(Array.from(sorted, (value, rank) => [value, rank])));
  const steps = new Int32Array(feature.length * 2);
  for (let i = 0; i < feature.length; i++) {
    const f = feature[i];
    steps[2 * i] = f < 0 ? LEAF_RANK << 8 : (rankOf[f].get(threshold[i])! << 8) | f;
    steps[2 * i + 1] = left[i];
  }
  return steps;
}
