import { beforeAll, describe, expect, it } from 'vitest';
import { trainModel, type TrainedModel, type TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { atMostThreshold } from '../../server/analysis/classifiers/float32-threshold.ts';
import {
  defaultRandomForestParams,
  randomForest,
  readRandomForestPart,
} from '../../server/analysis/classifiers/random-forest.ts';
import { allBands, centreBands, loadSatellite } from '../fixtures/satellite.ts';

/** Statlog Satellite, standard split. Figures recomputed with scikit-learn and R randomForest of Debian 12. */
const { train, test } = loadSatellite();

function countCorrect(model: TrainedModel, set: TrainingSet): number {
  const got = new Uint8Array(set.nRows);
  model.predictBlock(set.features, set.nRows, got);
  return got.reduce((sum, c, i) => sum + (c === set.labels[i] ? 1 : 0), 0);
}

/** Class counts of the training rows that reach each node of a tree. */
function countNodes(bytes: Uint8Array, set: TrainingSet): number[][] {
  const { feature, threshold, left } = readRandomForestPart(bytes).tree;
  const counts = Array.from(feature, () => new Array<number>(set.nClasses).fill(0));
  for (let row = 0; row < set.nRows; row++) {
    for (let node = 0; ;) {
      counts[node][set.labels[row]]++;
      if (feature[node] < 0) break;
      node = left[node] + (set.features[row * set.nFeatures + feature[node]] < threshold[node] ? 0 : 1);
    }
  }
  return counts;
}

function gini(counts: number[]): number {
  const n = counts.reduce((a, b) => a + b, 0);
  return 1 - counts.reduce((sum, count) => sum + (count / n) ** 2, 0);
}

describe('the data set', () => {
  it('has the class counts of the standard split', () => {
    const count = (set: TrainingSet) => set.labels.reduce((sum, c) => ((sum[c] += 1), sum), [0, 0, 0, 0, 0, 0]);
    expect(count(train)).toEqual([1072, 479, 961, 415, 470, 1038]);
    expect(count(test)).toEqual([461, 224, 397, 211, 237, 470]);
  });
});

describe('one tree on all rows (unique best splits, found by brute force and by scikit-learn)', () => {
  const wholeTree = { ...defaultRandomForestParams, trees: 1, bootstrap: false, minLeaf: 1 };

  it.each([
    ['all 36 bands', allBands],
    ['the centre pixel', centreBands],
  ])('splits the root at x.17 ≤ 79.5 given %s', (_, bands) => {
    const { train: set, test: check } = loadSatellite(bands);
    const params = { ...wholeTree, featuresPerSplit: bands.length, maxDepth: 1 };
    const { model, parts } = trainModel(randomForest, set, params, 1);
    const { tree, impurityDecrease } = readRandomForestPart(parts[0]);
    expect(bands[tree.feature[0]]).toBe(17);
    expect(tree.threshold[0]).toBe(atMostThreshold(79.5));
    const [root, low, high] = countNodes(parts[0], set);
    expect(root).toEqual([1072, 479, 961, 415, 470, 1038]);
    expect(low).toEqual([1052, 479, 61, 276, 469, 991]);
    expect(high).toEqual([20, 0, 900, 139, 1, 47]);
    expect(gini(root)).toBeCloseTo(0.8081919852, 10);
    expect(impurityDecrease[tree.feature[0]]).toBeCloseTo(0.1550245473, 10);
    expect(countCorrect(model, check)).toBe(825);
  });

  it('splits its children at x.20 ≤ 73.5 and x.18 ≤ 96.5', () => {
    const { train: set, test: check } = loadSatellite(centreBands);
    const params = { ...wholeTree, featuresPerSplit: 4, maxDepth: 2 };
    const { model, parts } = trainModel(randomForest, set, params, 1);
    const { tree } = readRandomForestPart(parts[0]);
    expect(Array.from(tree.feature.subarray(0, 3), (f) => centreBands[f])).toEqual([17, 20, 18]);
    expect([...tree.threshold.subarray(0, 3)]).toEqual([79.5, 73.5, 96.5].map(atMostThreshold));
    expect(countNodes(parts[0], set).slice(3)).toEqual([
      [48, 6, 6, 156, 288, 900],
      [1004, 473, 55, 120, 181, 91],
      [1, 0, 49, 63, 1, 34],
      [19, 0, 851, 76, 0, 13],
    ]);
    expect(countCorrect(model, check)).toBe(1217);
  });

  it('classifies every training row right when fully grown', () => {
    const { model } = trainModel(randomForest, train, { ...wholeTree, featuresPerSplit: 36 }, 1);
    expect(countCorrect(model, train)).toBe(4435);
    const accuracy = countCorrect(model, test) / 2000;
    // scikit-learn, 5 seeds: .8475–.858; the order of equal splits differs.
    expect(accuracy).toBeGreaterThan(0.84);
    expect(accuracy).toBeLessThan(0.866);
  });
});

describe('forests of 100 trees, 6 features a split (Breiman 2001)', () => {
  const accuracies: number[] = [];
  const outOfBag: number[] = [];
  const distinct: number[] = [];

  beforeAll(() => {
    for (let seed = 0; seed < 5; seed++) {
      const { model, parts } = trainModel(randomForest, train, defaultRandomForestParams, seed);
      accuracies.push(countCorrect(model, test) / test.nRows);
      const votes = randomForest.countOutOfBag(train, parts)!;
      expect(votes.nVoted).toBe(train.nRows);
      outOfBag.push(votes.accuracy!);
      for (const bytes of parts) {
        distinct.push(readRandomForestPart(bytes).outOfBag.filter((vote) => vote === 255).length / train.nRows);
      }
    }
  });

  it('have a mean test accuracy in .904–.916 (scikit-learn, 20 seeds: .9094; R, 10 seeds: .9100)', () => {
    const mean = accuracies.reduce((a, b) => a + b, 0) / accuracies.length;
    expect(mean).toBeGreaterThan(0.904);
    expect(mean).toBeLessThan(0.916);
    for (const accuracy of accuracies) expect(Math.abs(accuracy - 0.91)).toBeLessThan(0.0085);
  });

  it('estimate that accuracy from out-of-bag votes to within .01', () => {
    const mean = (values: number[]) => values.reduce((a, b) => a + b, 0) / values.length;
    expect(Math.abs(mean(outOfBag) - mean(accuracies))).toBeLessThan(0.01);
  });

  it('draw the share of distinct rows a bootstrap sample has, 1 − (1 − 1/n)ⁿ = .6321620', () => {
    const mean = distinct.reduce((a, b) => a + b, 0) / distinct.length;
    expect(Math.abs(mean - 0.6321620373)).toBeLessThan(0.001);
  });

  it('do as well as R on the centre pixel alone (R, mtry 2: .8250–.8340)', () => {
    const { train: set, test: check } = loadSatellite(centreBands);
    const accuracy = countCorrect(trainModel(randomForest, set, defaultRandomForestParams, 3).model, check) / 2000;
    expect(accuracy).toBeGreaterThan(0.818);
    expect(accuracy).toBeLessThan(0.841);
  });

  it('do as R with one feature a split (R, mtry 1: .8950–.9025)', () => {
    const params = { ...defaultRandomForestParams, featuresPerSplit: 1 };
    const accuracy = countCorrect(trainModel(randomForest, train, params, 3).model, test) / 2000;
    expect(accuracy).toBeGreaterThan(0.888);
    expect(accuracy).toBeLessThan(0.91);
  });
});
