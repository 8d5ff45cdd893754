import { RandomForestClassifier } from 'ml-random-forest';
import { describe, expect, it } from 'vitest';
import { trainModel, type TrainingSet } from '../../../server/analysis/classifiers/classifier.ts';
import { FlatForest } from '../../../server/analysis/classifiers/flat-forest.ts';
import { flattenCartTree, type CartNode } from '../../../server/analysis/classifiers/flatten-cart-tree.ts';
import {
  atMostThreshold,
  lessThanThreshold,
  nextFloat32,
} from '../../../server/analysis/classifiers/float32-threshold.ts';
import { defaultRandomForestParams, randomForest } from '../../../server/analysis/classifiers/random-forest.ts';
import { createThresholdRanks } from '../../../server/analysis/classifiers/threshold-ranks.ts';
import { classifyRow, type FlatTree, type TreePart } from '../../../server/analysis/classifiers/tree-part.ts';
import { createRng } from '../../../server/analysis/sampling/rng.ts';
import { centreBands, loadSatellite, takeEvery } from '../../fixtures/satellite.ts';

/** Trains with the library as it is and flattens its trees. */
function trainBoth(
  set: TrainingSet,
  nTrees: number,
  seed: number,
): { library: RandomForestClassifier; flat: FlatForest } {
  const { features, labels, nRows, nFeatures } = set;
  const rows = Array.from({ length: nRows }, (_, i) => [...features.subarray(i * nFeatures, (i + 1) * nFeatures)]);
  const library = new RandomForestClassifier({ seed, nEstimators: nTrees, maxFeatures: Math.min(3, nFeatures), replacement: true, noOOB: true }); // prettier-ignore
  library.train(rows, [...labels]);
  const { baseModel } = JSON.parse(JSON.stringify(library)) as {
    baseModel: { indexes: number[][]; estimators: { root: CartNode }[] };
  };
  const parts = baseModel.estimators.map(({ root }, part): TreePart => ({
    part,
    tree: flattenCartTree(root, baseModel.indexes[part]),
    impurityDecrease: new Float64Array(nFeatures),
    outOfBag: new Uint8Array(0),
  }));
  return { library, flat: FlatForest.fromTrees('test', set, parts) };
}

function expectSameClasses(library: RandomForestClassifier, flat: FlatForest, features: Float32Array): Set<number> {
  const { nFeatures } = flat;
  const n = features.length / nFeatures;
  const got = new Uint8Array(n);
  flat.predictBlock(features, n, got);
  const wanted = library.predict(
    Array.from({ length: n }, (_, i) => [...features.subarray(i * nFeatures, (i + 1) * nFeatures)]),
  );
  expect([...got]).toEqual(wanted);
  return new Set(got);
}

describe('a flattened forest decides exactly as ml-random-forest', () => {
  it('on every test pixel of the satellite data, with few trees and so many ties', () => {
    const { train, test } = loadSatellite(centreBands);
    for (const nTrees of [1, 2, 4, 7]) {
      const { library, flat } = trainBoth(takeEvery(train, 12), nTrees, 5 + nTrees);
      expect(expectSameClasses(library, flat, test.features).size).toBe(6);
    }
  });

  it.each(['uint8', 'uint16', 'float32'] as const)('on random %s values, thresholds among them', (type) => {
    const rng = createRng(type.length);
    const draw = () =>
      type === 'uint8'
        ? rng.nextBelow(12)
        : type === 'uint16'
          ? rng.nextBelow(65536)
          : Math.fround(rng.nextFloat() * 2 - 1);
    const set: TrainingSet = {
      features: Float32Array.from({ length: 250 * 4 }, draw),
      labels: Uint8Array.from({ length: 250 }, () => rng.nextBelow(5)),
      nRows: 250,
      nFeatures: 4,
      nClasses: 5,
    };
    const { library, flat } = trainBoth(set, 6, 3);
    // Training values, values midway between them (where the thresholds lie) and their neighbours among the floats.
    const values = [...set.features];
    const midway = values.map((value, i) => Math.fround((value + values[(i * 7 + 13) % values.length]) / 2));
    const pixels = Float32Array.from([...values, ...midway, ...midway.map((value) => nextFloat32(value))]);
    expect(expectSameClasses(library, flat, pixels).size).toBe(5);
  });
});

describe('float thresholds', () => {
  it('decide as the double threshold does for the floats around it', () => {
    const rng = createRng(9);
    for (let round = 0; round < 2000; round++) {
      const scale = 10 ** (rng.nextBelow(12) - 6);
      const threshold = round % 10 === 0 ? rng.nextBelow(256) / 2 : (rng.nextFloat() - 0.5) * scale;
      const near = Math.fround(threshold);
      const below = -nextFloat32(-near);
      for (const x of [below, -nextFloat32(-below), near, nextFloat32(near), nextFloat32(nextFloat32(near)), 0, -0]) {
        expect(x < lessThanThreshold(threshold)).toBe(x < threshold);
        expect(x < atMostThreshold(threshold)).toBe(x <= threshold);
      }
    }
  });

  it('rank every value as counting does, also infinities, NaN and crowded thresholds', () => {
    const rng = createRng(2);
    const crowded = Float32Array.from([-1e30, ...Array.from({ length: 500 }, () => rng.nextFloat()), 3e38]).sort();
    for (const thresholds of [crowded, Float32Array.of(5), Float32Array.of(), Float32Array.of(1, 2, 4, 8)]) {
      const values = Float32Array.from([
        ...thresholds,
        ...Array.from(thresholds, nextFloat32),
        ...Array.from({ length: 200 }, () => (rng.nextFloat() - 0.3) * 4),
        Infinity,
        -Infinity,
        0,
        NaN,
      ]);
      const ranks = new Int32Array(values.length);
      createThresholdRanks([thresholds]).rankRows(values, 0, values.length, ranks);
      values.forEach((x, i) => expect(ranks[i]).toBe(thresholds.filter((t) => !(x < t)).length));
    }
  });
});

