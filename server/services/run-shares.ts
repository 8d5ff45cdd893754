import type { ClassifierRecipe } from '../../shared/contracts/run.ts';

/** Where each stage of a run begins, as a share 0..1 of the whole. */
export interface RunShares {
  training: number;
  mapping: number;
  finishing: number;
}

/** Reading the training pixels, before it is known how many there are. */
export const READING_SHARE = 0.03;
const FINISHING_SHARE = 0.05;

/** Seconds of one thread for each step of work, from tests/bench/run-shares.ts; what matters is their order of magnitude. */
const SECONDS = {
  treeRowLevel: 3e-8,
  pixelTreeLevel: 2e-9,
  subspaceTree: 0.13,
  neighbourPixel: 1e-5,
  gaussianPixelClassFeature: 1e-8,
};

/** Shares out the time between training and mapping by what each is expected to take. */
export function planShares(
  classifier: ClassifierRecipe,
  nRows: number,
  nFeatures: number,
  nClasses: number,
  nPixels: number,
): RunShares {
  const { training, mapping } = estimateSeconds(classifier, Math.max(2, nRows), nFeatures, nClasses, nPixels);
  const split = training / (training + mapping);
  const between = 1 - READING_SHARE - FINISHING_SHARE;
  return {
    training: READING_SHARE,
    mapping: READING_SHARE + between * Math.min(0.98, Math.max(0.02, split)),
    finishing: 1 - FINISHING_SHARE,
  };
}

/** A task of training is meant to take about so long: enough to outweigh handing over, little to lose or wait for. */
const TASK_SECONDS = 0.1;

/** Puts the parts still to be trained into tasks; each thread gets several, so that none is left waiting at the end. */
export function planTrainingTasks(
  classifier: ClassifierRecipe,
  { nRows, nFeatures, nClasses }: { nRows: number; nFeatures: number; nClasses: number },
  nParts: number,
  missing: readonly number[],
  threads: number,
): number[][] {
  const { training } = estimateSeconds(classifier, Math.max(2, nRows), nFeatures, nClasses, 0);
  const fitting = Math.floor((TASK_SECONDS * nParts) / training);
  const size = Math.max(1, Math.min(fitting, Math.floor(missing.length / (4 * threads))));
  return Array.from({ length: Math.ceil(missing.length / size) }, (_, i) => missing.slice(i * size, (i + 1) * size));
}

function estimateSeconds(
  classifier: ClassifierRecipe,
  nRows: number,
  nFeatures: number,
  nClasses: number,
  nPixels: number,
): { training: number; mapping: number } {
  if (classifier.kind === 'nearest-neighbours') {
    return { training: 1e-3, mapping: nPixels * SECONDS.neighbourPixel };
  }
  if (classifier.kind === 'gaussian-maximum-likelihood' || classifier.kind === 'minimum-distance') {
    return { training: 1e-3, mapping: nPixels * nClasses * nFeatures * SECONDS.gaussianPixelClassFeature };
  }
  const levels = Math.min(classifier.maxDepth, Math.log2(nRows));
  const tried = classifier.featuresPerTree ?? Math.sqrt(nFeatures);
  return {
    training:
      classifier.trees *
      (classifier.kind === 'random-forest' ? nRows * levels * tried * SECONDS.treeRowLevel : SECONDS.subspaceTree),
    mapping: nPixels * classifier.trees * levels * SECONDS.pixelTreeLevel,
  };
}
