/**
 * A confusion matrix: flat, row-major, `nClasses × nClasses`; rows are mapped classes, columns are reference classes.
 * Counts may be fractional (weights, estimated proportions).
 */
export interface ConfusionMatrix {
  readonly nClasses: number;
  readonly counts: Float64Array;
}

/** Accuracy of one class. `null` stands for "cannot be computed": the class was never mapped, or has no reference. */
export interface ClassAccuracy {
  /** Row total: how much was mapped as this class. */
  mapped: number;
  /** Column total: how much of this class the reference holds. */
  reference: number;
  /** Diagonal cell. */
  correct: number;
  /** User's accuracy, correct / mapped (1 − commission error). */
  users: number | null;
  /** Producer's accuracy, correct / reference (1 − omission error). */
  producers: number | null;
  /** F1 = 2·correct / (mapped + reference), the harmonic mean of the two where both exist. */
  f1: number | null;
}

export interface MatrixSummary {
  total: number;
  correct: number;
  /** Overall accuracy, correct / total. */
  overall: number | null;
  perClass: ClassAccuracy[];
}

/**
 * Makes an empty confusion matrix.
 * @throws RangeError when nClasses is not a positive integer.
 */
export function createConfusionMatrix(nClasses: number): ConfusionMatrix {
  if (!Number.isInteger(nClasses) || nClasses < 1) {
    throw new RangeError(`A confusion matrix needs at least one class, got ${nClasses}.`);
  }
  return { nClasses, counts: new Float64Array(nClasses * nClasses) };
}

/**
 * Adds one observation (or a weight) to the cell of a mapped and a reference class index.
 * @throws RangeError when a class index is outside 0..nClasses−1 or the weight is negative or not finite.
 */
export function addToConfusionMatrix(matrix: ConfusionMatrix, mapped: number, reference: number, weight = 1): void {
  const { nClasses, counts } = matrix;
  if (!isClassIndex(mapped, nClasses) || !isClassIndex(reference, nClasses)) {
    throw new RangeError(`Class indices must be 0..${nClasses - 1}, got mapped ${mapped}, reference ${reference}.`);
  }
  if (!(weight >= 0) || !Number.isFinite(weight)) {
    throw new RangeError(`A weight must be a finite number of at least 0, got ${weight}.`);
  }
  counts[mapped * nClasses + reference] += weight;
}

/**
 * Counts pairs of class indices: `mapped[i]` against `reference[i]`.
 * @throws RangeError when the lengths differ or a class index is out of range.
 */
export function confusionMatrixFromPairs(
  mapped: ArrayLike<number>,
  reference: ArrayLike<number>,
  nClasses: number,
): ConfusionMatrix {
  if (mapped.length !== reference.length) {
    throw new RangeError(`Got ${mapped.length} mapped classes for ${reference.length} reference classes.`);
  }
  const matrix = createConfusionMatrix(nClasses);
  for (let i = 0; i < mapped.length; i++) addToConfusionMatrix(matrix, mapped[i], reference[i]);
  return matrix;
}

/**
 * Builds a matrix from rows (mapped) of columns (reference).
 * @throws RangeError when it is not square or a count is negative or not finite.
 */
export function confusionMatrixFromRows(rows: readonly (readonly number[])[]): ConfusionMatrix {
  const matrix = createConfusionMatrix(rows.length);
  rows.forEach((row, mapped) => {
    if (row.length !== rows.length) {
      throw new RangeError(`Row ${mapped} has ${row.length} columns, a square matrix of ${rows.length} needs as many.`);
    }
    row.forEach((count, reference) => addToConfusionMatrix(matrix, mapped, reference, count));
  });
  return matrix;
}

/** Sums matrices of the same classes into a new one. @throws RangeError when the class numbers differ. */
export function sumConfusionMatrices(matrices: readonly ConfusionMatrix[], nClasses: number): ConfusionMatrix {
  const sum = createConfusionMatrix(nClasses);
  for (const matrix of matrices) {
    if (matrix.nClasses !== nClasses) {
      throw new RangeError(`Cannot add a matrix of ${matrix.nClasses} classes to one of ${nClasses}.`);
    }
    for (let i = 0; i < sum.counts.length; i++) sum.counts[i] += matrix.counts[i];
  }
  return sum;
}

/** Totals of the rows (mapped) and of the columns (reference), each of length nClasses. */
export function confusionMatrixMargins(matrix: ConfusionMatrix): { mapped: Float64Array; reference: Float64Array } {
  const { nClasses, counts } = matrix;
  const mapped = new Float64Array(nClasses);
  const reference = new Float64Array(nClasses);
  for (let i = 0; i < nClasses; i++) {
    for (let j = 0; j < nClasses; j++) {
      const count = counts[i * nClasses + j];
      mapped[i] += count;
      reference[j] += count;
    }
  }
  return { mapped, reference };
}

/**
 * Overall, user's and producer's accuracy and F1 of a matrix; `null` where a denominator is zero.
 * Source: Story & Congalton 1986, PE&RS 52:397–399; Congalton 1991, Remote Sensing of Environment 37:35–46.
 */
export function summariseConfusionMatrix(matrix: ConfusionMatrix): MatrixSummary {
  const { nClasses, counts } = matrix;
  const { mapped, reference } = confusionMatrixMargins(matrix);
  const perClass: ClassAccuracy[] = [];
  let total = 0;
  let correct = 0;
  for (let c = 0; c < nClasses; c++) {
    const hit = counts[c * nClasses + c];
    total += mapped[c];
    correct += hit;
    perClass.push({
      mapped: mapped[c],
      reference: reference[c],
      correct: hit,
      users: ratioOrNull(hit, mapped[c]),
      producers: ratioOrNull(hit, reference[c]),
      f1: ratioOrNull(2 * hit, mapped[c] + reference[c]),
    });
  }
  return { total, correct, overall: ratioOrNull(correct, total), perClass };
}

function ratioOrNull(numerator: number, denominator: number): number | null {
  return denominator > 0 ? numerator / denominator : null;
}

function isClassIndex(value: number, nClasses: number): boolean {
  return Number.isInteger(value) && value >= 0 && value < nClasses;
}
