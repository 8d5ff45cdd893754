import type { Classifier, TrainedModel } from './classifier.ts';
import { gaussianMaximumLikelihood, type GaussianParams } from './gaussian-maximum-likelihood.ts';
import { minimumDistance, type MinimumDistanceParams } from './minimum-distance.ts';
import { ModelBytesError, readKind } from './model-bytes.ts';
import { nearestNeighbours, type NearestNeighboursParams } from './nearest-neighbours.ts';
import { randomForest, type RandomForestParams } from './random-forest.ts';
import { randomSubspaceForest, type RandomSubspaceForestParams } from './random-subspace-forest.ts';

/** Parameters of each kind of classifier. */
export interface ClassifierParams {
  'random-forest': RandomForestParams;
  'random-subspace-forest': RandomSubspaceForestParams;
  'nearest-neighbours': NearestNeighboursParams;
  'gaussian-maximum-likelihood': GaussianParams;
  'minimum-distance': MinimumDistanceParams;
}

export type ClassifierKind = keyof ClassifierParams;

const classifiers: { [K in ClassifierKind]: Classifier<ClassifierParams[K]> } = {
  'random-forest': randomForest,
  'random-subspace-forest': randomSubspaceForest,
  'nearest-neighbours': nearestNeighbours,
  'gaussian-maximum-likelihood': gaussianMaximumLikelihood,
  'minimum-distance': minimumDistance,
};

/** All kinds, the default first. */
export const classifierKinds = Object.keys(classifiers) as ClassifierKind[];

export function isClassifierKind(kind: string): kind is ClassifierKind {
  return Object.hasOwn(classifiers, kind);
}

/** The classifier of a kind. */
export function getClassifier<K extends ClassifierKind>(kind: K): Classifier<ClassifierParams[K]> {
  return classifiers[kind];
}

/** Reads a serialised model of whatever kind. @throws ModelBytesError when the bytes are no model or damaged. */
export function loadModel(bytes: Uint8Array): TrainedModel {
  const kind = readKind(bytes);
  if (!isClassifierKind(kind)) throw new ModelBytesError(`No classifier is called "${kind}".`);
  return classifiers[kind].load(bytes);
}
