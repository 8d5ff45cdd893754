import KNN from 'ml-knn';
import { requireBlock, requireInteger, requireTrainingSet, type Classifier, type TrainedModel } from './classifier.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';

export interface NearestNeighboursParams {
  /** Neighbours that vote. */
  k: number;
  /** Whether each feature is first scaled to mean 0 and standard deviation 1 of the training rows. */
  standardise: boolean;
}

export const defaultNearestNeighboursParams: NearestNeighboursParams = { k: 5, standardise: true };

const kind = 'nearest-neighbours';
const VERSION = 1;

/**
 * k nearest neighbours by Euclidean distance, searched with the k-d tree of the library ml-knn.
 *
 * Ties are decided, not left to the search: neighbours at the same distance count in the order of the training rows,
 * and of classes with as many votes the lowest index wins. Training has one part: it stores the rows.
 * Source: Cover & Hart 1967, IEEE Transactions on Information Theory 13:21–27.
 */
export const nearestNeighbours: Classifier<NearestNeighboursParams> = {
  kind,

  partCount(params) {
    requireParams(params);
    return 1;
  },

  trainPart(set, params) {
    requireParams(params);
    requireTrainingSet(set);
    if (params.k > set.nRows) throw new RangeError(`${params.k} neighbours are wanted of ${set.nRows} training rows.`);
    const shape = Uint32Array.of(set.nFeatures, set.nClasses, set.nRows, params.k, params.standardise ? 1 : 0);
    return packArrays(kind, VERSION, [shape, set.features, set.labels]);
  },

  assemble(_shape, _params, parts) {
    if (parts.length !== 1) throw new ModelBytesError(`One part is wanted, got ${parts.length}.`);
    return new NeighbourModel(parts[0]);
  },

  load(bytes) {
    return new NeighbourModel(bytes);
  },

  countOutOfBag() {
    return null;
  },
};

class NeighbourModel implements TrainedModel {
  readonly kind = kind;
  readonly nFeatures: number;
  readonly nClasses: number;
  readonly featureImportance = null;
  readonly #k: number;
  readonly #nRows: number;
  readonly #labels: Uint8Array;
  readonly #means: Float64Array;
  readonly #scales: Float64Array;
  readonly #tree: KNN['kdTree'];
  readonly #bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    const reader = unpackArrays(bytes, kind, VERSION);
    const [nFeatures, nClasses, nRows, k, standardise] = reader.next(Uint32Array, 5);
    const features = reader.next(Float32Array, nRows * nFeatures);
    this.#bytes = bytes.slice();
    this.nFeatures = nFeatures;
    this.nClasses = nClasses;
    this.#nRows = nRows;
    this.#k = k;
    this.#labels = reader.next(Uint8Array, nRows);
    const { means, scales } = measureScales(features, nRows, nFeatures, standardise === 1);
    this.#means = means;
    this.#scales = scales;
    const points = Array.from({ length: nRows }, (_, row) => this.#scaleRow(features, row));
    // The label stored with each point is its row number, which the tie rule needs; the class follows from it.
    this.#tree = new KNN(
      points,
      points.map((_, row) => row),
      { k, distance: createSquaredDistance(nFeatures) },
    ).kdTree;
  }

  serialise(): Uint8Array {
    return this.#bytes.slice();
  }

  predictBlock(features: Float32Array, n: number, classIndex: Uint8Array, share?: Float32Array): void {
    requireBlock(this.nFeatures, features, n, classIndex, share);
    const votes = new Int32Array(this.nClasses);
    for (let i = 0; i < n; i++) {
      votes.fill(0);
      for (const row of this.#nearestRows(this.#scaleRow(features, i))) votes[this.#labels[row]]++;
      let winner = 0;
      for (let c = 1; c < votes.length; c++) if (votes[c] > votes[winner]) winner = c;
      classIndex[i] = winner;
      if (share) share[i] = votes[winner] / this.#k;
    }
  }

  /** The k nearest training rows, ties in row order. */
  #nearestRows(point: number[]): number[] {
    const k = this.#k;
    // One more than k shows whether a tie runs past the k-th; then more are fetched until it ends.
    for (let wanted = k + 1; ; wanted *= 2) {
      const found = this.#tree
        .nearest(point, Math.min(wanted, this.#nRows))
        .map(([stored, distance]) => ({ row: stored[this.nFeatures], distance }))
        .sort((a, b) => a.distance - b.distance || a.row - b.row);
      const tieEnds = found.length === this.#nRows || found[found.length - 1].distance > found[k - 1].distance;
      if (tieEnds) return found.slice(0, k).map(({ row }) => row);
    }
  }

  #scaleRow(features: Float32Array, row: number): number[] {
    const point = new Array<number>(this.nFeatures);
    for (let f = 0; f < this.nFeatures; f++) {
      point[f] = (features[row * this.nFeatures + f] - this.#means[f]) * this.#scales[f];
    }
    return point;
  }
}

/**
 * Squared Euclidean distance over the features only. With the library's own distance its search visits every point,
 * since that reads the length of the stand-in the search compares with, which has none; this one lets the search skip
 * branches.
 */
function createSquaredDistance(nFeatures: number): (a: ArrayLike<number>, b: ArrayLike<number>) => number {
  return (a, b) => {
    let sum = 0;
    for (let f = 0; f < nFeatures; f++) {
      const difference = a[f] - b[f];
      sum += difference * difference;
    }
    return sum;
  };
}

function measureScales(
  features: Float32Array,
  nRows: number,
  nFeatures: number,
  standardise: boolean,
): { means: Float64Array; scales: Float64Array } {
  const means = new Float64Array(nFeatures);
  const scales = new Float64Array(nFeatures).fill(1);
  if (!standardise) return { means, scales };
  for (let f = 0; f < nFeatures; f++) {
    let sum = 0;
    for (let row = 0; row < nRows; row++) sum += features[row * nFeatures + f];
    const mean = sum / nRows;
    let squares = 0;
    for (let row = 0; row < nRows; row++) squares += (features[row * nFeatures + f] - mean) ** 2;
    const deviation = Math.sqrt(squares / nRows);
    means[f] = mean;
    // A constant feature tells nothing and is left at distance 0.
    scales[f] = deviation > 0 ? 1 / deviation : 0;
  }
  return { means, scales };
}

function requireParams({ k }: NearestNeighboursParams): void {
  requireInteger('Number of neighbours', k, 1, 1000);
}
