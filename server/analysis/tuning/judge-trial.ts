import type { TrainedModel, TrainingSet } from '../classifiers/classifier.ts';

/** Rows handed to the model at a time. */
const BLOCK_ROWS = 4096;

/** Joins training sets of the same features and classes into one. @throws RangeError when there is none, or they differ */
export function joinTrainingSets(sets: readonly TrainingSet[]): TrainingSet {
  const [first] = sets;
  if (!first) throw new RangeError('No training set is given.');
  const { nFeatures, nClasses } = first;
  if (sets.some((set) => set.nFeatures !== nFeatures || set.nClasses !== nClasses)) {
    throw new RangeError('The training sets differ in features or classes.');
  }
  const nRows = sets.reduce((sum, set) => sum + set.nRows, 0);
  const features = new Float32Array(nRows * nFeatures);
  const labels = new Uint8Array(nRows);
  let row = 0;
  for (const set of sets) {
    features.set(set.features, row * nFeatures);
    labels.set(set.labels, row);
    row += set.nRows;
  }
  return { ...first, features, labels, nRows };
}

/** Rows by true class and predicted class, row-major, nClasses × nClasses. */
export function countConfusion(model: TrainedModel, { features, labels, nRows, nFeatures, nClasses }: TrainingSet) {
  const confusion = new Uint32Array(nClasses * nClasses);
  const predicted = new Uint8Array(BLOCK_ROWS);
  for (let from = 0; from < nRows; from += BLOCK_ROWS) {
    const n = Math.min(BLOCK_ROWS, nRows - from);
    model.predictBlock(features.subarray(from * nFeatures, (from + n) * nFeatures), n, predicted);
    for (let i = 0; i < n; i++) confusion[labels[from + i] * nClasses + predicted[i]]++;
  }
  return confusion;
}

export interface TrialScore {
  /** Share of the rows given their class, one a fold; null where a fold has no row. */
  foldAccuracies: (number | null)[];
  /** Mean over the folds; null when none could be judged. */
  meanAccuracy: number | null;
  /** Standard deviation over the folds, n − 1; null for fewer than two. */
  spread: number | null;
  /** Mean over the classes with rows of the share of their rows that was found, all folds together. */
  meanProducersAccuracy: number | null;
}

/** Figures of a trial from its folds' confusions (true class × predicted class, row-major). */
export function scoreTrial(confusions: readonly Uint32Array[], nClasses: number): TrialScore {
  const foldAccuracies = confusions.map((confusion) => {
    let right = 0;
    let all = 0;
    for (let i = 0; i < confusion.length; i++) {
      all += confusion[i];
      if (i % (nClasses + 1) === 0) right += confusion[i];
    }
    return all > 0 ? right / all : null;
  });
  const known = foldAccuracies.filter((value): value is number => value !== null);
  const mean = takeMean(known);
  const spread =
    mean !== null && known.length > 1
      ? Math.sqrt(known.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (known.length - 1))
      : null;
  const found: number[] = [];
  for (let c = 0; c < nClasses; c++) {
    let right = 0;
    let all = 0;
    for (const confusion of confusions) {
      for (let other = 0; other < nClasses; other++) all += confusion[c * nClasses + other];
      right += confusion[c * nClasses + c];
    }
    if (all > 0) found.push(right / all);
  }
  return { foldAccuracies, meanAccuracy: mean, spread, meanProducersAccuracy: takeMean(found) };
}

function takeMean(values: readonly number[]): number | null {
  return values.length > 0 ? values.reduce((sum, value) => sum + value, 0) / values.length : null;
}
