import {
  requireBlock,
  requireInteger,
  requireShares,
  requireTrainingSet,
  type Classifier,
  type TrainedModel,
} from './classifier.ts';
import { keepScales, measureScales, scaleRows, type FeatureScales } from './feature-scales.ts';
import { ModelBytesError, packArrays, unpackArrays } from './model-bytes.ts';
import { NeighbourSearch } from './neighbour-search.ts';
import { layOutTree, orderPoints } from './neighbour-tree.ts';

export interface NearestNeighboursParams {
  /** Neighbours that vote. */
  k: number;
  /** Whether each feature is first scaled to mean 0 and standard deviation 1 of the training rows. */
  standardise: boolean;
}

export const defaultNearestNeighboursParams: NearestNeighboursParams = { k: 5, standardise: true };

const kind = 'nearest-neighbours';
const VERSION = 2;

/**
 * k nearest neighbours by Euclidean distance: the library ml-knn arranges the training rows in a k-d tree, which is then
 * laid out flat and searched here.
 *
 * Ties are decided, not left to the search: neighbours at the same distance count in the order of the training rows,
 * and of classes with as many votes the lowest index wins. Training has one part, the same for every seed.
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
    const { nFeatures, nClasses, nRows, features, labels } = set;
    if (params.k > nRows) throw new RangeError(`${params.k} neighbours are wanted of ${nRows} training rows.`);
    const scaled = scaleRows(features, nRows, chooseScales(features, nRows, nFeatures, params.standardise));
    const shape = Uint32Array.of(nFeatures, nClasses, nRows, params.k, params.standardise ? 1 : 0);
    return packArrays(kind, VERSION, [shape, features, labels, orderPoints(scaled, nFeatures)]);
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
  readonly #labels: Uint8Array;
  readonly #scales: FeatureScales;
  readonly #search: NeighbourSearch;
  readonly #votes: Uint16Array;
  readonly #bytes: Uint8Array;

  constructor(bytes: Uint8Array) {
    const reader = unpackArrays(bytes, kind, VERSION);
    const [nFeatures, nClasses, nRows, k, standardise] = reader.next(Uint32Array, 5);
    const features = reader.next(Float32Array, nRows * nFeatures);
    this.#bytes = bytes.slice();
    this.nFeatures = nFeatures;
    this.nClasses = nClasses;
    this.#k = k;
    this.#labels = reader.next(Uint8Array, nRows);
    const order = reader.next(Int32Array, nRows);
    requirePermutation(order);
    this.#scales = chooseScales(features, nRows, nFeatures, standardise === 1);
    const tree = layOutTree(scaleRows(features, nRows, this.#scales), order, nFeatures);
    this.#search = new NeighbourSearch(tree, k);
    this.#votes = new Uint16Array(nClasses);
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
    const { nFeatures } = this;
    requireBlock(nFeatures, features, n, classIndex, share, margin);
    const { means, scales } = this.#scales;
    const search = this.#search;
    const votes = this.#votes;
    const labels = this.#labels;
    const position = new Float64Array(nFeatures);
    for (let i = 0; i < n; i++) {
      for (let f = 0; f < nFeatures; f++) position[f] = (features[i * nFeatures + f] - means[f]) * scales[f];
      search.find(position);
      const { found } = search;
      let winner = labels[found[0]];
      for (let j = 0; j < found.length; j++) {
        const candidate = labels[found[j]];
        votes[candidate]++;
        if (votes[candidate] > votes[winner] || (votes[candidate] === votes[winner] && candidate < winner)) {
          winner = candidate;
        }
      }
      classIndex[i] = winner;
      if (share) share[i] = votes[winner] / this.#k;
      if (margin) {
        let second = 0;
        for (let j = 0; j < found.length; j++) {
          const candidate = labels[found[j]];
          if (candidate !== winner && votes[candidate] > second) second = votes[candidate];
        }
        margin[i] = (votes[winner] - second) / this.#k;
      }
      for (let j = 0; j < found.length; j++) votes[labels[found[j]]] = 0;
    }
  }

  predictShares(features: Float32Array, n: number, shares: Float32Array): void {
    requireShares(this, features, n, shares);
    const { nFeatures, nClasses } = this;
    const { means, scales } = this.#scales;
    const position = new Float64Array(nFeatures);
    shares.fill(0, 0, n * nClasses);
    for (let i = 0; i < n; i++) {
      for (let f = 0; f < nFeatures; f++) position[f] = (features[i * nFeatures + f] - means[f]) * scales[f];
      this.#search.find(position);
      for (const row of this.#search.found) shares[i * nClasses + this.#labels[row]] += 1 / this.#k;
    }
  }
}

function chooseScales(features: Float32Array, nRows: number, nFeatures: number, standardise: boolean): FeatureScales {
  return standardise ? measureScales(features, nRows, nFeatures) : keepScales(nFeatures);
}

/** Bytes can carry a right checksum and still no tree. */
function requirePermutation(order: Int32Array): void {
  const seen = new Uint8Array(order.length);
  for (const row of order) {
    if (row < 0 || row >= order.length || seen[row]) throw new ModelBytesError('The order of the rows makes no sense.');
    seen[row] = 1;
  }
}

function requireParams({ k }: NearestNeighboursParams): void {
  requireInteger('Number of neighbours', k, 1, 1000);
}
