import type { ClassSignature } from './class-signature.ts';

/** What a sample's pixels come to in the feature space; summaries of several samples can be pooled exactly. */
export interface SampleSummary {
  nPixels: number;
  /** NaN without pixels. */
  mean: Float64Array;
  /** Sums of products of deviations from the mean, row-major nFeatures × nFeatures. */
  scatter: Float64Array;
}

/**
 * Summarises pixels, row-major nPixels × nFeatures.
 * @throws RangeError when the length is no multiple of the number of features.
 */
export function summarisePixels(features: Float32Array, nFeatures: number): SampleSummary {
  const nPixels = features.length / nFeatures;
  if (!Number.isInteger(nPixels)) {
    throw new RangeError(`${features.length} values are not rows of ${nFeatures} features.`);
  }
  const mean = new Float64Array(nFeatures);
  for (let i = 0; i < features.length; i++) mean[i % nFeatures] += features[i];
  for (let f = 0; f < nFeatures; f++) mean[f] /= nPixels;
  const scatter = new Float64Array(nFeatures * nFeatures);
  for (let row = 0; row < features.length; row += nFeatures) {
    for (let f = 0; f < nFeatures; f++) {
      const deviation = features[row + f] - mean[f];
      for (let g = 0; g <= f; g++) scatter[f * nFeatures + g] += deviation * (features[row + g] - mean[g]);
    }
  }
  for (let f = 0; f < nFeatures; f++) {
    for (let g = 0; g < f; g++) scatter[g * nFeatures + f] = scatter[f * nFeatures + g];
  }
  return { nPixels, mean, scatter };
}

/**
 * The signature of all pixels of several samples together, each pixel counting once (Chan, Golub & LeVeque 1983, The
 * American Statistician 37:242–247). Without a pixel the mean is NaN; below two the covariance is `null`.
 */
export function poolSummaries(summaries: readonly SampleSummary[], nFeatures: number): ClassSignature {
  let nPixels = 0;
  const mean = new Float64Array(nFeatures);
  const scatter = new Float64Array(nFeatures * nFeatures);
  for (const summary of summaries) {
    if (summary.nPixels === 0) continue;
    const total = nPixels + summary.nPixels;
    const difference = summary.mean.map((value, f) => value - mean[f]);
    const weight = (nPixels * summary.nPixels) / total;
    for (let f = 0; f < nFeatures; f++) {
      // The lower triangle alone, mirrored below: rounding would make the two differ, and factoring wants them the same.
      for (let g = 0; g <= f; g++) {
        scatter[f * nFeatures + g] += summary.scatter[f * nFeatures + g] + weight * difference[f] * difference[g];
      }
    }
    for (let f = 0; f < nFeatures; f++) mean[f] += (difference[f] * summary.nPixels) / total;
    nPixels = total;
  }
  for (let f = 0; f < nFeatures; f++) {
    for (let g = 0; g < f; g++) scatter[g * nFeatures + f] = scatter[f * nFeatures + g];
  }
  if (nPixels === 0) return { nPixels, mean: mean.fill(Number.NaN), covariance: null };
  return { nPixels, mean, covariance: nPixels < 2 ? null : scatter.map((value) => value / (nPixels - 1)) };
}

/** The signature of some of the features, in the order given. @throws RangeError for a feature that is not there. */
export function pickFeatures(signature: ClassSignature, features: readonly number[]): ClassSignature {
  const { nPixels, mean, covariance } = signature;
  const n = mean.length;
  const missing = features.find((f) => !Number.isInteger(f) || f < 0 || f >= n);
  if (missing !== undefined) throw new RangeError(`Feature ${missing} of ${n}.`);
  const part = covariance && Float64Array.from(features.flatMap((f) => features.map((g) => covariance[f * n + g])));
  return { nPixels, mean: Float64Array.from(features, (f) => mean[f]), covariance: part };
}
