/**
 * Measures what the steps of a run cost one thread, for the shares of its progress bar (server/services/run-shares.ts).
 * Run: npx tsx tests/bench/run-shares.ts
 */
import { createRng } from '../../server/analysis/sampling/rng.ts';
import type { TrainingSet } from '../../server/analysis/classifiers/classifier.ts';
import { prepareClassifier } from '../../server/jobs/compute/classifier-of-recipe.ts';
import type { ClassifierRecipe } from '../../shared/contracts/run.ts';

const N_CLASSES = 10;
const N_FEATURES = 7;
const N_PIXELS = 100_000;

/** Overlapping clouds, one a class. */
function makePixels(n: number, seed: number): TrainingSet {
  const rng = createRng(seed);
  const features = new Float32Array(n * N_FEATURES);
  const labels = new Uint8Array(n);
  for (let i = 0; i < n; i++) {
    labels[i] = i % N_CLASSES;
    for (let f = 0; f < N_FEATURES; f++) {
      const centre = 2000 + ((labels[i]! * (f + 3) * 37) % 10) * 400;
      features[i * N_FEATURES + f] = Math.round(centre + (rng.nextFloat() + rng.nextFloat() - 1) * 1500);
    }
  }
  return { features, labels, nRows: n, nFeatures: N_FEATURES, nClasses: N_CLASSES };
}

function measure(recipe: ClassifierRecipe, nRows: number): { training: number; mapping: number } {
  const set = makePixels(nRows, 1);
  const classifier = prepareClassifier(recipe, N_FEATURES);
  let start = performance.now();
  const parts = Array.from({ length: classifier.nParts }, (_, part) => classifier.trainPart(set, 1, part));
  const training = (performance.now() - start) / 1000;
  const model = classifier.assemble(set, parts);
  const pixels = makePixels(N_PIXELS, 2);
  start = performance.now();
  model.predictBlock(pixels.features, N_PIXELS, new Uint8Array(N_PIXELS));
  return { training, mapping: (performance.now() - start) / 1000 };
}

const trees = 20;
const forestFields = { trees, maxDepth: 25, minLeaf: 1, featuresPerTree: null };
for (const nRows of [1000, 4000, 10_000]) {
  const levels = Math.log2(nRows);
  const forest = measure({ kind: 'random-forest', ...forestFields, classWeights: 'none' }, nRows);
  const perTreeRowLevel = forest.training / (trees * nRows * levels * Math.sqrt(N_FEATURES));
  const perPixelTreeLevel = forest.mapping / (N_PIXELS * trees * levels);
  const subspace = measure({ kind: 'random-subspace-forest', ...forestFields }, nRows);
  const neighbours = measure({ kind: 'nearest-neighbours', neighbours: 5, standardise: true }, nRows);
  const gaussian = measure({ kind: 'gaussian-maximum-likelihood', priors: 'equal', ridge: 0 }, nRows);
  const perPixelClassFeature = gaussian.mapping / (N_PIXELS * N_CLASSES * N_FEATURES);
  console.log(
    `${nRows} rows: treeRowLevel ${perTreeRowLevel.toExponential(2)}, pixelTreeLevel ${perPixelTreeLevel.toExponential(2)}, ` +
      `subspaceTree ${(subspace.training / trees).toFixed(3)}, neighbourPixel ${(neighbours.mapping / N_PIXELS).toExponential(2)}, ` +
      `gaussianPixelClassFeature ${perPixelClassFeature.toExponential(2)}`,
  );
}
