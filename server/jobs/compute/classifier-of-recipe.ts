import type { ClassifierRecipe } from '../../../shared/contracts/run.ts';
import type { TrainedModel, TrainingSet } from '../../analysis/classifiers/classifier.ts';
import { gaussianMaximumLikelihood } from '../../analysis/classifiers/gaussian-maximum-likelihood.ts';
import { minimumDistance } from '../../analysis/classifiers/minimum-distance.ts';
import { nearestNeighbours } from '../../analysis/classifiers/nearest-neighbours.ts';
import { randomForest } from '../../analysis/classifiers/random-forest.ts';
import {
  defaultRandomSubspaceForestParams,
  randomSubspaceForest,
} from '../../analysis/classifiers/random-subspace-forest.ts';

/** A classifier with the recipe's settings filled in. */
export interface SetClassifier {
  nParts: number;
  trainPart(set: TrainingSet, seed: number, part: number): Uint8Array;
  assemble(shape: { nFeatures: number; nClasses: number }, parts: readonly Uint8Array[]): TrainedModel;
}

/** Rows a tree of the random-subspace forest learns from; its training time grows with their square. */
export const subspaceRowsPerTree = defaultRandomSubspaceForestParams.rowsPerTree;

/** The square root of the number of bands, rounded down, as the recipe's form says where nothing is chosen. */
function chooseFeatures(wanted: number | null, nFeatures: number): number {
  return wanted ?? Math.max(1, Math.floor(Math.sqrt(nFeatures)));
}

/** Turns a recipe's classifier into one that can be trained. @throws RangeError when a setting makes no sense. */
export function prepareClassifier(recipe: ClassifierRecipe, nFeatures: number): SetClassifier {
  switch (recipe.kind) {
    case 'random-forest':
      return fill(randomForest, {
        trees: recipe.trees,
        featuresPerSplit: chooseFeatures(recipe.featuresPerTree, nFeatures),
        minLeaf: recipe.minLeaf,
        maxDepth: recipe.maxDepth,
        bootstrap: true,
        classWeights: recipe.classWeights,
      });
    case 'random-subspace-forest':
      return fill(randomSubspaceForest, {
        ...defaultRandomSubspaceForestParams,
        trees: recipe.trees,
        featuresPerTree: chooseFeatures(recipe.featuresPerTree, nFeatures),
        // The smallest node that can be split in two leaves of minLeaf rows has 2·minLeaf of them.
        stopAtRows: 2 * recipe.minLeaf - 1,
        maxDepth: recipe.maxDepth,
      });
    case 'nearest-neighbours':
      return fill(nearestNeighbours, { k: recipe.neighbours, standardise: recipe.standardise });
    case 'gaussian-maximum-likelihood':
      return fill(gaussianMaximumLikelihood, { priors: recipe.priors, ridge: recipe.ridge });
    case 'minimum-distance':
      return fill(minimumDistance, { metric: recipe.metric });
  }
}

interface Trainable<P> {
  partCount(params: P): number;
  trainPart(set: TrainingSet, params: P, seed: number, part: number): Uint8Array;
  assemble(shape: { nFeatures: number; nClasses: number }, params: P, parts: readonly Uint8Array[]): TrainedModel;
}

function fill<P>(classifier: Trainable<P>, params: P): SetClassifier {
  return {
    nParts: classifier.partCount(params),
    trainPart: (set, seed, part) => classifier.trainPart(set, params, seed, part),
    assemble: (shape, parts) => classifier.assemble(shape, params, parts),
  };
}
