import { describe, expect, it } from 'vitest';
import { trainModel, type Classifier, type TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { gaussianMaximumLikelihood } from '../../server/analysis/classifiers/gaussian-maximum-likelihood.ts';
import { minimumDistance } from '../../server/analysis/classifiers/minimum-distance.ts';
import { allBands, centreBands, loadSatellite } from '../fixtures/satellite.ts';

/** Statlog Satellite, standard split. Figures from scikit-learn 1.2.1 of Debian 12; the first two also from R's MASS. */
function countRight<P>(classifier: Classifier<P>, params: P, bands: readonly number[]) {
  const { train, test } = loadSatellite(bands);
  const { model } = trainModel(classifier, train, params, 0);
  const [onTest, onTrain] = [test, train].map((set: TrainingSet) => {
    const got = new Uint8Array(set.nRows);
    model.predictBlock(set.features, set.nRows, got);
    return got.reduce((sum, c, i) => sum + (c === set.labels[i] ? 1 : 0), 0);
  });
  const share = new Float32Array(5);
  model.predictBlock(test.features, 5, new Uint8Array(5), share);
  return { onTest, onTrain, share: [...share] };
}

function expectShares(got: number[], wanted: number[]): void {
  wanted.forEach((value, i) => expect(got[i]).toBeCloseTo(value, 5));
}

describe('Gaussian maximum likelihood on the Statlog Satellite data', () => {
  it('has 1714 of 2000 right with equal priors, and the posterior chances of QuadraticDiscriminantAnalysis', () => {
    const { onTest, onTrain, share } = countRight(gaussianMaximumLikelihood, { priors: 'equal', ridge: 0 }, allBands);
    expect([onTest, onTrain]).toEqual([1714, 3978]);
    expectShares(share, [0.99500656, 0.99767498, 0.95066479, 0.4626043, 0.47258736]);
  });

  it('has 1696 right with the shares of the training rows as priors', () => {
    const { onTest, onTrain } = countRight(gaussianMaximumLikelihood, { priors: 'training', ridge: 0 }, allBands);
    expect([onTest, onTrain]).toEqual([1696, 3950]);
  });

  it('has 1690 and 1688 right on the centre pixel alone', () => {
    const on = (priors: 'equal' | 'training') =>
      countRight(gaussianMaximumLikelihood, { priors, ridge: 0 }, centreBands);
    expect([on('equal').onTest, on('training').onTest]).toEqual([1690, 1688]);
    expectShares(on('equal').share, [0.79434689, 0.9328593, 0.69305004, 0.69305004, 0.67004512]);
  });
});

describe('minimum distance on the Statlog Satellite data', () => {
  it('decides as LinearDiscriminantAnalysis with equal priors by the pooled covariance', () => {
    const all = countRight(minimumDistance, { metric: 'mahalanobis' }, allBands);
    expect([all.onTest, all.onTrain]).toEqual([1679, 3764]);
    expectShares(all.share, [0.68982146, 0.74043672, 0.74129508, 0.65896205, 0.73063439]);
    const centre = countRight(minimumDistance, { metric: 'mahalanobis' }, centreBands);
    expect([centre.onTest, centre.onTrain]).toEqual([1643, 3668]);
  });

  it('decides as NearestCentroid by the Euclidean distance', () => {
    const all = countRight(minimumDistance, { metric: 'euclidean' }, allBands);
    expect([all.onTest, all.onTrain]).toEqual([1550, 3449]);
    expect(countRight(minimumDistance, { metric: 'euclidean' }, centreBands).onTest).toBe(1537);
  });
});
