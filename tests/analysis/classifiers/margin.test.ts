import { describe, expect, it } from 'vitest';
import { trainModel, type TrainedModel, type TrainingSet } from '../../../server/analysis/classifiers/classifier.ts';
import { gaussianMaximumLikelihood } from '../../../server/analysis/classifiers/gaussian-maximum-likelihood.ts';
import { minimumDistance } from '../../../server/analysis/classifiers/minimum-distance.ts';
import { nearestNeighbours } from '../../../server/analysis/classifiers/nearest-neighbours.ts';
import { defaultRandomForestParams, randomForest } from '../../../server/analysis/classifiers/random-forest.ts';
import {
  defaultRandomSubspaceForestParams,
  randomSubspaceForest,
} from '../../../server/analysis/classifiers/random-subspace-forest.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';

const nRows = 240;
const nFeatures = 3;
const nClasses = 4;

/** Four clouds that overlap. */
function makeSet(): TrainingSet {
  const rng = createRng(7);
  const labels = Uint8Array.from({ length: nRows }, (_, i) => i % nClasses);
  const features = Float32Array.from({ length: nRows * nFeatures }, (_, i) => {
    const label = labels[Math.floor(i / nFeatures)]!;
    return 100 * label * (i % nFeatures === 1 ? -1 : 1) + 260 * rng.nextFloat();
  });
  return { features, labels, nRows, nFeatures, nClasses };
}

const set = makeSet();
const models: [string, TrainedModel][] = [
  ['random forest', trainModel(randomForest, set, { ...defaultRandomForestParams, trees: 17 }, 1).model],
  [
    'random-subspace forest',
    trainModel(randomSubspaceForest, set, { ...defaultRandomSubspaceForestParams, trees: 9 }, 1).model,
  ],
  ['nearest neighbours', trainModel(nearestNeighbours, set, { k: 7, standardise: true }, 1).model],
  ['Gaussian maximum likelihood', trainModel(gaussianMaximumLikelihood, set, { priors: 'equal', ridge: 0 }, 1).model],
  ['minimum distance', trainModel(minimumDistance, set, { metric: 'mahalanobis' }, 1).model],
];

describe.each(models)('%s', (_, model) => {
  const classIndex = new Uint8Array(nRows);
  const share = new Float32Array(nRows);
  const margin = new Float32Array(nRows);
  const shares = new Float32Array(nRows * nClasses);
  model.predictBlock(set.features, nRows, classIndex, share, margin);
  model.predictShares(set.features, nRows, shares);

  it('gives shares that sum to 1, with the winner in front', () => {
    for (let i = 0; i < nRows; i++) {
      const row = shares.subarray(i * nClasses, (i + 1) * nClasses);
      expect(row.reduce((sum, value) => sum + value, 0)).toBeCloseTo(1, 5);
      expect(row[classIndex[i]!]).toBe(Math.max(...row));
      expect(row[classIndex[i]!]).toBeCloseTo(share[i]!, 6);
    }
  });

  it('gives the margin as the greatest share less the second', () => {
    let nUnsure = 0;
    for (let i = 0; i < nRows; i++) {
      const [first = 0, second = 0] = shares.slice(i * nClasses, (i + 1) * nClasses).sort((a, b) => b - a);
      expect(margin[i]).toBeCloseTo(first - second, 5);
      if (margin[i]! < 0.9) nUnsure++;
    }
    expect(nUnsure).toBeGreaterThan(0);
  });

  it('gives the same classes whether or not margins are wanted', () => {
    const alone = new Uint8Array(nRows);
    model.predictBlock(set.features, nRows, alone);
    expect(alone).toEqual(classIndex);
  });

  it('refuses arrays that are too short', () => {
    expect(() => model.predictBlock(set.features, nRows, classIndex, share, new Float32Array(3))).toThrow(RangeError);
    expect(() => model.predictShares(set.features, nRows, new Float32Array(3))).toThrow(RangeError);
  });
});

it('works out the margin of five neighbours by hand: three votes to two is 0.2', () => {
  const small: TrainingSet = {
    features: Float32Array.of(0, 1, 2, 3, 4, 100),
    labels: Uint8Array.of(0, 0, 1, 1, 0, 1),
    ...{ nRows: 6, nFeatures: 1, nClasses: 2 },
  };
  const { model } = trainModel(nearestNeighbours, small, { k: 5, standardise: false }, 1);
  const margin = new Float32Array(1);
  model.predictBlock(Float32Array.of(2), 1, new Uint8Array(1), undefined, margin);
  expect(margin[0]).toBeCloseTo(0.2, 6);
});
