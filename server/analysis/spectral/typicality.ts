import { incompleteBeta } from '../accuracy/quantiles.ts';
import { factorCovariance } from '../classifiers/covariance-factor.ts';
import type { SampleSummary } from './sample-summary.ts';

/** How samples of one class vary about their class. */
export interface SampleSpread {
  /** Samples of the class. */
  nSamples: number;
  /** Mean of the samples' means. */
  centre: Float64Array;
  /** Covariance of the samples' means, row-major. */
  covariance: Float64Array;
  /** Degrees of freedom behind the covariance. */
  degrees: number;
  /** Whether the class has too few samples for a covariance of its own, so that the spread is that of all classes. */
  isPooled: boolean;
  /** Covariance of pixels within a sample, and how many pixels a sample has (harmonic mean). */
  within: Float64Array;
  usualPixels: number;
}

export interface Typicality {
  /** Squared Mahalanobis distance of the sample's mean from the class's centre. */
  distanceSquared: number;
  /** Chance that a sample of the class lies at least as far out. */
  pValue: number;
  /** Samples of the class it was held against. */
  nSamples: number;
  isPooled: boolean;
}

/**
 * Learns how samples vary about their classes. A class has a covariance of its own once it has two samples more than there are
 * features; below that the deviations of all classes from their own centres are pooled. A class without samples is `null`.
 */
export function learnSampleSpread(
  byClass: readonly (readonly SampleSummary[])[],
  nFeatures: number,
): (SampleSpread | null)[] {
  const groups = byClass.map((samples) => describeGroup(samples, nFeatures));
  const known = groups.filter((group) => group !== null);
  const pooledDegrees = known.reduce((sum, { nSamples }) => sum + nSamples - 1, 0);
  const pooled = addAll(
    known.map(({ between }) => between),
    nFeatures,
  ).map((value) => value / pooledDegrees);
  return groups.map((group) => {
    if (!group) return null;
    const { nSamples, centre, between, within, usualPixels } = group;
    const isPooled = nSamples < nFeatures + 2;
    return {
      ...{ nSamples, centre, within, usualPixels, isPooled },
      degrees: isPooled ? pooledDegrees : nSamples - 1,
      covariance: isPooled ? pooled : between.map((value) => value / (nSamples - 1)),
    };
  });
}

/**
 * Judges how unusual a sample is for a class that it is not part of: the Mahalanobis distance of its mean, and the chance of
 * one as large by Hotelling's T² for one new observation (Anderson 2003, An Introduction to Multivariate Statistical Analysis,
 * 3rd ed., section 5.3): (ν − p + 1)/(ν p) · m/(m + 1) · D² follows F with p and ν − p + 1 degrees of freedom.
 *
 * A sample of fewer pixels than usual has a mean that varies more; the covariance grows by what the missing pixels
 * add, so that few pixels alone do not make it look unusual. `null` when the class has too few samples, or when its features
 * repeat each other.
 * @throws RangeError when the sample has no pixels.
 */
export function judgeTypicality(sample: SampleSummary, spread: SampleSpread): Typicality | null {
  const { nSamples, centre, covariance, degrees, within, usualPixels, isPooled } = spread;
  const p = centre.length;
  if (!(sample.nPixels > 0)) throw new RangeError('A sample without pixels has no place among the classes.');
  const left = degrees - p + 1;
  if (left < 1) return null;
  const extra = Math.max(0, 1 / sample.nPixels - 1 / usualPixels);
  const factor = factorCovariance(
    covariance.map((value, i) => value + extra * within[i]),
    p,
  );
  if (!factor) return null;
  const distanceSquared = squaredLength(
    factor.whitener,
    sample.mean.map((value, f) => value - centre[f]),
  );
  const f = (left / (degrees * p)) * (nSamples / (nSamples + 1)) * distanceSquared;
  return { distanceSquared, pValue: upperTailF(f, p, left), nSamples, isPooled };
}

/** Squared Mahalanobis distance of a place from a centre; `null` when the covariance is singular. */
export function mahalanobisSquared(place: Float64Array, centre: Float64Array, covariance: Float64Array): number | null {
  const factor = factorCovariance(covariance, centre.length);
  if (!factor) return null;
  return squaredLength(
    factor.whitener,
    place.map((value, f) => value - centre[f]),
  );
}

/** Chance of an F with these degrees of freedom to be at least `f` (Abramowitz & Stegun 1964, 26.6.2). */
export function upperTailF(f: number, numerator: number, denominator: number): number {
  if (f <= 0) return 1;
  return incompleteBeta(denominator / 2, numerator / 2, denominator / (denominator + numerator * f));
}

interface Group {
  nSamples: number;
  centre: Float64Array;
  between: Float64Array;
  within: Float64Array;
  usualPixels: number;
}

function describeGroup(samples: readonly SampleSummary[], nFeatures: number): Group | null {
  const filled = samples.filter(({ nPixels }) => nPixels > 0);
  const nSamples = filled.length;
  if (nSamples === 0) return null;
  const centre = new Float64Array(nFeatures);
  for (const { mean } of filled) for (let f = 0; f < nFeatures; f++) centre[f] += mean[f] / nSamples;
  const between = new Float64Array(nFeatures * nFeatures);
  for (const { mean } of filled) {
    for (let f = 0; f < nFeatures; f++) {
      for (let g = 0; g < nFeatures; g++) between[f * nFeatures + g] += (mean[f] - centre[f]) * (mean[g] - centre[g]);
    }
  }
  const withinDegrees = filled.reduce((sum, { nPixels }) => sum + nPixels - 1, 0);
  const within = addAll(
    filled.map(({ scatter }) => scatter),
    nFeatures,
  ).map((value) => (withinDegrees > 0 ? value / withinDegrees : 0));
  const usualPixels = nSamples / filled.reduce((sum, { nPixels }) => sum + 1 / nPixels, 0);
  return { nSamples, centre, between, within, usualPixels };
}

function addAll(matrices: readonly Float64Array[], nFeatures: number): Float64Array {
  const sum = new Float64Array(nFeatures * nFeatures);
  for (const matrix of matrices) for (let i = 0; i < sum.length; i++) sum[i] += matrix[i];
  return sum;
}

/** |W d|² for the rows of a lower triangle up to the diagonal. */
function squaredLength(whitener: Float64Array, d: Float64Array): number {
  let sum = 0;
  let at = 0;
  for (let f = 0; f < d.length; f++) {
    let value = 0;
    for (let g = 0; g <= f; g++) value += whitener[at++] * d[g];
    sum += value * value;
  }
  return sum;
}
