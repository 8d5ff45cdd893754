import KNN from 'ml-knn';
import { describe, expect, it } from 'vitest';
import {
  trainModel,
  type Classifier,
  type TrainedModel,
  type TrainingSet,
} from '../../../server/analysis/classifiers/classifier.ts';
import { defaultGaussianParams } from '../../../server/analysis/classifiers/gaussian-maximum-likelihood.ts';
import { defaultMinimumDistanceParams } from '../../../server/analysis/classifiers/minimum-distance.ts';
import { ModelBytesError, packArrays, unpackArrays } from '../../../server/analysis/classifiers/model-bytes.ts';
import { defaultNearestNeighboursParams } from '../../../server/analysis/classifiers/nearest-neighbours.ts';
import { NeighbourSearch } from '../../../server/analysis/classifiers/neighbour-search.ts';
import { layOutTree, orderPoints } from '../../../server/analysis/classifiers/neighbour-tree.ts';
import {
  defaultRandomForestParams,
  randomForest,
  readRandomForestPart,
} from '../../../server/analysis/classifiers/random-forest.ts';
import {
  defaultRandomSubspaceForestParams,
  randomSubspaceForest,
} from '../../../server/analysis/classifiers/random-subspace-forest.ts';
import {
  classifierKinds,
  getClassifier,
  isClassifierKind,
  loadModel,
} from '../../../server/analysis/classifiers/registry.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { centreBands, loadSatellite, takeEvery } from '../../fixtures/satellite.ts';

const { train, test } = loadSatellite(centreBands);
const small = takeEvery(train, 20);

const params = {
  'random-forest': { ...defaultRandomForestParams, trees: 12 },
  'random-subspace-forest': { ...defaultRandomSubspaceForestParams, trees: 12, featuresPerTree: 3 },
  'nearest-neighbours': defaultNearestNeighboursParams,
  'gaussian-maximum-likelihood': defaultGaussianParams,
  'minimum-distance': defaultMinimumDistanceParams,
};

/** Over the features only: with its own distance the library also counts the row number. */
function squaredDistance(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0;
  for (let f = 0; f < 4; f++) sum += (a[f] - b[f]) ** 2;
  return sum;
}

function classify(model: TrainedModel, set: TrainingSet): { classIndex: Uint8Array; share: Float32Array } {
  const [classIndex, share] = [new Uint8Array(set.nRows), new Float32Array(set.nRows)];
  model.predictBlock(set.features, set.nRows, classIndex, share);
  return { classIndex, share };
}

