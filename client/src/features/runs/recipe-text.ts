import type { ClassifierRecipe, Recipe, Run } from '../../../../shared/contracts/run.ts';
import type { SampleState } from '../../../../shared/contracts/sample.ts';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';

export type ClassifierKind = ClassifierRecipe['kind'];
export type ForestKind = Extract<ClassifierKind, 'random-forest' | 'random-subspace-forest'>;

/** What each classifier is called, in a sentence and alone. */
export const CLASSIFIER_NAME: Record<ClassifierKind, string> = {
  'random-forest': 'random forest',
  'random-subspace-forest': 'random-subspace forest',
  'nearest-neighbours': 'k-nearest neighbours',
  'gaussian-maximum-likelihood': 'Gaussian maximum likelihood',
  'minimum-distance': 'minimum distance',
};

/** What the review states of samples are called. */
export const SAMPLE_STATE_NAME: Record<SampleState, string> = {
  draft: 'Draft',
  submitted: 'Submitted',
  accepted: 'Accepted',
  returned: 'Returned',
};

/** A run as people call it: "Run 3". */
export function runTitle(run: Pick<Run, 'number'>): string {
  return `Run ${run.number}`;
}

/** The settings of a classifier as name and figure, in the order of the form. */
export function listClassifierSettings(classifier: ClassifierRecipe): { name: string; value: string }[] {
  switch (classifier.kind) {
    case 'nearest-neighbours':
      return [
        { name: 'Neighbours', value: formatNumber(classifier.neighbours) },
        { name: 'Bands', value: classifier.standardise ? 'on one scale' : 'as stored' },
      ];
    case 'gaussian-maximum-likelihood':
      return [
        { name: 'Priors', value: classifier.priors === 'equal' ? 'equal' : 'by training pixels' },
        { name: 'Ridge', value: formatPercent(classifier.ridge) },
      ];
    case 'minimum-distance':
      return [{ name: 'Distance', value: classifier.metric === 'euclidean' ? 'Euclidean' : 'Mahalanobis' }];
    case 'random-forest':
      return [
        ...listForestSettings(classifier),
        { name: 'Class weights', value: classifier.classWeights === 'balanced' ? 'balanced' : 'by training pixels' },
      ];
    case 'random-subspace-forest':
      return listForestSettings(classifier);
  }
}

function listForestSettings(classifier: Extract<ClassifierRecipe, { kind: ForestKind }>) {
  return [
    { name: 'Trees', value: formatNumber(classifier.trees) },
    { name: 'Deepest level', value: formatNumber(classifier.maxDepth) },
    { name: 'Smallest leaf', value: formatCount(classifier.minLeaf, 'pixel') },
    {
      name: featuresLabel(classifier.kind),
      value: classifier.featuresPerTree === null ? 'square root' : formatNumber(classifier.featuresPerTree),
    },
  ];
}

/** What `featuresPerTree` counts: a random forest draws bands anew at each split, a random-subspace forest once a tree. */
export function featuresLabel(kind: ForestKind): string {
  return kind === 'random-forest' ? 'Bands a split' : 'Bands a tree';
}

/** A recipe in one line: "random forest, 6 bands, 10 classes, 30 % held out". */
export function describeRecipe(recipe: Recipe): string {
  return [
    CLASSIFIER_NAME[recipe.classifier.kind],
    formatCount(recipe.bandIds.length, 'band'),
    formatCount(recipe.classIds.length, 'class', 'classes'),
    `${formatPercent(recipe.heldOutShare)} held out`,
  ].join(', ');
}

/** The bands drawn when none are asked for: the square root of their number, rounded down. */
export function squareRootFeatures(nBands: number): number {
  return Math.max(1, Math.floor(Math.sqrt(nBands)));
}
