/**
 * Times training and mapping of the classifiers on the Statlog Satellite data, one thread, fixed seeds:
 *   npx tsx tests/bench/classifiers.ts
 */
import {
  trainModel,
  type Classifier,
  type TrainedModel,
  type TrainingSet,
} from '../../server/analysis/classifiers/classifier.ts';
import { defaultRandomForestParams } from '../../server/analysis/classifiers/random-forest.ts';
import { defaultRandomSubspaceForestParams } from '../../server/analysis/classifiers/random-subspace-forest.ts';
import { getClassifier } from '../../server/analysis/classifiers/registry.ts';
import { allBands, centreBands, loadSatellite } from '../fixtures/satellite.ts';

function time<T>(work: () => T): { result: T; seconds: number } {
  const start = performance.now();
  const result = work();
  return { result, seconds: (performance.now() - start) / 1000 };
}

function measureAccuracy(model: TrainedModel, test: TrainingSet): number {
  const got = new Uint8Array(test.nRows);
  model.predictBlock(test.features, test.nRows, got);
  return got.filter((c, i) => c === test.labels[i]).length / test.nRows;
}

/** Pixels a second, the best of three passes over the test rows repeated to `nPixels`. */
function measureMapping(model: TrainedModel, test: TrainingSet, nPixels: number): number {
  const features = Float32Array.from(
    { length: nPixels * test.nFeatures },
    (_, i) => test.features[i % test.features.length],
  );
  const [classIndex, share] = [new Uint8Array(nPixels), new Float32Array(nPixels)];
  const passes = [0, 1, 2].map(() => time(() => model.predictBlock(features, nPixels, classIndex, share)).seconds);
  return nPixels / Math.min(...passes);
}

function report<P>(
  name: string,
  classifier: Classifier<P>,
  params: P,
  bands: readonly number[],
  nPixels: number,
): number {
  const { train, test } = loadSatellite(bands);
  const { result, seconds } = time(() => trainModel(classifier, train, params, 1).model);
  const perPart = (seconds / classifier.partCount(params)) * 1000;
  const rate = Math.round(measureMapping(result, test, nPixels));
  const accuracy = measureAccuracy(result, test);
  console.log(
    `${name}, ${bands.length} bands: ${perPart.toFixed(1)} ms a part, ${rate} pixels/s, test accuracy ${accuracy.toFixed(4)}`,
  );
  return perPart;
}

const forest = getClassifier('random-forest');
const subspace = getClassifier('random-subspace-forest');
const neighbours = getClassifier('nearest-neighbours');

console.log(`node ${process.version}, 4435 training rows`);
const own = report('random-forest, 100 trees', forest, defaultRandomForestParams, centreBands, 200_000);
report('random-forest, 100 trees', forest, defaultRandomForestParams, allBands, 200_000);
const capped = { ...defaultRandomSubspaceForestParams, trees: 10 };
report('random-subspace-forest, 10 trees of 1000 rows', subspace, capped, centreBands, 200_000);
const whole = { ...capped, trees: 2, rowsPerTree: null };
const library = report('random-subspace-forest, 2 trees of all rows', subspace, whole, centreBands, 200_000);
report('nearest-neighbours, k 5', neighbours, { k: 5, standardise: true }, centreBands, 4000);
report('nearest-neighbours, k 5', neighbours, { k: 5, standardise: true }, allBands, 1000);
console.log(`one tree by ml-random-forest takes ${(library / own).toFixed(0)} times as long as one of random-forest`);
