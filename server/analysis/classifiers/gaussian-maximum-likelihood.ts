import { measureClassSpread, nameClass, type ClassSpread } from './class-spread.ts';
import {
  requireBlock,
  requireShares,
  requireTrainingSet,
  type Classifier,
  type TrainedModel,
  type TrainingSet,
} from './classifier.ts';
import { factorCovariance, type CovarianceFactor } from './covariance-factor.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';

export interface GaussianParams {
  /** What is known before a pixel is seen: nothing (`equal`), or the classes' shares of the training rows. */
  priors: 'equal' | 'training';
  /** Added to each variance of a class, as a share of the variance pooled over all classes; 0 adds nothing. */
  ridge: number;
}

export const defaultGaussianParams: GaussianParams = { priors: 'equal', ridge: 0 };

const kind = 'gaussian-maximum-likelihood';
const VERSION = 1;

/**
 * Gaussian maximum likelihood: each class is a normal distribution with its own mean and covariance (divisor n − 1), and
 * a pixel takes the class with the greatest ln prior − ½ ln|S| − ½ (x − m)ᵀ S⁻¹ (x − m); the lowest index on a tie. The
 * share is the class's posterior chance. Training has one part, the same for every seed.
 * Source: Swain & Davis 1978, Remote Sensing: The Quantitative Approach; with priors also called quadratic
 * discriminant analysis.
 */
export const gaussianMaximumLikelihood: Classifier<GaussianParams> = {
  kind,

  partCount(params) {
    requireParams(params);
    return 1;
  },

  trainPart(set, params) {
    requireParams(params);
    requireTrainingSet(set);
    const { nFeatures, nClasses, nRows } = set;
    const spread = measureClassSpread(set);
    const factors = spread.classes.map((_, c) => factorClass(set, spread, c, params.ridge));
    const constants = Float64Array.from(factors, ({ logDeterminant }, c) => {
      const prior = params.priors === 'equal' ? 1 / nClasses : spread.classes[c].nPixels / nRows;
      return Math.log(prior) - logDeterminant / 2;
    });
    return packArrays(kind, VERSION, [
      Uint32Array.of(nFeatures, nClasses),
      constants,
      joinArrays(spread.classes.map(({ mean }) => mean)),
      joinArrays(factors.map(({ whitener }) => whitener)),
    ]);
  },

  assemble(_shape, _params, parts) {
    if (parts.length !== 1) throw new ModelBytesError(`One part is wanted, got ${parts.length}.`);
    return new GaussianModel(parts[0]);
  },

  load(bytes) {
    return new GaussianModel(bytes);
  },

  countOutOfBag() {
    return null;
  },
};

class GaussianModel implements TrainedModel {
  readonly kind = kind;
  readonly nFeatures: number;
  readonly nClasses: number;
  readonly featureImportance = null;
  readonly #constants: Float64Array;
  readonly #means: Float64Array;
  readonly #whiteners: Float64Array;
  readonly #bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    const reader = unpackArrays(bytes, kind, VERSION);
    const [nFeatures, nClasses] = reader.next(Uint32Array, 2);
    this.nFeatures = nFeatures;
    this.nClasses = nClasses;
    this.#constants = reader.next(Float64Array, nClasses);
    this.#means = reader.next(Float64Array, nClasses * nFeatures);
    this.#whiteners = reader.next(Float64Array, (nClasses * nFeatures * (nFeatures + 1)) / 2);
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
    const scores = new Float64Array(nClasses);
    const difference = new Float64Array(nFeatures);
    for (let i = 0; i < n; i++) {
      const winner = this.#score(features, i * nFeatures, scores, difference);
      classIndex[i] = winner;
      if (share) share[i] = shareOfBest(scores, scores[winner]);
      if (margin) margin[i] = marginOfBest(scores, winner);
    }
  }

  predictShares(features: Float32Array, n: number, shares: Float32Array): void {
    requireShares(this, features, n, shares);
    const { nFeatures, nClasses } = this;
    const scores = new Float64Array(nClasses);
    const difference = new Float64Array(nFeatures);
    for (let i = 0; i < n; i++) {
      const winner = this.#score(features, i * nFeatures, scores, difference);
      writeShares(scores, winner, shares, i * nClasses);
    }
  }

  /** Fills the log densities of the row at `from`, and gives the class with the greatest. */
  #score(features: Float32Array, from: number, scores: Float64Array, difference: Float64Array): number {
    const { nFeatures, nClasses } = this;
    const constants = this.#constants;
    const means = this.#means;
    const whiteners = this.#whiteners;
    let best = -Infinity;
    let winner = 0;
    let w = 0;
    for (let c = 0; c < nClasses; c++) {
      let distance = 0;
      for (let f = 0; f < nFeatures; f++) {
        difference[f] = features[from + f] - means[c * nFeatures + f];
        let whitened = 0;
        for (let g = 0; g <= f; g++) whitened += whiteners[w++] * difference[g];
        distance += whitened * whitened;
      }
      const score = constants[c] - distance / 2;
      scores[c] = score;
      if (score > best) {
        best = score;
        winner = c;
      }
    }
    return winner;
  }
}

