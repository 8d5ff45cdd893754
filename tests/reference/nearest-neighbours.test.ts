import { describe, expect, it } from 'vitest';
import { confusionMatrixFromPairs } from '../../server/analysis/accuracy/confusion-matrix.ts';
import { computeKappa } from '../../server/analysis/accuracy/kappa.ts';
import { trainModel, type TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { nearestNeighbours } from '../../server/analysis/classifiers/nearest-neighbours.ts';
import { knnSubset } from '../fixtures/check-values.ts';
import { loadSatellite } from '../fixtures/satellite.ts';

const small: TrainingSet = {
  features: Float32Array.from(knnSubset.train.flatMap((row) => row.slice(1, 5))),
  labels: Uint8Array.from(knnSubset.train, (row) => row[5] - 1),
  nRows: knnSubset.train.length,
  nFeatures: 4,
  nClasses: 6,
};

describe('nearest neighbours of the small exact check (no ties; worked by brute force)', () => {
  it.each([
    ['p1', 1],
    ['p3', 3],
    ['p5', 5],
  ] as const)('gives column %s with k = %d', (column, k) => {
    const { model } = trainModel(nearestNeighbours, small, { k, standardise: false }, 0);
    const n = knnSubset.test.length;
    const got = new Uint8Array(n);
    model.predictBlock(Float32Array.from(knnSubset.test.flatMap(({ x }) => x)), n, got);
    expect(Array.from(got, (c) => c + 1)).toEqual(knnSubset.test.map((row) => row[column]));
  });
});

describe('nearest neighbours on the Statlog Satellite data, standard split', () => {
  const { train, test } = loadSatellite();

  it('has 1807 of 2000 right with k = 5 under "row order, lowest class on a vote tie", and the known matrix', () => {
    const { model } = trainModel(nearestNeighbours, train, { k: 5, standardise: false }, 0);
    const got = new Uint8Array(test.nRows);
    model.predictBlock(test.features, test.nRows, got);
    const matrix = confusionMatrixFromPairs(got, test.labels, 6);
    expect([...matrix.counts]).toEqual(
      [[457, 0, 2, 0, 7, 0], [0, 217, 1, 0, 3, 0], [2, 0, 373, 28, 0, 12], [0, 0, 16, 143, 3, 34], [2, 5, 0, 2, 207, 14], [0, 2, 5, 38, 17, 410]].flat(),
    ); // prettier-ignore
    expect(got.filter((c, i) => c === test.labels[i])).toHaveLength(1807);
    expect(computeKappa(matrix)!.kappa).toBeCloseTo(0.881348, 6);
  });

  it('has 1809 right after scaling by the training mean and deviation (scikit-learn; tie rules may differ by a few)', () => {
    const { model } = trainModel(nearestNeighbours, train, { k: 5, standardise: true }, 0);
    const got = new Uint8Array(test.nRows);
    model.predictBlock(test.features, test.nRows, got);
    expect(Math.abs(got.filter((c, i) => c === test.labels[i]).length - 1809)).toBeLessThanOrEqual(2);
  });
});
