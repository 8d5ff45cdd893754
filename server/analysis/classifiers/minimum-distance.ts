import { measureClassSpread, type ClassSpread } from './class-spread.ts';
import { requireBlock, requireShares, requireTrainingSet, type Classifier, type TrainedModel } from './classifier.ts';
import { factorCovariance } from './covariance-factor.ts';
import { marginOfBest, shareOfBest, writeShares } from './gaussian-maximum-likelihood.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';

export interface MinimumDistanceParams {
  /** Straight distance in the features' own units, or Mahalanobis distance by the covariance pooled over the classes. */
  metric: 'euclidean' | 'mahalanobis';
}

export const defaultMinimumDistanceParams: MinimumDistanceParams = { metric: 'mahalanobis' };

const kind = 'minimum-distance';
const VERSION = 1;

/**
 * Minimum distance to means: a pixel takes the class whose mean is nearest, the lowest index on a tie. The share is the
 * class's chance if the classes were equally likely normal clouds of one shape: the pooled covariance (Mahalanobis), or
 * a ball of the pooled variance (Euclidean). Training has one part, the same for every seed.
 * Source: Swain & Davis 1978, Remote Sensing: The Quantitative Approach; Mahalanobis 1936, Proceedings of the National
 * Institute of Sciences of India 2:49–55. With the pooled covariance it decides as linear discriminant analysis with
 * equal priors.
 */
export const minimumDistance: Classifier<MinimumDistanceParams> = {
  kind,

  partCount() {
    return 1;
  },

  trainPart(set, params) {
    requireTrainingSet(set);
    const { nFeatures, nClasses } = set;
    const spread = measureClassSpread(set);
    const means = new Float64Array(nClasses * nFeatures);
    spread.classes.forEach(({ mean }, c) => means.set(mean, c * nFeatures));
    const whitener = params.metric === 'mahalanobis' ? factorPooled(spread, nFeatures) : new Float64Array(0);
    const variance = params.metric === 'mahalanobis' ? 1 : measureVariance(spread, nFeatures);
    const shape = Uint32Array.of(nFeatures, nClasses);
    return packArrays(kind, VERSION, [shape, means, whitener, Float64Array.of(variance)]);
  },

  assemble(_shape, _params, parts) {
    if (parts.length !== 1) throw new ModelBytesError(`One part is wanted, got ${parts.length}.`);
    return new MeansModel(parts[0]);
  },

  load(bytes) {
    return new MeansModel(bytes);
  },

  countOutOfBag() {
    return null;
  },
};

class MeansModel implements TrainedModel {
  readonly kind = kind;
  readonly nFeatures: number;
  readonly nClasses: number;
  readonly featureImportance = null;
  readonly #means: Float64Array;
  /** As in `CovarianceFactor`; empty for the Euclidean distance. */
  readonly #whitener: Float64Array;
  /** Squared distance that counts as one standard deviation. */
  readonly #variance: number;
  readonly #bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    const reader = unpackArrays(bytes, kind, VERSION);
    const [nFeatures, nClasses] = reader.next(Uint32Array, 2);
    this.nFeatures = nFeatures;
    this.nClasses = nClasses;
    this.#means = reader.next(Float64Array, nClasses * nFeatures);
    this.#whitener = reader.next(Float64Array);
    if (![0, (nFeatures * (nFeatures + 1)) / 2].includes(this.#whitener.length)) {
      throw new ModelBytesError(`A factor of ${this.#whitener.length} values does not fit ${nFeatures} features.`);
    }
    this.#variance = reader.next(Float64Array, 1)[0];
    this.#bytes = bytes.slice();
  }

  serialise(): Uint8Array {
    return this.#bytes.slice();
  }

  predictBlock(
    features: Float32Array,
    n: number,
    classIndex: Uint8Array,
    share?: Float32Array,
    margin?: Float32Array,
  ): void {
    const { nFeatures, nClasses } = this;
    requireBlock(nFeatures, features, n, classIndex, share, margin);
    const distances = new Float64Array(nClasses);
    const difference = new Float64Array(nFeatures);
    for (let i = 0; i < n; i++) {
      const winner = this.#measure(features, i * nFeatures, distances, difference);
      classIndex[i] = winner;
      if (!share && !margin) continue;
      this.#toLogDensities(distances, winner);
      if (share) share[i] = shareOfBest(distances, distances[winner]);
      if (margin) margin[i] = marginOfBest(distances, winner);
    }
  }

  predictShares(features: Float32Array, n: number, shares: Float32Array): void {
    requireShares(this, features, n, shares);
    const { nFeatures, nClasses } = this;
    const distances = new Float64Array(nClasses);
    const difference = new Float64Array(nFeatures);
    for (let i = 0; i < n; i++) {
      const winner = this.#measure(features, i * nFeatures, distances, difference);
      this.#toLogDensities(distances, winner);
      writeShares(distances, winner, shares, i * nClasses);
    }
  }

  /** Fills the squared distances of the row at `from` to the means, and gives the nearest class. */
  #measure(features: Float32Array, from: number, distances: Float64Array, difference: Float64Array): number {
    const { nFeatures, nClasses } = this;
    const means = this.#means;
    const whitener = this.#whitener;
    const isWhitened = whitener.length > 0;
    let nearest = Infinity;
    let winner = 0;
    for (let c = 0; c < nClasses; c++) {
      let distance = 0;
      let w = 0;
      for (let f = 0; f < nFeatures; f++) {
        difference[f] = features[from + f] - means[c * nFeatures + f];
        let whitened = difference[f];
        if (isWhitened) {
          whitened = 0;
          for (let g = 0; g <= f; g++) whitened += whitener[w++] * difference[g];
        }
        distance += whitened * whitened;
      }
      distances[c] = distance;
      if (distance < nearest) {
        nearest = distance;
        winner = c;
      }
    }
    return winner;
  }

  /** Turns squared distances into log densities; all −∞ when every class is infinitely far. */
  #toLogDensities(distances: Float64Array, winner: number): void {
    const variance = this.#variance;
    const nearest = distances[winner];
    for (let c = 0; c < distances.length; c++) {
      // Without any spread the nearest mean is certain, and means as near share it.
      const excess = distances[c] - nearest;
      if (nearest === Infinity) distances[c] = -Infinity;
      else distances[c] = variance > 0 ? -excess / (2 * variance) : excess === 0 ? 0 : -Infinity;
    }
  }
}

/** @throws RangeError when the pooled covariance is singular. */
function factorPooled({ classes, pooled }: ClassSpread, nFeatures: number): Float64Array {
  const factor = pooled && factorCovariance(pooled, nFeatures);
  if (factor) return factor.whitener;
  const nRows = classes.reduce((sum, { nPixels }) => sum + nPixels, 0);
  const wanted = nFeatures + classes.length;
  const found =
    nRows < wanted
      ? `found ${nRows} training pixels, wanted at least ${wanted} for ${nFeatures} bands and ${classes.length} classes`
      : 'within every class a band has one value throughout or follows from the others, wanted bands that vary by themselves';
  throw new RangeError(
    `The covariance pooled over all classes is singular: ${found}. Add training pixels that differ, leave bands out, or use the Euclidean distance.`,
  );
}

/** Mean variance of a feature about the class means. */
function measureVariance({ pooled }: ClassSpread, nFeatures: number): number {
  if (!pooled) return 0;
  let trace = 0;
  for (let f = 0; f < nFeatures; f++) trace += pooled[f * (nFeatures + 1)];
  return trace / nFeatures;
}
