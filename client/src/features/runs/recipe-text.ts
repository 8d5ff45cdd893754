import type { ClassifierRecipe, Recipe, Run } from '../../../../shared/contracts/run.ts';
import { formatCount, formatNumber, formatPercent } from '../../lib/format.ts';

export type ClassifierKind = ClassifierRecipe['kind'];

/** What each classifier is called, in a sentence and alone. */
export const CLASSIFIER_NAME: Record<ClassifierKind, string> = {
  'random-forest': 'random forest',
  'random-subspace-forest': 'random-subspace forest',
  'nearest-neighbours': 'k-nearest neighbours',
};

/** A run as people call it: "Run 3". */
export function runTitle(run: Pick<Run, 'number'>): string {
  return `Run ${run.number}`;
}

/** The settings of a classifier as name and figure, in the order of the form. */
export function listClassifierSettings(classifier: ClassifierRecipe): { name: string; value: string }[] {
  if (classifier.kind === 'nearest-neighbours') {
    return [{ name: 'Neighbours', value: formatNumber(classifier.neighbours) }];
  }
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
export function featuresLabel(kind: Exclude<ClassifierKind, 'nearest-neighbours'>): string {
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
