import type { OutOfBagVotes, TrainingSet } from './classifier.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';

/**
 * One tree in breadth-first order, root first; the children of node i are left[i] and left[i] + 1.
 * A row goes left when its value is less than the threshold, right otherwise (also when it is NaN).
 */
export interface FlatTree {
  /** Feature tested at each node, −1 at a leaf. */
  feature: Int16Array;
  threshold: Float32Array;
  /** Left child; a leaf points at itself. */
  left: Int32Array;
  /** Class of a leaf; 0 elsewhere. */
  leafClass: Uint8Array;
}

/** A tree with what training it found out. */
export interface TreePart {
  part: number;
  tree: FlatTree;
  /** Decrease of Gini impurity by splits on each feature, weighted with the share of rows. */
  impurityDecrease: Float64Array;
  /** Class the tree gives to each training row it had not seen; 255 for rows it had. */
  outOfBag: Uint8Array;
}

/** Marks training rows that were in the tree's bootstrap sample. */
export const IN_BAG = 255;
const VERSION = 1;

export function packTreePart(kind: string, { part, tree, impurityDecrease, outOfBag }: TreePart): Uint8Array {
  const { feature, threshold, left, leafClass } = tree;
  return packArrays(`${kind}/tree`, VERSION, [
    Uint32Array.of(part),
    feature,
    threshold,
    left,
    leafClass,
    impurityDecrease,
    outOfBag,
  ]);
}

/** @throws ModelBytesError when the bytes are not a tree of that kind or are damaged. */
export function unpackTreePart(kind: string, bytes: Uint8Array): TreePart {
  const reader = unpackArrays(bytes, `${kind}/tree`, VERSION);
  const [part] = reader.next(Uint32Array, 1);
  const feature = reader.next(Int16Array);
  const n = feature.length;
  const tree = {
    feature,
    threshold: reader.next(Float32Array, n),
    left: reader.next(Int32Array, n),
    leafClass: reader.next(Uint8Array, n),
  };
  return { part, tree, impurityDecrease: reader.next(Float64Array), outOfBag: reader.next(Uint8Array) };
}

/**
 * Unpacks parts and puts them in the order of their numbers.
 * @throws ModelBytesError when one is missing or doubled.
 */
export function unpackAllTreeParts(kind: string, parts: readonly Uint8Array[], nParts: number): TreePart[] {
  const trees = parts.map((bytes) => unpackTreePart(kind, bytes)).sort((a, b) => a.part - b.part);
  if (trees.length !== nParts) throw new ModelBytesError(`${nParts} parts are wanted, got ${trees.length}.`);
  trees.forEach(({ part }, i) => {
    if (part !== i) throw new ModelBytesError(`Part ${Math.min(part, i)} is missing or there twice.`);
  });
  return trees;
}

/** Class of row `row` of row-major features. */
export function classifyRow(tree: FlatTree, features: Float32Array, nFeatures: number, row: number): number {
  const { feature, threshold, left, leafClass } = tree;
  let node = 0;
  while (feature[node] >= 0) {
    node = left[node] + (features[row * nFeatures + feature[node]] < threshold[node] ? 0 : 1);
  }
  return leafClass[node];
}

/** Adds up the out-of-bag votes of trees; a tie goes to the class that reached the count first in tree order. */
export function countOutOfBagVotes(set: TrainingSet, trees: readonly TreePart[]): OutOfBagVotes {
  const { nRows, nClasses, labels } = set;
  const counts = new Uint16Array(nRows * nClasses);
  const best = new Uint16Array(nRows);
  const classIndex = new Uint8Array(nRows).fill(IN_BAG);
  for (const { part, outOfBag } of trees) {
    if (outOfBag.length !== nRows) {
      throw new ModelBytesError(`Tree ${part} was trained on ${outOfBag.length} rows, these are ${nRows}.`);
    }
    for (let row = 0; row < nRows; row++) {
      const vote = outOfBag[row];
      if (vote === IN_BAG) continue;
      const count = ++counts[row * nClasses + vote];
      if (count > best[row]) {
        best[row] = count;
        classIndex[row] = vote;
      }
    }
  }
  let nVoted = 0;
  let nCorrect = 0;
  for (let row = 0; row < nRows; row++) {
    if (best[row] === 0) continue;
    nVoted++;
    if (classIndex[row] === labels[row]) nCorrect++;
  }
  return { classIndex, nVoted, nCorrect, accuracy: nVoted > 0 ? nCorrect / nVoted : null };
}
