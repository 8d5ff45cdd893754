import { describe, expect, it } from 'vitest';
import { trainModel, type Classifier, type TrainingSet } from '../../../server/analysis/classifiers/classifier.ts';
import { factorCovariance } from '../../../server/analysis/classifiers/covariance-factor.ts';
import { gaussianMaximumLikelihood } from '../../../server/analysis/classifiers/gaussian-maximum-likelihood.ts';
import { minimumDistance } from '../../../server/analysis/classifiers/minimum-distance.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { centreBands, loadSatellite } from '../../fixtures/satellite.ts';

function toSet(rows: number[][], labels: number[], classNames?: string[]): TrainingSet {
  return {
    features: Float32Array.from(rows.flat()),
    labels: Uint8Array.from(labels),
    nRows: rows.length,
    nFeatures: rows[0].length,
    nClasses: Math.max(...labels) + 1,
    ...(classNames ? { classNames } : {}),
  };
}

function classify<P>(classifier: Classifier<P>, params: P, set: TrainingSet, pixels: Float32Array) {
  const n = pixels.length / set.nFeatures;
  const [classIndex, share] = [new Uint8Array(n), new Float32Array(n)];
  trainModel(classifier, set, params, 1).model.predictBlock(pixels, n, classIndex, share);
  return { classIndex: [...classIndex], share: [...share] };
}

const exact = { priors: 'equal', ridge: 0 } as const;
const { train, test } = loadSatellite(centreBands);
const pixels = test.features.subarray(0, 4 * 500);

describe('the factor of a covariance', () => {
  it('gives Mahalanobis distance and determinant of a matrix worked by hand', () => {
    // [[4, 2], [2, 3]]: determinant 8, inverse [[3, −2], [−2, 4]] / 8; for (1, 2) the distance is (3 − 8 + 16) / 8.
    const { whitener, logDeterminant } = factorCovariance(Float64Array.of(4, 2, 2, 3), 2)!;
    const [a, b] = [whitener[0], whitener[1] + 2 * whitener[2]];
    expect(a * a + b * b).toBeCloseTo(11 / 8, 12);
    expect(logDeterminant).toBeCloseTo(Math.log(8), 12);
  });

  it('is none of a singular matrix, whatever its units', () => {
    expect(factorCovariance(Float64Array.of(1, 2, 2, 4), 2)).toBeNull();
    expect(factorCovariance(Float64Array.of(1e-12, 2e-6, 2e-6, 4), 2)).toBeNull();
    expect(factorCovariance(Float64Array.of(1, 0, 0, 0), 2)).toBeNull();
    expect(factorCovariance(Float64Array.of(1e-12, 1e-6, 1e-6, 4), 2)).not.toBeNull();
  });
});