/** The winner's chance less the runner-up's, from log densities; 0 when every class is infinitely far. */
export function marginOfBest(logDensities: Float64Array, winner: number): number {
  const best = logDensities[winner];
  if (best === -Infinity) return 0;
  let second = -Infinity;
  for (let c = 0; c < logDensities.length; c++) {
    if (c !== winner && logDensities[c] > second) second = logDensities[c];
  }
  return shareOfBest(logDensities, best) * (1 - Math.exp(second - best));
}

/** Writes every class's chance from log densities to `shares`, from place `at` on. */
export function writeShares(logDensities: Float64Array, winner: number, shares: Float32Array, at: number): void {
  const best = logDensities[winner];
  const top = shareOfBest(logDensities, best);
  for (let c = 0; c < logDensities.length; c++) {
    shares[at + c] = best === -Infinity ? top : top * Math.exp(logDensities[c] - best);
  }
}

/** The winner's chance among the classes, from log densities; 1 / nClasses when every class is infinitely far. */
export function shareOfBest(logDensities: Float64Array, best: number): number {
  if (best === -Infinity) return 1 / logDensities.length;
  let sum = 0;
  for (let c = 0; c < logDensities.length; c++) sum += Math.exp(logDensities[c] - best);
  return 1 / sum;
}

/** @throws RangeError naming the class whose covariance is singular. */
function factorClass(set: TrainingSet, { classes, pooled }: ClassSpread, c: number, ridge: number): CovarianceFactor {
  const { nFeatures } = set;
  const { nPixels, covariance } = classes[c];
  const ridged = covariance?.slice() ?? new Float64Array(nFeatures * nFeatures);
  if (pooled) for (let f = 0; f < nFeatures; f++) ridged[f * (nFeatures + 1)] += ridge * pooled[f * (nFeatures + 1)];
  const factor = factorCovariance(ridged, nFeatures);
  if (factor) return factor;
  const found =
    ridge === 0 && nPixels <= nFeatures
      ? `found ${nPixels} training ${nPixels === 1 ? 'pixel' : 'pixels'}, wanted at least ${nFeatures + 1} for ${nFeatures} bands`
      : `among its ${nPixels} training pixels a band has one value throughout or follows from the others, wanted bands that vary by themselves`;
  const advice = ridge === 0 ? 'leave bands out, or set a ridge' : 'or leave bands out';
  throw new RangeError(
    `${nameClass(set, c)} has a singular covariance: ${found}. Add training pixels that differ, ${advice}.`,
  );
}

function joinArrays(arrays: readonly Float64Array[]): Float64Array {
  const joined = new Float64Array(arrays.reduce((sum, { length }) => sum + length, 0));
  let offset = 0;
  for (const array of arrays) {
    joined.set(array, offset);
    offset += array.length;
  }
  return joined;
}

function requireParams({ ridge }: GaussianParams): void {
  if (!(ridge >= 0 && ridge <= 1)) throw new RangeError(`The ridge must lie in 0..1, got ${ridge}.`);
}