describe.each(classifierKinds)('the classifier %s', (kind) => {
  const classifier = getClassifier(kind) as Classifier<unknown>;
  const { model, parts } = trainModel(classifier, small, params[kind], 42);

  it('learns: most of the test pixels are right, and every class is mapped', () => {
    const { classIndex } = classify(model, test);
    const nRight = classIndex.filter((c, i) => c === test.labels[i]).length;
    expect(nRight / test.nRows).toBeGreaterThan(0.74);
    expect(new Set(classIndex).size).toBe(6);
    expect(model).toMatchObject({ kind, nFeatures: 4, nClasses: 6 });
  });

  it('gives the same bytes whatever order the parts are trained and joined in', () => {
    const order = createRng(1).shuffle(parts.map((_, part) => part));
    // A fresh copy of the set, as a worker thread gets it.
    const copy = structuredClone(small);
    const again = order.map((part) => classifier.trainPart(copy, params[kind], 42, part));
    expect(classifier.assemble(small, params[kind], again).serialise()).toEqual(model.serialise());
  });

  it('gives the same classes and shares after being stored and read', () => {
    const read = loadModel(model.serialise());
    expect(classify(read, test)).toEqual(classify(model, test));
    expect(read.serialise()).toEqual(model.serialise());
    expect(read.featureImportance).toEqual(model.featureImportance);
  });

  it('gives shares between 1 / classes and 1, and reports progress part by part', () => {
    const { share } = classify(model, test);
    expect(Math.min(...share)).toBeGreaterThanOrEqual(1 / 6 - 1e-6);
    expect(Math.max(...share)).toBeLessThanOrEqual(1);
    const seen: string[] = [];
    trainModel(classifier, small, params[kind], 1, ({ done, total }) => seen.push(`${done}/${total}`));
    expect(seen).toHaveLength(classifier.partCount(params[kind]));
    expect(seen.at(-1)).toBe(`${seen.length}/${seen.length}`);
  });

  it('refuses bytes that are cut short, changed, of another kind or no model at all', () => {
    const bytes = model.serialise();
    expect(() => classifier.load(bytes.subarray(0, bytes.length - 8))).toThrow(ModelBytesError);
    for (const at of [17, bytes.length >> 1, bytes.length - 30]) {
      const changed = bytes.slice();
      changed[at] ^= 1;
      expect(() => classifier.load(changed)).toThrow(/damaged/);
    }
    const other = getClassifier(kind === 'random-forest' ? 'nearest-neighbours' : 'random-forest');
    expect(() => other.load(bytes)).toThrow(/is wanted/);
    expect(() => classifier.load(new TextEncoder().encode('no model at all, only text'))).toThrow(/GMDL/);
    expect(() => classifier.load(new Uint8Array(3))).toThrow(/too few/);
    expect(() => classifier.assemble(small, params[kind], parts.slice(1))).toThrow(ModelBytesError);
    if (parts.length > 1) {
      expect(() => classifier.assemble(small, params[kind], [parts[0], ...parts.slice(0, -1)])).toThrow(/missing or there twice/); // prettier-ignore
    }
  });

  it('refuses training sets that make no sense', () => {
    const trainOn = (set: TrainingSet) => () => classifier.trainPart(set, params[kind], 1, 0);
    expect(trainOn({ ...small, nRows: 3 })).toThrow(/3 rows/);
    expect(trainOn({ ...small, nClasses: 4 })).toThrow(/of only 4/);
    expect(trainOn({ ...small, features: small.features.map((v, i) => (i === 9 ? NaN : v)) })).toThrow(/Row 2, feature 1/); // prettier-ignore
    expect(trainOn({ ...small, nFeatures: 300, features: new Float32Array(300 * small.nRows) })).toThrow(/256/);
  });

  it('manages a single class', () => {
    const one = { ...small, labels: new Uint8Array(small.nRows), nClasses: 1 };
    const { model: constant } = trainModel(classifier, one, params[kind], 1);
    const { classIndex, share } = classify(constant, test);
    expect(classIndex.every((c) => c === 0)).toBe(true);
    expect(share.every((s) => s === 1)).toBe(true);
  });
});

