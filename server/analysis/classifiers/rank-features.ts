import type { TrainingSet } from './classifier.ts';

/**
 * A training set with every value replaced by its rank among the distinct values of its feature: exact, whatever the
 * range.
 */
export interface RankedFeatures {
  /** For each feature the rank (0 = lowest) of each row. */
  ranks: readonly Int32Array[];
  /** For each feature its distinct values, ascending. */
  levels: readonly Float32Array[];
}

const ranked = new WeakMap<TrainingSet, RankedFeatures>();

/**
 * Ranks the features of a training set; the result is kept as long as the set object lives, since every tree needs it.
 */
export function rankFeatures(set: TrainingSet): RankedFeatures {
  const known = ranked.get(set);
  if (known) return known;
  const { features, nRows, nFeatures } = set;
  const ranks: Int32Array[] = [];
  const levels: Float32Array[] = [];
  for (let f = 0; f < nFeatures; f++) {
    const column = new Float32Array(nRows);
    for (let row = 0; row < nRows; row++) column[row] = features[row * nFeatures + f];
    const sorted = column.slice().sort();
    const distinct = sorted.filter((value, i) => i === 0 || value !== sorted[i - 1]);
    levels.push(distinct);
    ranks.push(Int32Array.from(column, (value) => indexIn(distinct, value)));
  }
  const result = { ranks, levels };
  ranked.set(set, result);
  return result;
}

function indexIn(sorted: Float32Array, value: number): number {
  let lo = 0;
  let hi = sorted.length - 1;
  while (lo < hi) {
    const middle = (lo + hi) >> 1;
    if (sorted[middle] < value) lo = middle + 1;
    else hi = middle;
  }
  return lo;
}
