/** Rows to learn from. Features are row-major, nRows × nFeatures, finite; labels are class indices. */
export interface TrainingSet {
  features: Float32Array;
  /** Class index 0..nClasses−1 of each row. */
  labels: Uint8Array;
  nRows: number;
  nFeatures: number;
  nClasses: number;
  /** What the classes are called, for messages. */
  classNames?: readonly string[];
}

/** Parts of the training done so far; parts are of about equal size. */
export interface TrainProgress {
  done: number;
  total: number;
}

/** A classifier ready to map pixels. It keeps scratch memory, so one instance serves one thread. */
export interface TrainedModel {
  readonly kind: string;
  readonly nFeatures: number;
  readonly nClasses: number;
  /**
   * Share of each feature in the decrease of impurity, summing to 1 (mean decrease in Gini, Breiman 2001);
   * `null` where the method has no such figure.
   */
  readonly featureImportance: Float64Array | null;
  /**
   * Classifies n rows of row-major features: fills classIndex[0..n) and, when given, share[0..n) with the winner's
   * share of the votes (0..1), or its chance where the method has chances, and margin[0..n) with that share minus the
   * runner-up's: 0 where two classes are as good. Rows of no data are the caller's to mask: a NaN gives some class.
   * @throws RangeError when an array is too short.
   */
  predictBlock(
    features: Float32Array,
    n: number,
    classIndex: Uint8Array,
    share?: Float32Array,
    margin?: Float32Array,
  ): void;
  /**
   * Fills shares[0..n·nClasses), row-major, with every class's share of the votes or its chance; a row sums to 1.
   * @throws RangeError when an array is too short.
   */
  predictShares(features: Float32Array, n: number, shares: Float32Array): void;
  /** The model as bytes with kind, version and checksum; equal models give equal bytes. */
  serialise(): Uint8Array;
}

/** Votes on the training rows by the parts that had not seen them. */
export interface OutOfBagVotes {
  /** Class with the most votes for each row; 255 where every part had seen the row. */
  classIndex: Uint8Array;
  /** Rows with at least one vote. */
  nVoted: number;
  nCorrect: number;
  /** nCorrect / nVoted; `null` when no row has a vote. Optimistic: pixels of one polygon are alike. */
  accuracy: number | null;
}

/**
 * A method of classification. Training is cut into parts (trees) that depend on the seed and their own number alone,
 * so that they can be trained in any order on any number of threads, and the assembled model is the same to the byte.
 */
export interface Classifier<P> {
  readonly kind: string;
  /** Number of parts. @throws RangeError when a parameter makes no sense. */
  partCount(params: P): number;
  /**
   * Trains part 0 ≤ part < partCount as bytes that can be sent between threads.
   * @throws RangeError when the training set or a parameter makes no sense.
   */
  trainPart(set: TrainingSet, params: P, seed: number, part: number): Uint8Array;
  /**
   * Joins the parts, in whatever order they arrive, into a model.
   * @throws ModelBytesError when a part is missing, doubled or damaged.
   */
  assemble(shape: { nFeatures: number; nClasses: number }, params: P, parts: readonly Uint8Array[]): TrainedModel;
  /** Reads a serialised model. @throws ModelBytesError when the bytes are not such a model or are damaged. */
  load(bytes: Uint8Array): TrainedModel;
  /** Counts out-of-bag votes; `null` when the method has none. */
  countOutOfBag(set: TrainingSet, parts: readonly Uint8Array[]): OutOfBagVotes | null;
}

/** Features a model can have, so that a tree node's feature number fits eight bits. */
export const MAX_FEATURES = 256;
/** Classes a model can have; 255 stands for "none" in class rasters and votes. */
export const MAX_CLASSES = 255;

/** Trains all parts one after the other in this thread; for small sets and tests. */
export function trainModel<P>(
  classifier: Classifier<P>,
  set: TrainingSet,
  params: P,
  seed: number,
  onProgress?: (progress: TrainProgress) => void,
): { model: TrainedModel; parts: Uint8Array[] } {
  const total = classifier.partCount(params);
  const parts: Uint8Array[] = [];
  for (let part = 0; part < total; part++) {
    parts.push(classifier.trainPart(set, params, seed, part));
    onProgress?.({ done: part + 1, total });
  }
  return { model: classifier.assemble(set, params, parts), parts };
}

/** Sets found sound, since every part of a training asks again. */
const soundSets = new WeakSet<TrainingSet>();

/** Checks a training set at the door, once. @throws RangeError saying what was got and what is wanted. */
export function requireTrainingSet(set: TrainingSet): void {
  if (soundSets.has(set)) return;
  const { features, labels, nRows, nFeatures, nClasses } = set;
  if (!Number.isInteger(nFeatures) || nFeatures < 1 || nFeatures > MAX_FEATURES) {
    throw new RangeError(`A training set has 1 to ${MAX_FEATURES} features, got ${nFeatures}.`);
  }
  if (!Number.isInteger(nClasses) || nClasses < 1 || nClasses > MAX_CLASSES) {
    throw new RangeError(`A training set has 1 to ${MAX_CLASSES} classes, got ${nClasses}.`);
  }
  if (nRows < 1 || labels.length !== nRows || features.length !== nRows * nFeatures) {
    throw new RangeError(
      `${nRows} rows of ${nFeatures} features were said, got ${features.length} values and ${labels.length} labels.`,
    );
  }
  const badLabel = labels.findIndex((label) => label >= nClasses);
  if (badLabel >= 0) throw new RangeError(`Row ${badLabel} has class ${labels[badLabel]} of only ${nClasses}.`);
  let badValue = 0;
  while (badValue < features.length && Number.isFinite(features[badValue])) badValue++;
  if (badValue < features.length) {
    throw new RangeError(
      `Row ${Math.floor(badValue / nFeatures)}, feature ${badValue % nFeatures} is not a finite number.`,
    );
  }
  soundSets.add(set);
}

/** Checks the arrays handed to `predictBlock`. @throws RangeError when one is too short. */
export function requireBlock(
  nFeatures: number,
  features: Float32Array,
  n: number,
  classIndex: Uint8Array,
  share?: Float32Array,
  margin?: Float32Array,
): void {
  const isShort = (share && share.length < n) || (margin && margin.length < n);
  if (features.length < n * nFeatures || classIndex.length < n || isShort) {
    throw new RangeError(
      `${n} rows of ${nFeatures} features need longer arrays than ${features.length} values, ` +
        `${classIndex.length} classes${share ? `, ${share.length} shares` : ''}${margin ? `, ${margin.length} margins` : ''}.`,
    );
  }
}

/** Checks the arrays handed to `predictShares`. @throws RangeError when one is too short. */
export function requireShares(
  { nFeatures, nClasses }: { nFeatures: number; nClasses: number },
  features: Float32Array,
  n: number,
  shares: Float32Array,
): void {
  if (features.length < n * nFeatures || shares.length < n * nClasses) {
    throw new RangeError(
      `${n} rows of ${nFeatures} features and ${nClasses} classes need longer arrays than ${features.length} values ` +
        `and ${shares.length} shares.`,
    );
  }
}

/** Checks a whole-number parameter. @throws RangeError when it is not an integer in low..high. */
export function requireInteger(name: string, value: number, low: number, high: number): void {
  if (!Number.isInteger(value) || value < low || value > high) {
    throw new RangeError(`${name} must be a whole number from ${low} to ${high}, got ${value}.`);
  }
}