describe('forests', () => {
  it.each([
    ['random-forest', randomForest, params['random-forest']],
    ['random-subspace-forest', randomSubspaceForest, params['random-subspace-forest']],
  ] as const)('%s changes with the seed and estimates its accuracy out of bag', (_, classifier, p) => {
    const one = trainModel(classifier as Classifier<unknown>, small, p, 1);
    const two = trainModel(classifier as Classifier<unknown>, small, p, 2);
    expect(two.model.serialise()).not.toEqual(one.model.serialise());
    const votes = classifier.countOutOfBag(small, one.parts)!;
    expect(votes.nVoted).toBeGreaterThan(0.95 * small.nRows);
    expect(votes.accuracy).toBeGreaterThan(0.7);
    expect(votes.nCorrect).toBe(votes.classIndex.filter((c, i) => c === small.labels[i]).length);
  });

  it.each([
    ['random-forest', randomForest, params['random-forest']],
    ['random-subspace-forest', randomSubspaceForest, params['random-subspace-forest']],
  ] as const)('%s finds the feature that matters', (_, classifier, p) => {
    const rng = createRng(6);
    const labels = Uint8Array.from({ length: 300 }, () => rng.nextBelow(3));
    const features = Float32Array.from({ length: 900 }, (__, i) =>
      i % 3 === 1 ? labels[Math.floor(i / 3)] * 10 + rng.nextBelow(3) : rng.nextBelow(100),
    );
    const set = { features, labels, nRows: 300, nFeatures: 3, nClasses: 3 };
    const wide = { ...p, featuresPerTree: 3, featuresPerSplit: 3 };
    const { featureImportance } = trainModel(classifier as Classifier<unknown>, set, wide, 1).model;
    expect(featureImportance!.reduce((a, b) => a + b, 0)).toBeCloseTo(1, 9);
    expect(featureImportance![1]).toBeGreaterThan(0.9);
  });

  it('keep the least rows of a leaf and the depth', () => {
    const p = { ...defaultRandomForestParams, trees: 1, bootstrap: false, minLeaf: 7, maxDepth: 5 };
    const { tree } = readRandomForestPart(randomForest.trainPart(small, p, 3, 0));
    const reached = new Map<number, number>();
    for (let row = 0; row < small.nRows; row++) {
      let [node, depth] = [0, 0];
      while (tree.feature[node] >= 0) {
        node = tree.left[node] + (small.features[row * 4 + tree.feature[node]] < tree.threshold[node] ? 0 : 1);
        depth++;
      }
      expect(depth).toBeLessThanOrEqual(5);
      reached.set(node, (reached.get(node) ?? 0) + 1);
    }
    expect(Math.min(...reached.values())).toBeGreaterThanOrEqual(7);
    expect(reached.size).toBeGreaterThan(8);
    expect(randomForest.countOutOfBag(small, [randomForest.trainPart(small, p, 3, 0)])).toBeNull();
  });

  it('keep their trees when values are stretched without changing their order', () => {
    const p = { ...defaultRandomForestParams, trees: 3, featuresPerSplit: 4 };
    const stretched = { ...small, features: small.features.map((v) => v * v * 1000 + 0.25) };
    for (let part = 0; part < 3; part++) {
      const a = readRandomForestPart(randomForest.trainPart(small, p, 1, part)).tree;
      const b = readRandomForestPart(randomForest.trainPart(stretched, p, 1, part)).tree;
      expect(b.feature).toEqual(a.feature);
      expect(b.left).toEqual(a.left);
      expect(b.leafClass).toEqual(a.leafClass);
    }
  });

  it('find a rare class in the overlap once classes are balanced, and weigh rows as copies of them would', () => {
    const rng = createRng(21);
    const labels = Uint8Array.from({ length: 1100 }, (_, i) => (i < 1000 ? 0 : 1));
    const features = Float32Array.from(labels, (label) => (label ? 0.6 + 0.3 * rng.nextFloat() : rng.nextFloat()));
    const set = { features, labels, nRows: 1100, nFeatures: 1, nClasses: 2 };
    const p = { ...defaultRandomForestParams, trees: 25, minLeaf: 40 };
    // There ten rows of class 0 stand to three of class 1, and three to ten once balanced.
    const between = Float32Array.of(0.7, 0.75, 0.8);
    const mapped = (classWeights: 'none' | 'balanced') => {
      const got = new Uint8Array(3);
      trainModel(randomForest, set, { ...p, classWeights }, 4).model.predictBlock(between, 3, got);
      return [...got];
    };
    expect(mapped('none')).toEqual([0, 0, 0]);
    expect(mapped('balanced')).toEqual([1, 1, 1]);

    // Ten copies of each rare row are the same to a tree as a weight of ten, but for the least rows of a leaf.
    const rare = Array.from({ length: 100 }, (_, i) => 1000 + i);
    const rows = [...Array(1000).keys(), ...rare.flatMap((row) => Array<number>(10).fill(row))];
    const copied = { ...set, nRows: 2000, features: Float32Array.from(rows, (row) => features[row]), labels: Uint8Array.from(rows, (row) => labels[row]) }; // prettier-ignore
    const whole = { ...p, trees: 1, bootstrap: false, minLeaf: 1, maxDepth: 6 };
    const weighted = readRandomForestPart(randomForest.trainPart(set, { ...whole, classWeights: 'balanced' }, 1, 0));
    const repeated = readRandomForestPart(randomForest.trainPart(copied, whole, 1, 0));
    expect(weighted.tree).toEqual(repeated.tree);
    expect(weighted.impurityDecrease[0]).toBeCloseTo(repeated.impurityDecrease[0], 9);
  });

  it('refuse parameters out of range', () => {
    expect(() => randomForest.partCount({ ...defaultRandomForestParams, trees: 0 })).toThrow(/trees/);
    expect(() => randomForest.partCount({ ...defaultRandomForestParams, minLeaf: 0.5 })).toThrow(/leaf/);
    expect(() => randomSubspaceForest.partCount({ ...defaultRandomSubspaceForestParams, minGain: 2 })).toThrow(/gain/);
  });
});

