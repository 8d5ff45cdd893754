/** Mean and spread of a class in the feature space. */
export interface ClassSignature {
  nPixels: number;
  mean: Float64Array;
  /** Sample covariance (divisor n − 1), row-major nFeatures × nFeatures; `null` below two pixels. */
  covariance: Float64Array | null;
}

/**
 * Computes the signature of each class from labelled rows.
 *
 * Features are row-major, nRows × nFeatures; labels are class indices. A class without rows has a mean of NaN and no
 * covariance.
 * @throws RangeError when the lengths do not fit or a label is not below nClasses.
 */
export function computeSignatures(
  features: Float32Array,
  labels: Uint8Array,
  nFeatures: number,
  nClasses: number,
): ClassSignature[] {
  if (features.length !== labels.length * nFeatures) {
    throw new RangeError(`${labels.length} rows of ${nFeatures} features are not ${features.length} values.`);
  }
  const rowsByClass: number[][] = Array.from({ length: nClasses }, () => []);
  labels.forEach((label, row) => {
    if (label >= nClasses) throw new RangeError(`Row ${row} has class ${label} of only ${nClasses}.`);
    rowsByClass[label].push(row);
  });
  return rowsByClass.map((rows) => signatureOf(features, rows, nFeatures));
}

function signatureOf(features: Float32Array, rows: readonly number[], nFeatures: number): ClassSignature {
  const n = rows.length;
  const mean = new Float64Array(nFeatures);
  for (const row of rows) for (let f = 0; f < nFeatures; f++) mean[f] += features[row * nFeatures + f];
  for (let f = 0; f < nFeatures; f++) mean[f] /= n;
  if (n < 2) return { nPixels: n, mean, covariance: null };
  const covariance = new Float64Array(nFeatures * nFeatures);
  for (const row of rows) {
    for (let f = 0; f < nFeatures; f++) {
      const df = features[row * nFeatures + f] - mean[f];
      for (let g = 0; g <= f; g++) covariance[f * nFeatures + g] += df * (features[row * nFeatures + g] - mean[g]);
    }
  }
  for (let f = 0; f < nFeatures; f++) {
    for (let g = 0; g <= f; g++) {
      covariance[f * nFeatures + g] /= n - 1;
      covariance[g * nFeatures + f] = covariance[f * nFeatures + g];
    }
  }
  return { nPixels: n, mean, covariance };
}
