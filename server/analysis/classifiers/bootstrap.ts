import type { Rng } from '../sampling/rng.ts';
import type { TrainingSet } from './classifier.ts';
import { classifyRow, IN_BAG, type FlatTree } from './tree-part.ts';

/** Draws nDraws rows of 0..nRows−1 with replacement. Source: Breiman 1996, Machine Learning 24:123–140 (bagging). */
export function drawBootstrap(nRows: number, nDraws: number, rng: Rng): { rows: Int32Array; inBag: Uint8Array } {
  const rows = new Int32Array(nDraws);
  const inBag = new Uint8Array(nRows);
  for (let i = 0; i < nDraws; i++) {
    const row = rng.nextBelow(nRows);
    rows[i] = row;
    inBag[row] = 1;
  }
  return { rows, inBag };
}

/** Classifies the training rows a tree has not seen; the others are marked as in the bag. */
export function classifyOutOfBag(set: TrainingSet, tree: FlatTree, inBag: Uint8Array): Uint8Array {
  return inBag.map((seen, row) => (seen ? IN_BAG : classifyRow(tree, set.features, set.nFeatures, row)));
}