describe('the block walk', () => {
  function randomTree(rng: ReturnType<typeof createRng>, nFeatures: number, nClasses: number): FlatTree {
    const [feature, threshold, left, leafClass]: number[][] = [[], [], [], []];
    let nNodes = 1;
    for (let i = 0; i < nNodes; i++) {
      const isLeaf = nNodes > 60 || (i > 0 && rng.nextBelow(4) === 0);
      feature.push(isLeaf ? -1 : rng.nextBelow(nFeatures));
      threshold.push(isLeaf ? 0 : rng.nextBelow(50) - 25);
      left.push(isLeaf ? i : nNodes);
      leafClass.push(isLeaf ? rng.nextBelow(nClasses) : 0);
      if (!isLeaf) nNodes += 2;
    }
    return {
      feature: Int16Array.from(feature),
      threshold: Float32Array.from(threshold),
      left: Int32Array.from(left),
      leafClass: Uint8Array.from(leafClass),
    };
  }

  it('equals walking each tree row by row, for any number of rows, with the shares of the votes', () => {
    const rng = createRng(8);
    const [nFeatures, nClasses] = [5, 7];
    const trees = Array.from({ length: 9 }, (_, part): TreePart => ({
      part,
      tree: randomTree(rng, nFeatures, nClasses),
      impurityDecrease: new Float64Array(nFeatures),
      outOfBag: new Uint8Array(0),
    }));
    const forest = FlatForest.fromTrees('test', { nFeatures, nClasses }, trees);
    for (const n of [1, 2, 3, 4, 5, 63, 2047, 2048, 2049, 5000]) {
      const features = Float32Array.from({ length: n * nFeatures }, () => rng.nextBelow(60) - 30);
      if (n > 4) features[7] = NaN;
      const [classIndex, share] = [new Uint8Array(n), new Float32Array(n)];
      forest.predictBlock(features, n, classIndex, share);
      for (let row = 0; row < n; row++) {
        const counts = new Array<number>(nClasses).fill(0);
        let [winner, most] = [0, 0];
        for (const { tree } of trees) {
          const vote = classifyRow(tree, features, nFeatures, row);
          if (++counts[vote] > most) [winner, most] = [vote, counts[vote]];
        }
        if (classIndex[row] !== winner || Math.abs(share[row] - most / 9) > 1e-6) {
          expect.fail(`Row ${row} of ${n}: got ${classIndex[row]} (${share[row]}), wanted ${winner} (${most / 9}).`);
        }
      }
    }
  });

  it('leaves what lies beyond n untouched and refuses arrays that are too short', () => {
    const forest = FlatForest.fromTrees('test', { nFeatures: 1, nClasses: 3 }, [
      { part: 0, tree: { feature: Int16Array.of(0, -1, -1), threshold: Float32Array.of(5, 0, 0), left: Int32Array.of(1, 1, 2), leafClass: Uint8Array.of(0, 1, 2) }, impurityDecrease: Float64Array.of(1), outOfBag: new Uint8Array(0) },
    ]); // prettier-ignore
    const classIndex = new Uint8Array(6).fill(9);
    forest.predictBlock(Float32Array.of(4, 5, 6, 0, 0, 0), 3, classIndex);
    expect([...classIndex]).toEqual([1, 2, 2, 9, 9, 9]);
    expect(() => forest.predictBlock(Float32Array.of(1), 2, classIndex)).toThrow(RangeError);
    expect(() => forest.predictBlock(Float32Array.of(1, 2), 2, classIndex, new Float32Array(1))).toThrow(/shares/);
  });
});

describe('asking no more trees than are needed', () => {
  it.each([1, 2, 3, 8, 17, 40, 101])('gives the classes of all the votes, with %d trees', (nTrees) => {
    const rng = createRng(nTrees);
    // Labels with little to go by, so that votes are close and ties many; sizes that fill no group of eight.
    const set: TrainingSet = {
      features: Float32Array.from({ length: 200 * 3 }, () => rng.nextBelow(9)),
      labels: Uint8Array.from({ length: 200 }, () => rng.nextBelow(4)),
      nRows: 200,
      nFeatures: 3,
      nClasses: 4,
    };
    const { model } = trainModel(randomForest, set, { ...defaultRandomForestParams, trees: nTrees }, 2);
    const n = 4609;
    const pixels = Float32Array.from({ length: n * 3 }, () => rng.nextBelow(11) - 1);
    const [wanted, got] = [new Uint8Array(n), new Uint8Array(n)];
    const share = new Float32Array(n);
    model.predictBlock(pixels, n, wanted, share);
    model.predictBlock(pixels, n, got);
    expect(got).toEqual(wanted);
    if (nTrees > 8) expect(share.filter((value) => value < 0.5).length).toBeGreaterThan(500);
  });
});