describe('nearest neighbours', () => {
  it('find the rows and distances that the library finds, whatever was asked before', () => {
    const rng = createRng(77);
    const points = Float64Array.from({ length: 900 * 4 }, () => rng.nextFloat() * rng.nextBelow(50));
    const rows = Array.from({ length: 900 }, (_, i) => [...points.subarray(i * 4, i * 4 + 4)]);
    const { kdTree } = new KNN(rows, [...rows.keys()], { distance: squaredDistance });
    const search = new NeighbourSearch(layOutTree(points, orderPoints(points, 4), 4), 9);
    for (let i = 0; i < 400; i++) {
      const position = Float64Array.from({ length: 4 }, () => rng.nextFloat() * 60 - 5);
      search.find(position);
      const wanted = kdTree.nearest([...position], 9).sort(([, a], [, b]) => a - b);
      expect([...search.found]).toEqual(wanted.map(([stored]) => stored[4]));
    }
  });

  it('take a pixel with a missing value for equally far from all, and go on as before', () => {
    const { model } = trainModel(getClassifier('nearest-neighbours'), small, { k: 3, standardise: true }, 0);
    const pixels = test.features.slice(0, 12);
    const alone = new Uint8Array(3);
    model.predictBlock(pixels, 3, alone);
    pixels[5] = NaN;
    const got = new Uint8Array(3);
    model.predictBlock(pixels, 3, got);
    expect([got[0], got[2]]).toEqual([alone[0], alone[2]]);
    const votes = [...small.labels.subarray(0, 3)].map((c, _, all) => all.filter((other) => other === c).length);
    expect(votes[[...small.labels.subarray(0, 3)].indexOf(got[1])]).toBe(Math.max(...votes));
  });

  it('refuse an order of rows that names a row twice', () => {
    const { model } = trainModel(getClassifier('nearest-neighbours'), small, { k: 3, standardise: false }, 0);
    const bytes = model.serialise();
    const reader = unpackArrays(bytes, 'nearest-neighbours', 2);
    const [shape, features, labels, order] = [reader.next(Uint32Array), reader.next(Float32Array), reader.next(Uint8Array), reader.next(Int32Array)]; // prettier-ignore
    order[1] = order[0];
    const forged = packArrays('nearest-neighbours', 2, [shape, features, labels, order]);
    expect(() => loadModel(forged)).toThrow(/makes no sense/);
  });

  it('decide ties by row order and then by the lowest class', () => {
    const classifier = getClassifier('nearest-neighbours');
    // Five rows at the same place: with k = 3 the first three vote; with k = 4 classes 1 and 2 tie and 1 wins.
    const set = { features: new Float32Array(6).fill(1), labels: Uint8Array.of(2, 1, 2, 1, 1, 0), nRows: 6, nFeatures: 1, nClasses: 3 }; // prettier-ignore
    set.features[5] = 50;
    const winner = (k: number) => {
      const { model } = trainModel(classifier, set, { k, standardise: false }, 0);
      const [classIndex, share] = [new Uint8Array(1), new Float32Array(1)];
      model.predictBlock(Float32Array.of(1), 1, classIndex, share);
      return [classIndex[0], share[0]];
    };
    expect(winner(1)).toEqual([2, 1]);
    expect(winner(3)[0]).toBe(2);
    expect(winner(4)).toEqual([1, 0.5]);
    expect(winner(5)[0]).toBe(1);
    expect(() => winner(7)).toThrow(/7 neighbours/);
  });

  it('equal a search of every pair on random data full of ties', () => {
    const rng = createRng(12);
    const set: TrainingSet = {
      features: Float32Array.from({ length: 600 }, () => rng.nextBelow(6)),
      labels: Uint8Array.from({ length: 200 }, () => rng.nextBelow(4)),
      nRows: 200,
      nFeatures: 3,
      nClasses: 4,
    };
    const { model } = trainModel(getClassifier('nearest-neighbours'), set, { k: 7, standardise: false }, 0);
    const pixels = Float32Array.from({ length: 900 }, () => rng.nextBelow(6));
    const got = new Uint8Array(300);
    model.predictBlock(pixels, 300, got);
    for (let i = 0; i < 300; i++) {
      const nearest = Array.from({ length: 200 }, (_, row) => {
        let distance = 0;
        for (let f = 0; f < 3; f++) distance += (pixels[i * 3 + f] - set.features[row * 3 + f]) ** 2;
        return { row, distance };
      }).sort((a, b) => a.distance - b.distance || a.row - b.row);
      const votes = [0, 0, 0, 0];
      for (const { row } of nearest.slice(0, 7)) votes[set.labels[row]]++;
      expect(got[i]).toBe(votes.indexOf(Math.max(...votes)));
    }
  });
});

it('the registry knows its kinds and the default comes first', () => {
  expect(classifierKinds).toEqual([
    'random-forest',
    'random-subspace-forest',
    'nearest-neighbours',
    'gaussian-maximum-likelihood',
    'minimum-distance',
  ]);
  expect(isClassifierKind('toString')).toBe(false);
  expect(isClassifierKind('random-forest')).toBe(true);
});
