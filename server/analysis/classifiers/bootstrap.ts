import type { Rng } from '../sampling/rng.ts';
import type { TrainingSet } from './classifier.ts';
import { IN_BAG, type FlatTree } from './tree-part.ts';

/** Draws nDraws rows of 0..nRows−1 with replacement. Source: Breiman 1996, Machine Learning 24:123–140 (bagging). */
export function drawBootstrap(
  nRows: number,
  nDraws: number,
  rng: Rng,
): { rows: Int32Array; /** How often each row was drawn. */ timesDrawn: Uint32Array } {
  const rows = new Int32Array(nDraws);
  const timesDrawn = new Uint32Array(nRows);
  for (let i = 0; i < nDraws; i++) {
    const row = rng.nextBelow(nRows);
    rows[i] = row;
    timesDrawn[row]++;
  }
  return { rows, timesDrawn };
}

/** Classifies the training rows a tree has not seen; the others are marked as in the bag. */
export function classifyOutOfBag(set: TrainingSet, tree: FlatTree, timesDrawn: Uint32Array): Uint8Array {
  const { features, nRows, nFeatures } = set;
  const { feature, threshold, left, leafClass } = tree;
  const votes = new Uint8Array(nRows).fill(IN_BAG);
  for (let row = 0; row < nRows; row++) {
    if (timesDrawn[row] > 0) continue;
    const from = row * nFeatures;
    let node = 0;
    for (let f = feature[0]; f >= 0; f = feature[node]) {
      node = left[node] + (features[from + f] < threshold[node] ? 0 : 1);
    }
    votes[row] = leafClass[node];
  }
  return votes;
}