describe('Gaussian maximum likelihood', () => {
  it('puts the boundary of two classes of unlike spread where their densities meet', () => {
    // Means 0 and 10, variances 1 and 4 (divisor n − 1): ½x² = ½(x − 10)²/4 + ln 2, that is 3x² + 20x = 105.545: x = 3.4705, −10.1372.
    const set = toSet([[-1], [0], [1], [8], [10], [12]], [0, 0, 0, 1, 1, 1]);
    const { classIndex } = classify(gaussianMaximumLikelihood, exact, set, Float32Array.of(-10.14, -10.13, 3.47, 3.48));
    expect(classIndex).toEqual([1, 0, 0, 1]);
  });

  it('moves the boundary by ln of the priors', () => {
    // Equal spread 1, means 0 and 10; priors 2 : 1 move the middle, 5, by ln 2 / 10.
    const set = toSet([[-1], [0], [1], [-1], [0], [1], [9], [10], [11]], [0, 0, 0, 0, 0, 0, 1, 1, 1]);
    const shift = (x: number) => classify(minimumDistance, { metric: 'euclidean' }, set, Float32Array.of(x)).classIndex;
    expect([shift(4.99), shift(5.01)]).toEqual([[0], [1]]);
    // Variances 4/5 and 1, priors 2/3 and 1/3.
    const score = (x: number) => [Math.log(2 / 3) - Math.log(0.8) / 2 - x ** 2 / 1.6, Math.log(1 / 3) - (x - 10) ** 2 / 2]; // prettier-ignore
    for (const x of [4.6, 4.7, 4.75, 4.8, 4.9]) {
      const [one, two] = score(x);
      const got = classify(gaussianMaximumLikelihood, { priors: 'training', ridge: 0 }, set, Float32Array.of(x));
      expect(got.classIndex).toEqual([one > two ? 0 : 1]);
      expect(got.share[0]).toBeCloseTo(1 / (1 + Math.exp(-Math.abs(one - two))), 5);
    }
  });

  it.each([
    ['gaussian-maximum-likelihood', gaussianMaximumLikelihood as Classifier<unknown>, exact],
    ['minimum-distance', minimumDistance as Classifier<unknown>, { metric: 'mahalanobis' }],
  ])('%s does not change when features are scaled, shifted and mixed', (_, classifier, params) => {
    const mix = (x: Float32Array) =>
      x.map((__, i) => {
        const at = i - (i % 4);
        const [a, b, c, d] = x.subarray(at, at + 4);
        return [a * 4 + 7, b * 2 - c, c * 0.5 + a, d * 8 - 100][i % 4];
      });
    const plain = classify(classifier, params, train, pixels);
    const mixed = classify(classifier, params, { ...train, features: mix(train.features) }, mix(pixels));
    expect(mixed.classIndex).toEqual(plain.classIndex);
    mixed.share.forEach((value, i) => expect(value).toBeCloseTo(plain.share[i], 4));
  });

  it('does not depend on the order of the rows', () => {
    const order = createRng(3).shuffle(Array.from({ length: train.nRows }, (_, i) => i));
    const shuffled: TrainingSet = {
      ...train,
      features: Float32Array.from(order.flatMap((row) => [...train.features.subarray(row * 4, row * 4 + 4)])),
      labels: Uint8Array.from(order, (row) => train.labels[row]),
    };
    expect(classify(gaussianMaximumLikelihood, exact, shuffled, pixels).classIndex).toEqual(
      classify(gaussianMaximumLikelihood, exact, train, pixels).classIndex,
    );
  });

  it('names the class whose covariance is singular, and says what to do', () => {
    const names = ['Open water', 'Heath & moor'];
    const few = toSet([[1, 2], [2, 1], [3, 5], [9, 9], [8, 7]], [0, 0, 0, 1, 1], names); // prettier-ignore
    const trainOn = (set: TrainingSet, ridge = 0) => () => trainModel(gaussianMaximumLikelihood, set, { priors: 'equal', ridge }, 1); // prettier-ignore
    expect(trainOn(few)).toThrow(
      'Class “Heath & moor” has a singular covariance: found 2 training pixels, wanted at least 3 for 2 bands. Add training pixels that differ, leave bands out, or set a ridge.',
    );
    const flat = toSet([[1, 2], [2, 1], [3, 5], [9, 9], [8, 9], [7, 9]], [0, 0, 0, 1, 1, 1], names); // prettier-ignore
    expect(trainOn(flat)).toThrow(/“Heath & moor”.*a band has one value throughout/);
    const repeated = toSet([[1, 2], [2, 1], [3, 5], [9, 18], [8, 16], [7, 14]], [0, 0, 0, 1, 1, 1]); // prettier-ignore
    expect(trainOn(repeated)).toThrow(/^Class 1 has a singular covariance/);
    for (const set of [few, flat, repeated]) expect(trainOn(set, 0.1)).not.toThrow();
    expect(trainOn(toSet([[1, 4], [2, 4], [3, 4], [9, 4], [8, 4], [7, 4]], [0, 0, 0, 1, 1, 1], names), 0.1)).toThrow(/“Open water”.*or leave bands out/); // prettier-ignore
    expect(trainOn({ ...few, nClasses: 3 })).toThrow(/Class 2 has no training pixels/);
    expect(trainOn(few, 2)).toThrow(/ridge must lie in 0..1, got 2/);
  });

  it('adds the ridge as a share of the pooled variance', () => {
    // Variances 1 and 4, pooled 2.5; a ridge of 1 makes them 3.5 and 6.5.
    const set = toSet([[-1], [0], [1], [8], [10], [12]], [0, 0, 0, 1, 1, 1]);
    const { share } = classify(gaussianMaximumLikelihood, { priors: 'equal', ridge: 1 }, set, Float32Array.of(2));
    const density = (x: number, m: number, v: number) => Math.exp(-((x - m) ** 2) / (2 * v)) / Math.sqrt(v);
    expect(share[0]).toBeCloseTo(density(2, 0, 3.5) / (density(2, 0, 3.5) + density(2, 10, 6.5)), 6);
  });
});

describe('minimum distance', () => {
  it('gives a tie to the lowest class and halves the share', () => {
    const set = toSet([[0], [2], [8], [10]], [1, 1, 0, 0]);
    for (const metric of ['euclidean', 'mahalanobis'] as const) {
      const { classIndex, share } = classify(minimumDistance, { metric }, set, Float32Array.of(5, 4.9, 5.1));
      expect(classIndex).toEqual([0, 1, 0]);
      expect(share[0]).toBeCloseTo(0.5, 6);
      // Pooled variance 2: the squared distances differ by 0.8, the scores by 0.8 / 4.
      expect(share[1]).toBeCloseTo(1 / (1 + Math.exp(-1.6 / 4)), 5);
    }
  });

  it('is sure of the nearest mean where no class has any spread', () => {
    const set = toSet([[1, 1], [5, 5]], [0, 1]); // prettier-ignore
    const { classIndex, share } = classify(minimumDistance, { metric: 'euclidean' }, set, Float32Array.of(2, 2, 3, 3));
    expect(classIndex).toEqual([0, 0]);
    expect(share).toEqual([1, 0.5]);
    expect(() => trainModel(minimumDistance, set, { metric: 'mahalanobis' }, 1)).toThrow(
      /pooled over all classes is singular: found 2 training pixels, wanted at least 4.*Euclidean/,
    );
  });
});
